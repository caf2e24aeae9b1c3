/** Which reading of its site a row of a long file holds, by its configuration and direction cells. */
export const REVERSE_BIT = 1
export const B_BIT = 2
/** The site has no name in the file, its number is ours. */
export const NUMBERED_BIT = 4

// Maps: a cell may say "constructor".
const CONFIGURATIONS: ReadonlyMap<string, number> = new Map(Object.entries({
  single: 0, '': 0, a: 0, b: B_BIT, 'config a': 0, 'config b': B_BIT, 'configuration a': 0, 'configuration b': B_BIT, '1-4': 0, '1-3': B_BIT })) // prettier-ignore
const DIRECTIONS: ReadonlyMap<string, number> = new Map(Object.entries({
  '': 0, forward: 0, fwd: 0, f: 0, '+': 0, positive: 0, pos: 0, plus: 0, normal: 0, '+1': 0, '1': 0,
  reverse: REVERSE_BIT, reversed: REVERSE_BIT, rev: REVERSE_BIT, r: REVERSE_BIT, '-': REVERSE_BIT, '\u2212': REVERSE_BIT,
  negative: REVERSE_BIT, neg: REVERSE_BIT, minus: REVERSE_BIT, '-1': REVERSE_BIT,
})) // prettier-ignore

/** Bits of the role, -1 if a cell is none of the words. An empty cell means A, forward. */
export function readRole(
  cells: readonly string[],
  at: { readonly configuration: number; readonly direction: number },
): number {
  const configuration = at.configuration < 0 ? 0 : CONFIGURATIONS.get(keyOf(cells[at.configuration]))
  const direction = at.direction < 0 ? 0 : DIRECTIONS.get(keyOf(cells[at.direction]))
  return configuration === undefined || direction === undefined ? -1 : configuration | direction
}

function keyOf(cell: string): string {
  return cell
    .trim()
    .replace(/^'(?=[+-])/, '')
    .toLowerCase()
}
