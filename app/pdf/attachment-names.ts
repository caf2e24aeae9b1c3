/** Names under which files travel in a report: safe on any system that saves them from it, and each its own. */
export const MANIFEST_NAME = 'persquare-report.json'
export const RESULT_NAME = 'result.json'

const MAX_STEM = 80
const EXTENSION = /^\.[A-Za-z0-9]{1,12}$/
/** Names that a system keeps for its devices. */
const DEVICE = /^(?:con|prn|aux|nul|com\d|lpt\d)$/i

/** One for each name given, in its order; the same for the same names. */
export function attachmentNames(originals: readonly string[]): readonly string[] {
  const taken = new Set([MANIFEST_NAME, RESULT_NAME])
  return originals.map((original) => {
    const name = firstFree(safeParts(original), taken)
    taken.add(name.toLowerCase())
    return name
  })
}

interface NameParts {
  readonly stem: string
  /** With its point. */
  readonly extension: string
}

/** Letters, digits and few marks; no point or dash in front, and no name of a device. */
function safeParts(original: string): NameParts {
  const safe = trimmed(original.replace(/[^A-Za-z0-9 ._-]/g, '_'))
  const point = safe.lastIndexOf('.')
  const hasExtension = point > 0 && EXTENSION.test(safe.slice(point))
  const stem = trimmed((hasExtension ? safe.slice(0, point) : safe).slice(0, MAX_STEM))
  const isReserved = stem === '' || DEVICE.test(stem.split('.', 1)[0])
  return {
    stem: isReserved ? `input${stem === '' ? '' : '-'}${stem}` : stem,
    extension: hasExtension ? safe.slice(point) : '',
  }
}

const MARKS = new Set(' ._-')

function trimmed(text: string): string {
  let from = 0
  let to = text.length
  while (from < to && MARKS.has(text[from])) from++
  while (to > from && (text[to - 1] === ' ' || text[to - 1] === '.')) to--
  return text.slice(from, to)
}

function firstFree({ stem, extension }: NameParts, taken: ReadonlySet<string>): string {
  const isTaken = (name: string): boolean => taken.has(name.toLowerCase())
  if (!isTaken(stem + extension)) return stem + extension
  let count = 2
  while (isTaken(`${stem}-${count}${extension}`)) count++
  return `${stem}-${count}${extension}`
}
