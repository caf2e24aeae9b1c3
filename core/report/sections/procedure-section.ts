/** The procedure as used: every key, its value with its unit, and whether it was given or is a default. */
import { superscript } from '../../units/format'
import type { Block, TableRow } from '../document'
import type { ReportContext } from '../report-context'

export function procedureSection({ analysis }: ReportContext): Block[] {
  const defaults = new Set(analysis.defaults.map(({ key }) => key))
  const rows = flattened(analysis.procedure).map(({ key, value }): TableRow => {
    const isDefault = isAmong(defaults, key)
    return { cells: [key, value, unitOfKey(key), isDefault ? 'default' : 'given'] }
  })
  return [
    { kind: 'heading', level: 1, text: 'Procedure', aside: analysis.procedure.title },
    {
      kind: 'paragraph',
      text: 'Everything that was decided before the measurement, by the names it has in the procedure file.',
      quiet: true,
    },
    {
      kind: 'table',
      summary: 'Procedure keys with value, unit and origin',
      columns: [
        { title: 'Key', align: 'left', share: 2.4, mono: true },
        { title: 'Value', align: 'left', share: 3 },
        { title: 'Unit', align: 'left', share: 0.8 },
        { title: 'Origin', align: 'left', share: 0.7, quiet: true },
      ],
      rows,
    },
  ]
}

/** A default may be listed by its own key or by that of the part it stands in. */
function isAmong(defaults: ReadonlySet<string>, key: string): boolean {
  const parts = key.split('.')
  return parts.some((_, i) => defaults.has(parts.slice(0, i + 1).join('.')))
}

export interface FlatKey {
  readonly key: string
  readonly value: string
}

/** Dotted keys to written values, in the order of the file. */
export function flattened(part: unknown, prefix = ''): FlatKey[] {
  if (part === undefined) return []
  if (Array.isArray(part)) return [{ key: prefix, value: part.length > 0 ? part.map(written).join(', ') : 'none' }]
  if (typeof part !== 'object' || part === null) return [{ key: prefix, value: written(part) }]
  return Object.entries(part).flatMap(([key, value]) => flattened(value, prefix === '' ? key : `${prefix}.${key}`))
}

/** As the file has it: all digits of a number, and nothing rounded. */
function written(value: unknown): string {
  if (typeof value === 'number') return writtenNumber(value)
  return value === '' ? '–' : typeof value === 'object' ? JSON.stringify(value) : String(value)
}

function writtenNumber(value: number): string {
  const magnitude = Math.abs(value)
  if (value === 0 || (magnitude >= 1e-4 && magnitude < 1e6)) return String(value).replace('-', '−')
  const [mantissa = '', exponent = '0'] = value.toExponential().split('e')
  return `${mantissa.replace('-', '−')} × 10${superscript(Number(exponent))}`
}

/** A key's unit is its ending. */
const UNIT_ENDINGS: readonly (readonly [ending: string, unit: string])[] = [
  ['PercentPerC', '%/°C'], ['OhmSq', 'Ω/sq'], ['OhmCm', 'Ω·cm'], ['Cm2Vs', 'cm²/(V·s)'], ['Cm3', 'cm⁻³'], ['Mm', 'mm'],
  ['Um', 'µm'], ['Deg', '°'], ['Percent', '%'], ['Rel', 'relative'], ['C', '°C'],
] // prettier-ignore

export function unitOfKey(key: string): string {
  const words = key.split('.').reverse()
  for (const word of words.slice(0, 2)) {
    const found = UNIT_ENDINGS.find(([ending]) => word.endsWith(ending))
    const inherits = word === words[0] || INHERITING.has(words[0])
    if (found && inherits) return found[1]
  }
  return ''
}

/** Keys that carry the unit of the part they stand in. */
const INHERITING: ReadonlySet<string> = new Set(['target', 'lower', 'upper'])
