import { resolve } from 'node:path'

/**
 * The files named on the command line. A packaged program is one word of it, an unpackaged one two: the runtime and, after
 * its switches, the program's folder. Whatever begins with a dash is a switch of the runtime, until a bare `--`.
 */
export function startPaths(argv: readonly string[], isPackaged: boolean): readonly string[] {
  const words = argv.slice(1)
  const end = words.indexOf('--')
  const before = end < 0 ? words : words.slice(0, end)
  const after = end < 0 ? [] : words.slice(end + 1)
  const named = before.filter((word) => !word.startsWith('-'))
  return [...(isPackaged ? named : named.slice(1)), ...after].map((word) => resolve(word))
}
