import { describe, expect, it } from 'vitest'
import { run } from '../../../core/analysis/run'
import { expandedUncertainty } from '../../../core/analysis/uncertainty-budget'
import { siteWorking } from '../../../core/analysis/site-working'
import { checkSite } from '../../../core/monte-carlo/check-site'
import { agreement, monteCarlo, numericalTolerance } from '../../../core/monte-carlo/propagate'
import { normalProbability } from '../../../core/numeric/normal'
import { seededRandom, xoshiro128 } from '../../../core/numeric/random'
import type { ProcedureInput } from '../../../core/procedure/schema'
import { ADDITIVE, END_GAUGE, RESISTIVITY_BUDGET } from '../../reference/jcgm-100'

const sum = (z: Float64Array): number => z.reduce((total, value) => total + value, 0)
const rectangular = (z: Float64Array): number =>
  z.reduce((total, value) => total + (2 * normalProbability(value) - 1) * Math.sqrt(3), 0)

describe('the generator', () => {
  it('is xoshiro128** (its authors’ reference code; first outputs for the state 1, 2, 3, 4, from memory)', () => {
    const next = xoshiro128(Uint32Array.of(1, 2, 3, 4))
    expect(Array.from({ length: 6 }, next)).toEqual([11520, 0, 5927040, 70819200, 2031721883, 1637235492])
  })

  it('is the same for the same seed, and another for another', () => {
    const draws = (seed: number) => Array.from({ length: 5 }, seededRandom(seed).uniform)
    expect(draws(1)).toEqual(draws(1))
    expect(draws(1)).not.toEqual(draws(2))
  })

  it('draws uniform and normal numbers', () => {
    const { uniform, normal } = seededRandom(5)
    const u = Array.from({ length: 50_000 }, uniform)
    const z = Array.from({ length: 50_000 }, normal)
    const moment = (values: number[], k: number): number => values.reduce((total, value) => total + value ** k, 0) / values.length
    expect(Math.min(...u)).toBeGreaterThan(0)
    expect(Math.max(...u)).toBeLessThan(1)
    expect(moment(u, 1)).toBeCloseTo(0.5, 2)
    expect(moment(u, 2)).toBeCloseTo(1 / 3, 2)
    expect(moment(z, 1)).toBeCloseTo(0, 1)
    expect(moment(z, 2)).toBeCloseTo(1, 1)
    expect(Math.abs(moment(z, 4) - 3)).toBeLessThan(0.12)
    // Kolmogorov's distance of 50,000: 1.95/root(n) at 0.1 %.
    const sorted = [...z].sort((a, b) => a - b)
    const distance = Math.max(...sorted.map((value, i) => Math.abs(normalProbability(value) - i / sorted.length)))
    expect(distance).toBeLessThan(1.95 / Math.sqrt(50_000) + 1 / 50_000)
  })
}) // prettier-ignore

