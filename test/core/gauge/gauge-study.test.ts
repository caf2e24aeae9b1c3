import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { gaugeStudy } from '../../../core/gauge/gauge-study'
import { readOccasions, type Occasions } from '../../../core/gauge/occasions'
import { gaugeObject } from '../../../core/gauge/study-object'
import { PROBE_2362, RUN_1_BIASES } from '../../reference/nist-gauge-study'
import { STRD_ANOVA } from '../../reference/nist-strd'

const NIST = join(import.meta.dirname, '..', '..', 'reference', 'nist')
const bytes = (text: string): Uint8Array => new TextEncoder().encode(text)
const fileOf = (text: string) => ({ name: 'gauge.csv', bytes: bytes(text), sha256: '' })

function occasionsOf(text: string): Occasions {
  const { occasions, problems } = readOccasions(fileOf(text))
  expect(problems).toEqual([])
  return occasions!
}
const nist = occasionsOf(readFileSync(join(NIST, 'gauge-study.csv'), 'utf8'))
const within = (value: number, { half, ...printed }: { half: number; standardDeviation: number }): void => {
  expect(Math.abs(value - printed.standardDeviation)).toBeLessThanOrEqual(half)
}

describe('the study of five resistivity probes (NIST/SEMATECH e-Handbook 2.6.1, 2.6.3)', () => {
  const study = gaugeStudy(nist, { probe: '2362' })
  const { repeatability, day, run } = study.components

  it('has the published standard deviations and degrees of freedom of probe 2362', () => {
    expect(nist.unit).toBe('Ω·cm')
    for (const [level, printed] of [[repeatability, PROBE_2362.repeatability], [day, PROBE_2362.day], [run, PROBE_2362.run]] as const) {
      within(level!.standardDeviation, printed)
      expect(level!.degreesOfFreedom).toBe(printed.degreesOfFreedom)
    }
    within(day!.ownStandardDeviation!, PROBE_2362.ownDay)
    within(run!.ownStandardDeviation!, PROBE_2362.ownRun)
  })

  it('has the published biases of every probe', () => {
    for (const [wafer, byProbe] of Object.entries(RUN_1_BIASES)) {
      for (const [probe, printed] of Object.entries(byProbe)) {
        const cell = study.biases.find((bias) => bias.probe === probe)!.cells.find((found) => found.wafer === wafer && found.run === '1')!
        expect(Math.abs(cell.difference - printed), `${wafer} ${probe}`).toBeLessThanOrEqual(5.0001e-5)
      }
    }
    const bias = study.biases.find(({ probe }) => probe === '2362')!
    expect(Math.abs(bias.bias - PROBE_2362.bias.mean)).toBeLessThanOrEqual(PROBE_2362.bias.half)
    expect(Math.abs(bias.standardDeviation - PROBE_2362.bias.standardDeviation)).toBeLessThanOrEqual(PROBE_2362.bias.half)
    expect(bias.degreesOfFreedom).toBe(PROBE_2362.bias.degreesOfFreedom)
    expect(bias.standardUncertainty).toBeCloseTo(bias.standardDeviation / Math.sqrt(10), 12)
    expect(bias.pValue).toBeLessThan(0.001)
  })

  it('has the published expanded uncertainty of a one-day measurement', () => {
    const { effectiveDegreesOfFreedom, expandedUncertainty } = study.measurement!
    expect(Math.floor(effectiveDegreesOfFreedom)).toBe(PROBE_2362.effectiveDegreesOfFreedom)
    expect(Math.abs(expandedUncertainty - PROBE_2362.expandedUncertainty.value)).toBeLessThanOrEqual(PROBE_2362.expandedUncertainty.half)
  })

  it('pools all probes where none is named', () => {
    const { components, byProbe } = gaugeStudy(nist)
    const pooled = byProbe.reduce((sum, probe) => sum + 300 * probe.components.repeatability!.standardDeviation ** 2, 0) / 1500
    expect(components.repeatability!.standardDeviation).toBeCloseTo(Math.sqrt(pooled), 12)
    expect([components.repeatability, components.day, components.run].map((level) => level!.degreesOfFreedom)).toEqual([1500, 250, 25])
  })

  it('leaves a component negative where it comes out so: wafer 140 (e-Handbook 2.4.4 warns of it)', () => {
    const rows = readFileSync(join(NIST, 'gauge-study.csv'), 'utf8').trim().split('\n')
    const subset = occasionsOf([rows[0], ...rows.filter((row) => /^\d,140,2362,/.test(row))].join('\n'))
    const { day } = gaugeStudy(subset).components
    expect(day!.ownVariance).toBeCloseTo(-0.00028, 4)
    expect(day!.ownStandardDeviation).toBeNull()
    expect(day!.ownInterval.lower).toBe(0)
  })
}) // prettier-ignore

