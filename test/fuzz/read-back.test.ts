/** sites.csv read again: the same names and the same doubles, whatever the names are. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { sitesCsv } from '../../core/analysis/export-csv'
import { run } from '../../core/analysis/run'
import { readReadings } from '../../core/ingest/read-files'
import { fuzz, PATIENCE_MS } from './fuzz-runs'
import { checkTable } from './sound-outputs'

const FORMULAS = [
  '=1+1',
  '+x',
  '@x',
  '-3',
  "'=1+1",
  "''-5",
  '-',
  '=',
  '@SUM(A1:A9)',
  '+',
  '-1e3',
  '=cmd|x',
  '\t=1',
  '"=1"',
  "'",
] as const
const name = fc.oneof(
  fc.constantFrom<string>(...FORMULAS),
  fc.string({ unit: 'grapheme', minLength: 1, maxLength: 10 }),
  fc.string({ unit: 'binary', minLength: 1, maxLength: 6 }),
  fc.constantFrom(
    'a,b',
    'a;b',
    'a\tb',
    'say "so"',
    'two\nlines',
    'cr\rhere',
    '1,5',
    '007',
    '7',
    ' 7 ',
    '__proto__',
    'constructor',
    '\uFEFFx',
    'wafer',
    'Rs',
  ),
)
const reading = fc.double({ min: 1e-9, max: 1e9, noNaN: true })
const place = fc.double({ min: -150, max: 150, noNaN: true })
const lots = fc.array(fc.record({ wafer: name, site: name, x: place, y: place, value: reading }), {
  minLength: 1,
  maxLength: 12,
})
const kinds = fc.constantFrom('sheet_resistance_ohm_sq', 'v_over_i_ohm')
type Rows = readonly { wafer: string; site: string; x: number; y: number; value: number }[]

const cell = (text: string) => `"${text.replace(/"/g, '""')}"`

function check([rows, column]: readonly [Rows, string]): void {
  const lines = rows.map(({ wafer, site, x, y, value }) => [cell(wafer), cell(site), x, y, value].join(','))
  const bytes = new TextEncoder().encode([`wafer,site,x_mm,y_mm,${column}`, ...lines].join('\n'))
  const { analysis } = run({
    readings: [{ name: 'lot.csv', bytes, sha256: '00' }],
    procedure: { name: 'p.json', bytes: new TextEncoder().encode('{"format":"persquare-procedure/1"}') },
  })
  // Names of nothing but blanks, statistics and the like: refused, which other tests look at.
  if (analysis === null) return
  const { readings, sites } = analysis
  const table = sitesCsv(analysis)
  checkTable(table, 17)
  const again = readReadings([{ name: 'sites.csv', bytes: new TextEncoder().encode(table), sha256: '00' }])
  expect(again.problems).toEqual([])
  const back = again.readings!
  expect(back.count).toBe(readings.count)
  for (let i = 0; i < readings.count; i++) {
    expect(back.wafers[back.wafer[i]].id).toBe(readings.wafers[readings.wafer[i]].id)
    expect(back.siteNames[back.site[i]]).toBe(readings.siteNames[readings.site[i]])
    expect([back.x_mm![i], back.y_mm![i]]).toEqual([readings.x_mm![i], readings.y_mm![i]])
    expect(back.sheetResistance_ohm_sq![i]).toBe(sites.sheetResistance_ohm_sq[i])
    if (back.vOverI_ohm) expect(back.vOverI_ohm[i]).toBe(sites.vOverI_ohm[i])
  }
}

describe('what is written', () => {
  it(
    'reads back the same, and no name of it is a formula',
    () => {
      fuzz('read back', 8, fc.tuple(lots, kinds), check)
    },
    PATIENCE_MS,
  )
})