describe('propagation of distributions', () => {
  it('has the published intervals of the additive model (JCGM 101:2008, 9.2)', () => {
    for (const [evaluate, half] of [[sum, ADDITIVE.normal], [rectangular, ADDITIVE.rectangular]] as const) {
      const found = monteCarlo({ draws: 4, evaluate, trials: 400_000, seed: 3, level: 0.95 })
      expect(found.standardUncertainty).toBeCloseTo(ADDITIVE.u, 1)
      for (const { lower, upper } of [found.interval, found.shortest]) {
        expect(Math.abs(upper - half)).toBeLessThan(0.05)
        expect(Math.abs(lower + half)).toBeLessThan(0.05)
      }
    }
  })

  it('finds the shortest interval of a skewed quantity', () => {
    const found = monteCarlo({ draws: 1, evaluate: (z) => Math.exp(z[0]), trials: 100_000, seed: 3, level: 0.95 })
    expect(found.shortest.upper - found.shortest.lower).toBeLessThan(found.interval.upper - found.interval.lower)
    expect(found.interval.upper).toBeCloseTo(Math.exp(1.96), 0)
  })

  it('says when the first order is enough, and when it is not', () => {
    const linear = monteCarlo({ draws: 4, evaluate: sum, trials: 200_000, seed: 1, level: 0.95 })
    expect(agreement({ value: 0, standardUncertainty: 2, expandedUncertainty: 2 * 1.96 }, linear).isFirstOrderEnough).toBe(true)
    // y = x^2 about 0: its first derivative vanishes (JCGM 101:2008, 9.4.2 has such a model).
    const square = monteCarlo({ draws: 1, evaluate: (z) => z[0] ** 2, trials: 50_000, seed: 1, level: 0.95 })
    const said = agreement({ value: 0, standardUncertainty: 0, expandedUncertainty: 0 }, square)
    expect(said.isFirstOrderEnough).toBe(false)
    expect(said.sentence).toMatch(/does not agree/)
  })

  it('counts what can’t be evaluated', () => {
    const found = monteCarlo({ draws: 1, evaluate: (z) => (z[0] > 1 ? NaN : z[0]), trials: 10_000, seed: 1, level: 0.95 })
    expect(Math.abs(found.failed / 10_000 - 0.1587)).toBeLessThan(0.015)
    expect(agreement({ value: 0, standardUncertainty: 1, expandedUncertainty: 1.96 }, found).sentence).toMatch(/gave no result/)
  })

  it('takes the numerical tolerance of JCGM 101:2008, 7.9.2: of u 0.35 with two digits, 0.005', () => {
    expect(numericalTolerance(0.35, 2)).toBeCloseTo(0.005, 15)
    expect(numericalTolerance(35, 2)).toBeCloseTo(0.5, 12)
    expect(numericalTolerance(35, 1)).toBeCloseTo(5, 12)
  })

  it('tells its progress and refuses a handful of trials', () => {
    const shares: number[] = []
    monteCarlo({ draws: 1, evaluate: sum, trials: 5000, seed: 1, level: 0.95, tell: (share) => shares.push(share) })
    expect(shares).toEqual([0, 0.2, 0.4, 0.6, 0.8])
    expect(() => monteCarlo({ draws: 1, evaluate: sum, trials: 10, seed: 1, level: 0.95 })).toThrow()
  })
}) // prettier-ignore

describe('an expanded uncertainty', () => {
  const lines = (components: readonly { u: number; degreesOfFreedom: number }[]) =>
    components.map(({ u, degreesOfFreedom }) => ({ relative: u, degreesOfFreedom, shared: true }))

  it('is that of the end gauge (JCGM 100:2008, H.1)', () => {
    const { standard, effectiveDegreesOfFreedom, expanded } = expandedUncertainty(lines(END_GAUGE.components), 0.99)
    expect(standard).toBeCloseTo(END_GAUGE.combined, 0)
    expect(Math.floor(effectiveDegreesOfFreedom)).toBe(END_GAUGE.wholeDegreesOfFreedom)
    expect(Math.round(expanded)).toBe(END_GAUGE.expanded99)
  })

  it('combines the budget of a resistivity (e-Handbook 2.6.4)', () => {
    const components = RESISTIVITY_BUDGET.effects.map((u) => ({ u, degreesOfFreedom: Infinity }))
    const { standard, coverageFactor } = expandedUncertainty(lines(components), 0.95)
    expect(Math.abs(standard - RESISTIVITY_BUDGET.combined)).toBeLessThan(5e-4)
    expect(coverageFactor).toBeCloseTo(1.959964, 6)
  })

  it('averages down what is not shared', () => {
    const two = [{ relative: 3, degreesOfFreedom: Infinity, shared: false }, { relative: 4, degreesOfFreedom: Infinity, shared: true }]
    expect(expandedUncertainty(two, 0.95).standard).toBe(5)
    expect(expandedUncertainty(two, 0.95, 9).standard).toBeCloseTo(Math.hypot(1, 4), 12)
  })
}) // prettier-ignore

const bytes = (text: string): Uint8Array => new TextEncoder().encode(text)

function lot(changes: Partial<ProcedureInput>, rows = ['wafer,site,x_mm,y_mm,current_A,voltage_V,current_rev_A,voltage_rev_V,temperature_C', '1,1,60,20,0.001,0.02,-0.001,-0.0201,24.5', '1,2,85,36,0.001,0.021,-0.001,-0.021,24.4']) {
  const procedure = { format: 'persquare-procedure/1', wafer: { diameterMm: 200, thicknessUm: 700 }, probe: { spacingMm: 1.59 }, temperature: { coefficientPercentPerC: 0.3 }, ...changes }
  const { analysis, problems } = run({ readings: [{ name: 'a.csv', bytes: bytes(rows.join('\n')), sha256: '' }], procedure: { name: 'p.json', bytes: bytes(JSON.stringify(procedure)) } })
  expect(problems.filter(({ kind }) => kind !== 'flagged-sites')).toEqual([])
  return analysis!
} // prettier-ignore