describe('SiRstv, single readings of five instruments (NIST StRD, certified)', () => {
  it('has the certified analysis of variance', () => {
    const certified = STRD_ANOVA.find(({ set }) => set === 'sirstv')!
    const study = gaugeStudy(occasionsOf(readFileSync(join(NIST, 'strd-anova-sirstv.csv'), 'utf8')))
    const found = study.betweenProbes!
    expect(found.f / certified.f - 1).toBeCloseTo(0, 9)
    expect(found.residualStandardDeviation / certified.residualStandardDeviation - 1).toBeCloseTo(0, 9)
    expect(study.components.repeatability!.standardDeviation / certified.residualStandardDeviation - 1).toBeCloseTo(0, 9)
    expect([found.between.degreesOfFreedom, found.within.degreesOfFreedom]).toEqual([4, 20])
  })
}) // prettier-ignore

/** Seeded, so that a failure can be looked at again. */
function normalDraws(seed: number): () => number {
  let state = seed
  const uniform = (): number => (state = (state * 48271) % 2147483647) / 2147483647
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform())
}

describe('a made-up study', () => {
  const made = (spread: { repeat: number; day: number; run: number; bias: number }): string => {
    const draw = normalDraws(7)
    const rows = ['wafer,probe,run,day,operator,value']
    for (let wafer = 0; wafer < 12; wafer++)
      for (const probe of ['A', 'B'])
        for (let run = 0; run < 4; run++) {
          const ofRun = spread.run * draw()
          for (let day = 0; day < 6; day++) {
            const ofDay = spread.day * draw()
            for (let k = 0; k < 5; k++) {
              const own = 90 + wafer + (probe === 'A' ? spread.bias : -spread.bias) + ofRun + ofDay
              rows.push(`${wafer},${probe},${run},${day},op${day % 2},${own + spread.repeat * draw()}`)
            }
          }
        }
    return rows.join('\n')
  }

  it('gives back the spreads it was made of, within their intervals, from single readings', () => {
    const study = gaugeStudy(occasionsOf(made({ repeat: 0.05, day: 0.08, run: 0.12, bias: 0.2 })), { tolerance: { lower: 85, upper: 95 }, level: 0.999 })
    const { repeatability, day, run } = study.components
    for (const [found, truth] of [[repeatability, 0.05], [day, 0.08], [run, 0.12]] as const) {
      expect(found!.ownInterval.lower).toBeLessThan(truth)
      expect(found!.ownInterval.upper).toBeGreaterThan(truth)
    }
    expect(study.biases.map(({ bias }) => Math.sign(bias))).toEqual([1, -1])
    expect(study.biases[0].bias).toBeCloseTo(0.2, 1)
    expect(study.tolerance!.percent).toBeCloseTo(60 * Math.hypot(0.05, 0.08, 0.12), -1)
    expect(study.operator!.pValue).toBeGreaterThan(0.001)
  })

  it('finds an operator who reads high', () => {
    const text = made({ repeat: 0.05, day: 0.02, run: 0.02, bias: 0 }).replace(/,op1,([\d.]+)/g, (_, v: string) => `,op1,${Number(v) + 0.2}`)
    const { operator } = gaugeStudy(occasionsOf(text))
    expect(operator!.pValue).toBeLessThan(1e-6)
    expect(operator!.operators.find(({ operator: name }) => name === 'op1')!.difference).toBeGreaterThan(0.05)
  })

  it('doesn’t hang on the order of the rows, nor on the height of the values', () => {
    const text = made({ repeat: 0.05, day: 0.08, run: 0.12, bias: 0.2 })
    const [head, ...rows] = text.split('\n').slice(0, 400)
    const before = gaugeStudy(occasionsOf([head, ...rows].join('\n'))).components
    fc.assert(
      fc.property(fc.shuffledSubarray(rows, { minLength: rows.length }), fc.double({ min: -50, max: 50, noNaN: true }), (shuffled, by) => {
        const moved = shuffled.map((row) => row.replace(/[^,]+$/, (value) => String(Number(value) + by)))
        const after = gaugeStudy(occasionsOf([head, ...moved].join('\n'))).components
        for (const level of ['repeatability', 'day', 'run'] as const) {
          expect(after[level]!.standardDeviation).toBeCloseTo(before[level]!.standardDeviation, 9)
          expect(after[level]!.degreesOfFreedom).toBe(before[level]!.degreesOfFreedom)
        }
      }),
      { numRuns: 20, seed: 1 },
    )
  })

  it('is written without gaps, and what is not known is null', () => {
    const study = gaugeStudy(occasionsOf('wafer,value\n1,90\n1,91\n2,89'))
    const object = gaugeObject(study) as { components: Record<string, unknown>; biases: unknown[] }
    expect(object.components).toMatchObject({ day: null, run: null })
    expect(object.biases).toEqual([])
    expect(study.components.repeatability!.standardDeviation).toBeCloseTo(Math.SQRT1_2, 12)
  })
}) // prettier-ignore

