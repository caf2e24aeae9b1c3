/** Inputs made of other inputs: in the words, numbers, cells and lines that files are made of, and in bare bytes. */

/** Dice of its own, so that a run is the same anywhere. @returns numbers from 0 up to below `below` */
export function dice(seed: number): (below: number) => number {
  let state = (seed ^ 0x9e3779b9) >>> 0 || 1
  return (below) => {
    state ^= state << 13
    state ^= state >>> 17
    state ^= state << 5
    return ((state >>> 0) / 2 ** 32) * below | 0
  }
} // prettier-ignore

type Roll = ReturnType<typeof dice>

const NUMBERS = ['0', '-0', '1', '-1', '1e-320', '5e-324', '1e308', '1e309', '-1e309', '0.1', '1,5', '1.234,5', '1,234.5', '1e5', '9007199254740993', '00', '.5', '5.', 'NaN', 'Infinity', '0x10', '1e', '--1', '1 000', ' ', ''] // prettier-ignore
const MARKS = [',', ';', '\t', '"', '""', '\n', '\r\n', '\r', '\n\n', ' ', '#', ':', '=', "'", '\0', '\uFEFF', '{', '}', '[', ']', '\\', '/', '<<', '>>', '(', ')'] // prettier-ignore
const MOST_BYTES = 4000

const latin1 = (bytes: Uint8Array): string => Buffer.from(bytes).toString('latin1')

/** One to four changes, one after another. */
export function mutated(bytes: Uint8Array, other: Uint8Array, dictionary: readonly string[], roll: Roll): Uint8Array {
  let text = latin1(bytes)
  const times = 1 + roll(4)
  for (let n = 0; n < times; n++) text = CHANGES[roll(CHANGES.length)](text, latin1(other), dictionary, roll)
  return Buffer.from(text.length > MOST_BYTES ? text.slice(0, MOST_BYTES) : text, 'latin1')
}

type Change = (text: string, other: string, dictionary: readonly string[], roll: Roll) => string

const pick = <Item>(list: readonly Item[], roll: Roll): Item => list[roll(list.length)]
const utf8 = (word: string): string => Buffer.from(word, 'utf8').toString('latin1')
const insert = (text: string, word: string, roll: Roll): string => {
  const at = roll(text.length + 1)
  return text.slice(0, at) + utf8(word) + text.slice(at)
}

const CHANGES: readonly Change[] = [
  (text, _, words, roll) => insert(text, pick(words, roll), roll),
  (text, _, __, roll) => insert(text, pick(MARKS, roll), roll),
  // A number for another.
  (text, _, __, roll) => replaceOne(text, /-?\d+(?:\.\d+)?(?:e[+-]?\d+)?/gi, () => pick(NUMBERS, roll), roll),
  // A word for one of the dictionary's.
  (text, _, words, roll) => replaceOne(text, /[A-Za-z_]{2,}/g, () => pick(words, roll), roll),
  (text, _, __, roll) => {
    const at = roll(text.length + 1)
    return text.slice(0, at) + String.fromCharCode(roll(256)) + text.slice(at + 1)
  },
  (text, _, __, roll) => {
    const at = roll(text.length + 1)
    return text.slice(0, at) + text.slice(at + 1 + roll(40))
  },
  (text, _, __, roll) => {
    const [at, length] = [roll(text.length + 1), 1 + roll(60)]
    return text.slice(0, at) + text.slice(at, at + length) + text.slice(at)
  },
  (text, other, _, roll) => text.slice(0, roll(text.length + 1)) + other.slice(roll(other.length + 1)),
  (text, _, __, roll) => onLines(text, roll, (lines, a, b) => ([lines[a], lines[b]] = [lines[b], lines[a]])),
  (text, _, __, roll) => onLines(text, roll, (lines, a, b) => void lines.splice(a, 0, lines[b])),
  (text, other, _, roll) => onLines(text, roll, (lines, a) => void lines.splice(a, 0, pick(other.split('\n'), roll))),
  (text, _, __, roll) => {
    const mark = pick([',', ';', '\t'], roll)
    return text.replaceAll(pick([',', ';', '\t'], roll), mark)
  },
]

function replaceOne(text: string, what: RegExp, by: () => string, roll: Roll): string {
  const found = [...text.matchAll(what)]
  if (found.length === 0) return text
  const { index, 0: old } = pick(found, roll)
  return text.slice(0, index) + utf8(by()) + text.slice(index + old.length)
}

function onLines(text: string, roll: Roll, work: (lines: string[], a: number, b: number) => unknown): string {
  const lines = text.split('\n')
  work(lines, roll(lines.length), roll(lines.length))
  return lines.join('\n')
}
