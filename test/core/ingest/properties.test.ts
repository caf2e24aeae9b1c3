import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readReadings } from '../../../core/ingest/read-files'
import { writeCsv } from '../../../core/ingest/write-csv'
import { list, readClean, readText, textFile } from './read'

const positive = fc.double({ min: 1e-12, max: 1e9, noNaN: true })
const place = fc.double({ min: -150, max: 150, noNaN: true })
const siteName = fc.string({ minLength: 1, maxLength: 12 }).map((text) => `p.${text.trim()}`)
const guardedName = fc.constantFrom(
  "'=1+1",
  '=SUM(A1)',
  '+3',
  '-4',
  '@x',
  "''-5",
  'a,b',
  'say "so"',
  'two\nlines',
  "o'clock",
)
const row = fc.record({
  wafer: fc.integer({ min: 1, max: 25 }),
  site: fc.oneof(siteName, guardedName, fc.integer({ min: 0, max: 1e7 }).map(String)),
  x: place,
  y: place,
  i: positive,
  v: positive,
  t: fc.oneof(fc.constant(NaN), fc.double({ min: 15, max: 30, noNaN: true })),
})
const rows = fc.uniqueArray(row, {
  minLength: 1,
  maxLength: 30,
  comparator: (a, b) =>
    a.wafer === b.wafer && (a.site.trim() === b.site.trim() || Math.hypot(a.x - b.x, a.y - b.y) < 1e-5),
})
type Row = { wafer: number; site: string; x: number; y: number; i: number; v: number; t: number }

const columns: Record<string, (row: Row) => string | number> = {
  wafer: ({ wafer }) => wafer,
  site: ({ site }) => site,
  x_mm: ({ x }) => x,
  y_mm: ({ y }) => y,
  current_A: ({ i }) => i,
  voltage_V: ({ v }) => v,
  temperature_C: ({ t }) => t,
}

function write(list: readonly Row[], order: readonly string[]): string {
  return writeCsv(
    order.map((name) => ({ name, cell: (at) => columns[name]!(list[at]!) })),
    list.length,
  )
}

describe('written and read back', () => {
  it('every number is the same double and every name the same text, in any order of columns', () => {
    fc.assert(
      fc.property(rows, fc.shuffledSubarray(Object.keys(columns), { minLength: 7 }), (given, order) => {
        const readings = readClean(write(given, order))
        expect(readings.count).toBe(given.length)
        expect(list(readings.x_mm)).toEqual(given.map(({ x }) => x))
        expect(list(readings.y_mm)).toEqual(given.map(({ y }) => y))
        expect(list(readings.current_A)).toEqual(given.map(({ i }) => i))
        expect(list(readings.voltage_V)).toEqual(given.map(({ v }) => v))
        const isEmpty = given.every(({ t }) => Number.isNaN(t))
        expect(list(readings.temperature_C)).toEqual(isEmpty ? null : given.map(({ t }) => t))
        expect([...readings.site].map((site) => readings.siteNames[site])).toEqual(given.map(({ site }) => site.trim()))
        expect([...readings.wafer].map((wafer) => readings.wafers[wafer]!.slot)).toEqual(
          given.map(({ wafer }) => wafer),
        )
      }),
      { numRuns: 200 },
    )
  })
})

describe('anything may come', () => {
  const scrap = fc.constantFrom(
    'site',
    'V',
    'I',
    'Rs',
    'wafer',
    '\n',
    '\r\n',
    '\r',
    ',',
    ';',
    '\t',
    '"',
    '""',
    '1',
    '0.02',
    '-',
    'e',
    ':',
    '#',
    '=',
    'µ',
    ' ',
    '(mV)',
    '\u0000',
    'x',
    'y',
    'Lot',
  )
  const nearCsv = fc.array(scrap, { maxLength: 120 }).map((parts) => parts.join(''))

  it('garbage never throws and every answer is whole', () => {
    fc.assert(
      fc.property(fc.oneof(fc.string({ unit: 'binary', maxLength: 300 }), nearCsv), (text) => {
        const { readings, problems } = readText(text)
        if (readings === null) expect(problems.length).toBeGreaterThan(0)
        else expect(readings.line).toHaveLength(readings.count)
      }),
      { numRuns: 300 },
    )
  })

  it('nor do bytes', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 400 }), (bytes) => {
        const { readings, problems } = readReadings([{ name: 'a.csv', bytes, sha256: '' }])
        expect(readings !== null || problems.length > 0).toBe(true)
      }),
      { numRuns: 300 },
    )
  })

  it('a good file with one spoiled line loses that line alone', () => {
    const good = ['wafer,site,I,V', ...Array.from({ length: 40 }, (_, at) => `1,${at + 1},0.001,0.0${at + 11}`)]
    const spoiled = fc.constantFrom(
      '"',
      'x',
      '1,"2,3',
      ',,,"',
      '1,2,3,4,5',
      'NaN,NaN,NaN,NaN',
      '1,1,0,1',
      '""""',
      '"a" b,1,2,3',
    )
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 40 }), spoiled, (at, line) => {
        const { readings, problems } = readReadings([
          textFile([...good.slice(0, at), line, ...good.slice(at)].join('\n')),
        ])
        expect(readings!.count).toBe(40)
        expect(problems).toMatchObject([{ line: at + 1 }])
      }),
      { numRuns: 200 },
    )
  })
})