describe('what is no gauge study', () => {
  it('takes a standard deviation without a unit in that of the values, and refuses one of another quantity', () => {
    const table = (mean: string, sd: string): string => [`wafer,probe,day,${mean},${sd},n`, '1,A,1,95000,120,6', '1,A,2,95100,110,6'].join('\n')
    const scaled = occasionsOf(table('resistivity [mohm.cm]', 'sd'))
    expect(scaled.mean[0]).toBeCloseTo(95, 9)
    expect(scaled.standardDeviation[0]).toBeCloseTo(0.12, 9)
    expect(readOccasions(fileOf(table('resistivity [ohm.cm]', 'sd [ohm]'))).occasions).toBeNull()
  })

  const why = (text: string) => readOccasions(fileOf(text)).problems.map((problem) => problem.why).join()
  it.each([
    ['a picture', '\u0000\u0001PNG', /no text/],
    ['no header', '1,2,3\n4,5,6', /no line of it names/],
    ['no value', 'wafer,probe\n1,2', /no line of it names the columns that are needed, such as "value"/],
    ['nothing but a header', 'wafer,value', /no row/],
    ['a negative spread', 'wafer,mean,sd\n1,90,-1', /negative/],
  ])('%s', (_, text, expected) => {
    expect(readOccasions(fileOf(text)).occasions).toBeNull()
    expect(why(text)).toMatch(expected)
  })

  it('keeps the good rows and lists the bad', () => {
    const { occasions, problems } = readOccasions(fileOf('wafer,value\n1,90\n1,n/a\n1,91'))
    expect(occasions!.mean[0]).toBe(90.5)
    expect(problems).toMatchObject([{ kind: 'bad-table', line: 3 }])
  })

  it('one reading tells nothing', () => {
    expect(() => gaugeStudy(occasionsOf('wafer,value\n1,90'))).toThrow(expect.objectContaining({ problem: expect.objectContaining({ why: 'nothing in it was measured twice' }) }))
  })
}) // prettier-ignore
