import type { IncomingMessage } from 'node:http'

/** Longer than any body takes on one computer; a request that trickles in is given up. */
const PATIENCE_ms = 60_000

/** The whole body, or the status to refuse the request with: too large, or not finished. */
export async function bodyOf(request: IncomingMessage, most: number): Promise<Uint8Array | 411 | 413 | 400> {
  const length = Number(request.headers['content-length'] ?? NaN)
  if (!Number.isSafeInteger(length) || length < 0) return 411
  if (length > most) return 413
  const body = Buffer.allocUnsafe(length)
  let at = 0
  request.setTimeout(PATIENCE_ms, () => request.destroy())
  try {
    for await (const part of request as AsyncIterable<Buffer>) at += part.copy(body, at)
  } catch {
    return 400
  }
  return at === length ? body : 400
}
