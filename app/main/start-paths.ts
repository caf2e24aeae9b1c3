import { resolve } from 'node:path'

/**
 * The files named on the command line. A packaged program is one word of it, an unpackaged one two (the runtime and the
 * program's folder); whatever begins with a dash is a switch of the runtime, until a bare `--`.
 */
export function startPaths(argv: readonly string[], isPackaged: boolean): readonly string[] {
  const words = argv.slice(isPackaged ? 1 : 2)
  const end = words.indexOf('--')
  const before = end < 0 ? words : words.slice(0, end)
  const after = end < 0 ? [] : words.slice(end + 1)
  return [...before.filter((word) => !word.startsWith('-')), ...after].map((word) => resolve(word))
}
