import { createHash, timingSafeEqual } from 'node:crypto'
import type { IncomingMessage } from 'node:http'

/**
 * The status to refuse a request with, or null to let it pass. The Host check keeps out a foreign name that was pointed
 * at this address; the Origin and Sec-Fetch-Site checks keep out the pages of other sites.
 */
export function refusalOf(
  { headers, method }: Pick<IncomingMessage, 'headers' | 'method'>,
  authority: string,
): number | null {
  if (headers.host !== authority) return 403
  if (headers.origin !== undefined && headers.origin !== `http://${authority}`) return 403
  const site = headers['sec-fetch-site']
  if (site !== undefined && site !== 'same-origin' && site !== 'none') return 403
  if (method !== 'GET') return 405
  return null
}

/** Takes as long for a near miss as for a wild guess. */
export function sameText(a: string, b: string): boolean {
  return timingSafeEqual(digest(a), digest(b))
}

function digest(text: string): Buffer {
  return createHash('sha256').update(text).digest()
}
