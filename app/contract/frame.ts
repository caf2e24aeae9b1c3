/** Several pieces of bytes in one, for the body of a request: their number, their lengths, then they themselves. */

const WORD = 4

export function packParts(parts: readonly Uint8Array[]): Uint8Array<ArrayBuffer> {
  const head = WORD * (1 + parts.length)
  const packed = new Uint8Array(parts.reduce((sum, { length }) => sum + length, head))
  const view = new DataView(packed.buffer)
  view.setUint32(0, parts.length, true)
  let at = head
  parts.forEach((part, k) => {
    view.setUint32(WORD * (1 + k), part.length, true)
    packed.set(part, at)
    at += part.length
  })
  return packed
}

/** null unless the lengths account for every byte. */
export function unpackParts(packed: Uint8Array): readonly Uint8Array[] | null {
  if (packed.length < WORD) return null
  const view = new DataView(packed.buffer, packed.byteOffset, packed.length)
  const count = view.getUint32(0, true)
  let at = WORD * (1 + count)
  if (at > packed.length) return null
  const parts: Uint8Array[] = []
  for (let k = 0; k < count; k++) {
    const end = at + view.getUint32(WORD * (1 + k), true)
    if (end > packed.length) return null
    parts.push(packed.slice(at, end))
    at = end
  }
  return at === packed.length ? parts : null
}
