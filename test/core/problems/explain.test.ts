import { describe, expect, it } from 'vitest'
import { explain, placeOf } from '../../../core/problems/explain'
import type { Problem, ProblemKind } from '../../../core/problems/problem'
import { quote, quotedList } from '../../../core/problems/quote'

const file = 'TB-0417.csv'
const row = { file, line: 12 }
const site = { ...row, wafer: '7', site: '31' }
const procedure = 'TB-0417.procedure.json'

/** One of every kind; a kind without an example doesn't compile. */
const examples: { readonly [Kind in ProblemKind]: Extract<Problem, { kind: Kind }> } = {
  'out-of-range': { kind: 'out-of-range', quantity: 'probe spacing', value: -1, unit: 'mm', min: 0, max: Infinity },
  'unknown-id': { kind: 'unknown-id', family: 'mobility model', id: 'x', known: ['arora', 'masetti'] },
  'not-applicable': { kind: 'not-applicable', what: 'the thickness factor', why: 'the layer is isolated' },
  'kept-elsewhere': { kind: 'kept-elsewhere' },
  'cannot-read': { kind: 'cannot-read', file, why: 'there is no such file' },
  'empty-file': { kind: 'empty-file', file },
  'not-text': { kind: 'not-text', file, looksLike: 'a ZIP archive' },
  'no-header': { kind: 'no-header', file, firstLine: '1,2,3' },
  'no-readings': { kind: 'no-readings', file, rows: 49, rejected: 49 },
  'missing-column': { kind: 'missing-column', file, wanted: 'voltage_V', headers: ['site', 'I [mA]'] },
  'ambiguous-column': { kind: 'ambiguous-column', file, column: 'voltage_V', candidates: ['V1', 'V2'] },
  'unknown-unit': { kind: 'unknown-unit', file, header: 'V [furlong]', unit: 'furlong', known: ['V', 'mV'] },
  'line-too-long': { kind: 'line-too-long', ...row, length: 2e6, max: 1e6 },
  'mixed-files': { kind: 'mixed-files', file, what: 'lot', first: 'TB-0417', found: 'TB-0418' },
  'bad-cell': { kind: 'bad-cell', ...row, column: 'temperature_C', found: 'warm', why: 'is not a number' },
  'bad-row': { kind: 'bad-row', ...row, column: 'voltage_V', found: 'open', why: 'it is no number' },
  'doubled-site': { kind: 'doubled-site', ...site, firstLine: 3 },
  'not-json': { kind: 'not-json', file: procedure, why: 'line 3, column 5: a comma or a closing } is missing' },
  'unknown-key': { kind: 'unknown-key', file: procedure, key: 'wafer.diametre', nearest: 'wafer.diameterMm', known: ['diameterMm'] },
  'bad-value': { kind: 'bad-value', file: procedure, key: 'wafer.shape', found: '"disk"', allowed: '"disc" or "rectangle"' },
  'bad-table': { kind: 'bad-table', file: 'gauge.csv', line: 9, why: 'an occasion has at least one reading' },
  'bad-profile': { kind: 'bad-profile', file: 'tb-0417-profile.csv', line: 7, why: 'it has two points' },
  'missing-file': { kind: 'missing-file', file: procedure, key: 'layer.profileFile', name: 'tb-0417-profile.csv' },
  'missing-key': { kind: 'missing-key', file: procedure, key: 'layer.depthUm', why: 'the dopant is spread down to the junction' },
  'limits-reversed': { kind: 'limits-reversed', file: procedure, key: 'limits.waferMeanOhmSq', lower: 97, upper: 87 },
  'site-off-wafer': { kind: 'site-off-wafer', ...site, radius_mm: 120, edge_mm: 100 },
  'pin-off-wafer': { kind: 'pin-off-wafer', ...site },
  'no-sheet-resistance': { kind: 'no-sheet-resistance', ...site, why: 'the current is zero' },
  'swapped-columns': { kind: 'swapped-columns', file, asRead: 0.0493, swapped: 20.3, unit: 'Ω' },
  'flagged-sites': { kind: 'flagged-sites', flag: 'reported', count: 2, wafers: ['1', '7'], sentence: 'is taken as the file reports it' },
  'no-such-site': { kind: 'no-such-site', wafer: '7', site: '99' },
  'suspicious-readings': {
    kind: 'suspicious-readings',
    check: 'units',
    severity: 'stops',
    sentence: 'The lot reads a thousand times off.',
    nextStep: 'Check the units of the columns.',
  },
  'check-wafer-alarm': { kind: 'check-wafer-alarm', sentence: 'The check wafer raised an alarm on 2026-03-15, the last before the lot.' },
  'nothing-assessed': { kind: 'nothing-assessed', why: 'the procedure has no limits' },
  'cannot-write': { kind: 'cannot-write', path: 'out/sites.csv', why: 'the folder is read-only' },
  'bad-argument': { kind: 'bad-argument', argument: '--colour', why: 'there is no such option' },
} // prettier-ignore

