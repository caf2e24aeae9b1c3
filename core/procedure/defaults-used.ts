/** What the file left to its defaults, key by key; a result states them all. */
import { dotted, isObject } from './key-shape'
import type { KeyPath } from './key-shape'

export interface DefaultUsed {
  readonly key: string
  /** As JSON: `0`, `"disc"`, `[]`. */
  readonly value: string
}

export function defaultsUsed(written: unknown, used: unknown, path: KeyPath = []): readonly DefaultUsed[] {
  if (!isObject(used) || (written === undefined && Object.keys(used).length === 0)) {
    return written === undefined ? [{ key: dotted(path), value: JSON.stringify(used) }] : []
  }
  return Object.keys(used).flatMap((key) => {
    const before = isObject(written) && Object.hasOwn(written, key) ? written[key] : undefined
    return used[key] === undefined ? [] : defaultsUsed(before, used[key], [...path, key])
  })
}
