/**
 * Well-formed exports in every dialect, unit and form: the sheet resistance of each site must be the one worked out here
 * from what was measured, by another calculation. A wrong number accepted in silence is the worst a reader can do.
 */
import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { run, type RunResult } from '../../core/analysis/run'
import { exportStyles, type ExportStyle } from './export-style'
import { fuzz, PATIENCE_MS } from './fuzz-runs'
import { measuredLots, valueOf, type MeasuredLot, type MeasuredPair, type MeasuredSite } from './measured-lots'
import { hasB, hasReverse, polarPlace, readyMade, writeExport, type WrittenExport } from './write-export'

const SPACING_MM = 1.59
const DIAMETER_MM = 100

/** SEMI MF84 and others, common knowledge: the centre of a disc of diameter d under an equally spaced line of pins. */
function centredDiscFactor(diameter_mm: number, spacing_mm: number): number {
  const square = (diameter_mm / spacing_mm) ** 2
  return Math.PI / (Math.LN2 + Math.log((square + 3) / (square - 3)))
}

const INFINITE_FACTOR = Math.PI / Math.LN2

/** exp(2 pi A/Rs) - exp(2 pi B/Rs) = 1, by halving. */
function dualSheetResistance(a: number, b: number): number {
  let low = a
  let high = 1e4 * a
  for (let step = 0; step < 200; step++) {
    const middle = (low + high) / 2
    if (Math.exp((2 * Math.PI * a) / middle) - Math.exp((2 * Math.PI * b) / middle) > 1) low = middle
    else high = middle
  }
  return (low + high) / 2
}

function ratioOf({ current, voltage }: MeasuredPair): number {
  return valueOf(voltage) / valueOf(current)
}

/** V/I of one configuration: both polarities averaged where both are there. */
function meanRatio(forward: MeasuredPair, reverse: MeasuredPair, style: ExportStyle): number {
  if (style.form.startsWith('ratio')) return valueOf(readyMade(forward))
  return hasReverse(style) ? (ratioOf(forward) + ratioOf(reverse)) / 2 : ratioOf(forward)
}

function expectedSheetResistance(site: MeasuredSite, style: ExportStyle, factor: number, isDual: boolean): number {
  if (style.form === 'reported') return valueOf(readyMade(site.a))
  const a = meanRatio(site.a, site.aReverse, style)
  return isDual ? dualSheetResistance(a, meanRatio(site.b, site.bReverse, style)) : factor * a
}

interface Case {
  readonly lot: MeasuredLot
  readonly style: ExportStyle
  readonly isDual: boolean
  readonly onDisc: boolean
}

const cases: fc.Arbitrary<Case> = fc
  .record({ lot: measuredLots, style: exportStyles, isDual: fc.boolean(), onDisc: fc.boolean() })
  .map((given) => ({ ...given, isDual: given.isDual && hasB(given.style) }))

function analyzed({ style, isDual, onDisc }: Case, { bytes }: WrittenExport): RunResult {
  const procedure = {
    format: 'persquare-procedure/1',
    probe: { spacingMm: SPACING_MM, technique: isDual ? 'dual' : 'single' },
    wafer: onDisc ? { diameterMm: DIAMETER_MM } : {},
    readings: style.decimalMark === ',' && style.order[0] % 2 === 0 ? { decimalMark: ',' } : {},
  }
  return run({
    readings: [{ name: 'TB-0417.csv', bytes, sha256: '00' }],
    procedure: { name: 'procedure.json', bytes: new TextEncoder().encode(JSON.stringify(procedure)) },
  })
}

/** A column that may or may not be ours is refused, never guessed. */
const MAY_REFUSE = new Set(['ambiguous-column', 'unknown-unit'])

function check(given: Case): void {
  const { lot, style, isDual, onDisc } = given
  const written = writeExport(lot, style)
  const { analysis, problems } = analyzed(given, written)
  if (analysis === null) {
    if (style.decoys.length > 0 && problems.every(({ kind }) => MAY_REFUSE.has(kind))) return
    throw new Error(`refused: ${JSON.stringify(problems)}`)
  }
  const { readings, sites } = analysis
  const isFooter = (why: string) => style.footer === 'statistics' && /statistics|not a number/.test(why)
  const rows = problems.filter((problem) => 'line' in problem && !('why' in problem && isFooter(problem.why)))
  const unexpected = rows.filter(({ kind }) => kind !== 'pin-off-wafer' && kind !== 'site-off-wafer')
  if (unexpected.length > 0) throw new Error(`rejected: ${JSON.stringify(unexpected)}`)
  if (readings.count !== written.sites.length) throw new Error(`${readings.count} sites of:\n${written.text}`)
  expect(readings.lot).toBe(style.preamble === 'none' || style.preamble === 'free text' ? 'TB-0417' : lot.lot)
  written.sites.forEach((site, i) => {
    expect(readings.wafers[readings.wafer[i]].id).toBe(unguarded(site.wafer))
    expect(readings.siteNames[readings.site[i]]).toBe(unguarded(site.site))
    checkPlace(given, site, readings.x_mm?.[i], readings.y_mm?.[i])
    if (style.temperature) expect(readings.temperature_C![i]).toBe(valueOf(site.temperature))
    const isCentre = site.x_mm.digits === 0 && site.y_mm.digits === 0
    const knowsPlace = style.places !== 'none' && style.places !== 'dies'
    if (onDisc && knowsPlace && !isCentre && !isDual && style.form !== 'reported') return
    const factor = onDisc && knowsPlace ? centredDiscFactor(DIAMETER_MM, SPACING_MM) : INFINITE_FACTOR
    const expected = expectedSheetResistance(site, style, factor, isDual)
    const found = sites.sheetResistance_ohm_sq[i]
    if (!(Math.abs(found - expected) <= 1e-11 * expected)) throw new Error(`${found} for ${expected} at site ${i}`)
  })
}

/** Reading takes the apostrophe off text that a spreadsheet would have taken for a formula. */
function unguarded(name: string): string {
  return name.replace(/^'(?='*[=+\-@])/, '')
}

function checkPlace({ style }: Case, site: MeasuredSite, x_mm: number | undefined, y_mm: number | undefined): void {
  if (style.places === 'plane' || style.places === 'plane-and-dies') {
    expect([x_mm, y_mm]).toEqual([valueOf(site.x_mm), valueOf(site.y_mm)])
  } else if (style.places === 'polar') {
    const { r_mm, theta_deg } = polarPlace(site)
    expect(x_mm).toBeCloseTo(r_mm * Math.cos((theta_deg * Math.PI) / 180), 9)
    expect(y_mm).toBeCloseTo(r_mm * Math.sin((theta_deg * Math.PI) / 180), 9)
  } else expect([x_mm, y_mm]).toEqual([undefined, undefined])
}

describe('well-formed exports', () => {
  it(
    'give the sheet resistance of every site, whatever their dialect, units and form',
    () => {
      fuzz('right readings', 10, cases, check)
    },
    PATIENCE_MS,
  )
})