describe('explain', () => {
  it.each(Object.values(examples))('makes whole sentences of $kind', (problem) => {
    const text = explain(problem)
    expect(text).toMatch(/^[A-Z]?.{20,}[.!?]$/)
    expect(text).not.toMatch(/undefined|null|NaN|\[object|\.\.|: [.:]/)
    expect(text.startsWith(placeOf(problem))).toBe(true)
  })

  it('says what is wrong, where and what would mend it', () => {
    expect(explain(examples['bad-cell'])).toBe(
      'TB-0417.csv, line 12, column temperature_C: "warm" is not a number; the row was left out.',
    )
    expect(explain(examples['unknown-key'])).toBe(
      'TB-0417.procedure.json, wafer.diametre: A procedure has no such key. Was wafer.diameterMm meant?',
    )
    expect(explain(examples['out-of-range'])).toBe('The probe spacing is -1 mm; it must be at least 0 mm.')
    expect(explain(examples['bad-value'])).toBe(
      'TB-0417.procedure.json, wafer.shape: Found "disk"; allowed is "disc" or "rectangle".',
    )
    expect(explain(examples['flagged-sites'])).toBe(
      '2 sites on wafers "1" and "7": each is taken as the file reports it.',
    )
  })

  it('tells a value that is no number from one out of range', () => {
    const problem: Problem = { kind: 'out-of-range', quantity: 'current', value: NaN, unit: 'A', min: 0, max: 1 }
    expect(explain(problem)).toBe('The current is not a number; it must be from 0 to 1 A.')
  })

  it('tells a target outside its limits from limits the wrong way round', () => {
    const problem: Problem = { kind: 'limits-reversed', file: procedure, key: 'limits.x.target', lower: 97, upper: 92 }
    expect(explain(problem)).toContain('The target lies outside its limits')
    expect(explain(examples['limits-reversed'])).toContain('The lower limit, 97, is above the upper, 87.')
  })

  it('keeps hostile text on one line and short', () => {
    const found = `=cmd\n\u0007\u202e${'9'.repeat(5000)}`
    const text = explain({ ...examples['bad-row'], found })
    expect(text.length).toBeLessThan(200)
    expect(text).toContain('"=cmd\\n\\u0007\\u202e999')
    expect(text).not.toMatch(/[\p{Cc}\p{Cf}]/u)
  })
})

describe('placeOf', () => {
  it('names file, line and column, or the key', () => {
    expect(placeOf(examples['bad-row'])).toBe('TB-0417.csv, line 12, column voltage_V')
    expect(placeOf(examples['doubled-site'])).toBe('TB-0417.csv, line 12')
    expect(placeOf(examples['missing-key'])).toBe('TB-0417.procedure.json, layer.depthUm')
    expect(placeOf(examples['out-of-range'])).toBe('')
    expect(placeOf({ ...examples['empty-file'], file: 'a\nb.csv' })).toBe('a\\nb.csv')
  })
})

describe('quote', () => {
  it('leaves 60 characters whole and cuts the 61st', () => {
    expect(quote('a'.repeat(60))).toBe(`"${'a'.repeat(60)}"`)
    expect(quote('a'.repeat(61))).toBe(`"${'a'.repeat(59)}…"`)
  })

  it('does not cut a character in two', () => {
    expect(quote('𝛺'.repeat(61))).toBe(`"${'𝛺'.repeat(59)}…"`)
  })

  it('escapes what a line of text may not hold', () => {
    expect(quote('a\tb\u0000\u{e0001}')).toBe('"a\\tb\\u0000\\u{e0001}"')
  })

  it('counts what a long list leaves out', () => {
    expect(quotedList([])).toBe('none')
    expect(quotedList(['a', 'b', 'c'])).toBe('"a", "b" and "c"')
    expect(quotedList(['a', 'b', 'c'], 2)).toBe('"a", "b" and 1 more')
  })
})