const EVERYTHING = {
  currentRel: 0.002, voltageRel: 0.003, thermalEmfUV: 30, spacingMm: 0.01, spacingWanderMm: 0.01, orientationDeg: 2, thicknessUm: 5, temperatureC: 0.5,
  temperatureCoefficientPercentPerC: 0.05, diameterMm: 0.3, positionMm: 0.4, repeatabilityRel: 0.002,
} // prettier-ignore

describe('a site’s budget held against the pipeline itself', () => {
  it.each(Object.keys(EVERYTHING) as (keyof typeof EVERYTHING)[])('%s alone moves the result as its line says', (component) => {
    const bulk = { layer: { kind: 'bulk', dopant: 'phosphorus' } as const, uncertainty: { [component]: EVERYTHING[component] } }
    const analysis = lot(bulk)
    // Near the rim, where place, size and direction matter.
    const { firstOrder, monteCarlo: found } = checkSite(analysis, 1, { trials: 4000, seed: 11 })
    const ratio = found.standardUncertainty / firstOrder.standardUncertainty
    // 4000 trials know a standard deviation to 1.1 %; near the rim the second order adds a little.
    expect(Math.abs(ratio - 1)).toBeLessThan(0.06)
  })

  it('agrees with all of them together, of a sheet and of a bulk wafer', () => {
    for (const layer of [{ kind: 'sheet' }, { kind: 'bulk', dopant: 'boron' }] as const) {
      const { agreement: said, firstOrder, monteCarlo: found } = checkSite(lot({ layer, uncertainty: EVERYTHING }), 0, { trials: 20_000, seed: 5 })
      expect(found.standardUncertainty / firstOrder.standardUncertainty).toBeCloseTo(1, 1)
      expect(said.isFirstOrderEnough, said.sentence).toBe(true)
    }
  })

  it('agrees with the working: the same combined uncertainty', () => {
    const analysis = lot({ uncertainty: EVERYTHING })
    const { expanded, budget } = siteWorking(analysis, 0)
    expect(expanded.standard * analysis.sites.value[0]).toBeCloseTo(analysis.sites.u[0], 12)
    expect(budget.reduce((total, { share }) => total + share, 0)).toBeCloseTo(1, 12)
    expect(checkSite(analysis, 0, { trials: 1000 }).firstOrder.standardUncertainty).toBeCloseTo(analysis.sites.u[0], 12)
  })

  it('says that the first order is not enough where pins may stand off the wafer', () => {
    const edge = ['wafer,site,x_mm,y_mm,current_A,voltage_V', '1,1,97.4,0,0.001,0.03']
    const { agreement: said } = checkSite(lot({ uncertainty: { positionMm: 0.3 } }, edge), 0, { trials: 5000 })
    expect(said.isFirstOrderEnough).toBe(false)
  })

  it('takes the repeatability from the two polarities', () => {
    const rows = Array.from({ length: 60 }, (_, k) => `1,${k + 1},${k - 30},0,0.001,${0.02 + 2e-5 * Math.sin(k * 7)},-0.001,${-0.02 + 1e-5}`)
    const analysis = lot({ uncertainty: { repeatabilityRel: 'readings' } }, ['wafer,site,x_mm,y_mm,current_A,voltage_V,current_rev_A,voltage_rev_V', ...rows])
    // The difference of the two has the standard deviation 2e-5/root 2 of 0.02; the mean of both half of that.
    expect(analysis.repeatability!.relative).toBeCloseTo(2e-5 / Math.SQRT2 / 0.02 / 2, 5)
    expect(analysis.repeatability!.degreesOfFreedom).toBe(59)
    expect(siteWorking(analysis, 0).budget[0]).toMatchObject({ component: 'repeatabilityRel', evaluation: 'A', degreesOfFreedom: 59, shared: false })
  })

  it('refuses a value that the file reports ready made', () => {
    const reported = lot({ uncertainty: { reportedRel: 0.01 } }, ['wafer,site,x_mm,y_mm,sheet_resistance_ohm_sq', '1,1,0,0,90'])
    expect(() => checkSite(reported, 0)).toThrow(expect.objectContaining({ problem: expect.objectContaining({ kind: 'not-applicable' }) as object }))
  })
}) // prettier-ignore
