import { createHash, timingSafeEqual } from 'node:crypto'
import type { IncomingMessage } from 'node:http'
import { OWN_HEADER } from '../contract/loopback'

/**
 * The status to refuse a request with, or null to let it pass. The Host check keeps out a foreign name that was pointed
 * at this address; the Origin and Sec-Fetch-Site checks keep out the pages of other sites. What changes something must
 * come from our own page beyond doubt: with its origin, and with a header that no form and no other site can set.
 */
export function refusalOf(
  { headers, headersDistinct, method }: Pick<IncomingMessage, 'headers' | 'headersDistinct' | 'method'>,
  authority: string,
): number | null {
  const origin = `http://${authority}`
  // Of two names the first would be taken here, the second perhaps on the way.
  if (headers.host !== authority || headersDistinct['host']?.length !== 1) return 403
  if (headers.origin !== undefined && headers.origin !== origin) return 403
  const site = headers['sec-fetch-site']
  if (site !== undefined && site !== 'same-origin' && site !== 'none') return 403
  if (method === 'GET') return null
  if (method !== 'POST') return 405
  return headers.origin === origin && headers[OWN_HEADER] === '1' ? null : 403
}

/** Takes as long for a near miss as for a wild guess. */
export function sameText(a: string, b: string): boolean {
  return timingSafeEqual(digest(a), digest(b))
}

function digest(text: string): Buffer {
  return createHash('sha256').update(text).digest()
}
