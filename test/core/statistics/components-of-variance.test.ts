import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { analysisOfVariance } from '../../../core/statistics/analysis-of-variance'
import { componentInterval } from '../../../core/statistics/component-interval'
import { componentsOfVariance } from '../../../core/statistics/components-of-variance'
import { standardDeviationInterval } from '../../../core/statistics/intervals'
import { summarize } from '../../../core/statistics/summarize'
import { STRD_ANOVA, strdRows } from '../../reference/nist-strd'

const byFives = (count: number) => Array.from({ length: count / 5 }, (_, w) => Uint32Array.of(5 * w, 5 * w + 1, 5 * w + 2, 5 * w + 3, 5 * w + 4)) // prettier-ignore

describe('published values', () => {
  it('NIST StRD SiRstv: from the certified mean squares, (MSB - MSW) / 5', () => {
    const certified = STRD_ANOVA.find(({ set }) => set === 'sirstv')!
    const values = Float64Array.from(strdRows('strd-anova-sirstv'), ([, y]) => Number(y))
    const { withinWafer, betweenWafers } = componentsOfVariance(values, byFives(25))!
    const [msBetween, msWithin] = [certified.ssBetween / 4, certified.ssWithin / 20]
    expect(withinWafer.variance).toBeCloseTo(msWithin, 13)
    expect(withinWafer.standardDeviation).toBeCloseTo(certified.residualStandardDeviation, 12)
    expect(betweenWafers.variance).toBeCloseTo((msBetween - msWithin) / 5, 13)
    expect([withinWafer.degreesOfFreedom, betweenWafers.degreesOfFreedom]).toEqual([20, 4])
  })
})

describe('intervals', () => {
  const values = Float64Array.from(strdRows('strd-anova-sirstv'), ([, y]) => Number(y))

  it('SiRstv: within by chi-square of 20; between from 0, for F = 1.18 is not significant', () => {
    const { withinWafer, betweenWafers } = componentsOfVariance(values, byFives(25))!
    const within = standardDeviationInterval({ ...withinWafer, level: 0.95 })
    expect(withinWafer.interval.lower).toBeCloseTo(within.lower, 12)
    expect(withinWafer.interval.upper).toBeCloseTo(within.upper, 12)
    expect(betweenWafers.interval.lower).toBe(0)
    expect(betweenWafers.interval.upper).toBeGreaterThan(betweenWafers.standardDeviation)
  })

  it('of equal numbers of sites, between is that of the mean squares', () => {
    const wafers = byFives(25)
    const { between, within } = analysisOfVariance(values, wafers)
    const { lower, upper } = componentInterval({ larger: between, smaller: within, divisor: 5, level: 0.5 })
    const { betweenWafers } = componentsOfVariance(values, wafers, 0.5)!
    expect(betweenWafers.interval.lower ** 2).toBeCloseTo(lower, 12)
    expect(betweenWafers.interval.upper ** 2).toBeCloseTo(upper, 12)
  })

  it('of unequal numbers, that of the unweighted means and the harmonic mean of the numbers', () => {
    const wafers = [Uint32Array.of(0, 1), Uint32Array.of(5, 6, 7), Uint32Array.of(10, 11, 12, 13, 14, 15)]
    const means = Float64Array.from(wafers, (rows) => summarize(values, rows).mean)
    const larger = { meanSquare: 3 * summarize(means).standardDeviation ** 2, degreesOfFreedom: 2 }
    const smaller = analysisOfVariance(values, wafers).within
    const { upper } = componentInterval({ larger, smaller, divisor: 3, level: 0.95 })
    expect(componentsOfVariance(values, wafers)!.betweenWafers.interval.upper ** 2).toBeCloseTo(upper, 11)
  })
})

describe('limits', () => {
  it('wafers whose sites do not vary: all of it is between, exactly the variance of the means', () => {
    const values = Float64Array.of(90, 90, 92, 92, 94, 94)
    const lot = componentsOfVariance(values, [Uint32Array.of(0, 1), Uint32Array.of(2, 3), Uint32Array.of(4, 5)])!
    expect(lot.withinWafer.variance).toBe(0)
    expect(lot.betweenWafers.variance).toBeCloseTo(4, 14)
  })

  it('wafers with one and the same mean: a negative component, left so, with no standard deviation', () => {
    const values = Float64Array.of(90, 94, 91, 93)
    const lot = componentsOfVariance(values, [Uint32Array.of(0, 1), Uint32Array.of(2, 3)])!
    // MSW = (8 + 2) / 2 = 5, MSB = 0, n0 = 2.
    expect(lot.withinWafer.variance).toBe(5)
    expect(lot.betweenWafers.variance).toBe(-2.5)
    expect(lot.betweenWafers.standardDeviation).toBeNaN()
  })

  it.each([
    ['one wafer', [Uint32Array.of(0, 1)]],
    ['one site a wafer', [Uint32Array.of(0), Uint32Array.of(1)]],
    ['one wafer with sites, one without', [Uint32Array.of(0, 1), new Uint32Array(0)]],
    ['nothing', []],
  ])('%s cannot say', (_, wafers) => {
    expect(componentsOfVariance(Float64Array.of(1, 2), wafers)).toBeNull()
  })
})

describe('laws', () => {
  it('do not move with a shift of all values, and go as the square of the unit', () => {
    const column = fc.array(fc.double({ min: 50, max: 150, noNaN: true }), { minLength: 20, maxLength: 20 })
    fc.assert(
      fc.property(column, fc.integer({ min: -40, max: 400 }), (values, shift) => {
        const lot = componentsOfVariance(Float64Array.from(values), byFives(20))!
        const shifted = componentsOfVariance(Float64Array.from(values, (v) => v + shift), byFives(20))! // prettier-ignore
        const doubled = componentsOfVariance(Float64Array.from(values, (v) => 2 * v), byFives(20))! // prettier-ignore
        expect(shifted.betweenWafers.variance).toBeCloseTo(lot.betweenWafers.variance, 7)
        expect(doubled.betweenWafers.variance).toBe(4 * lot.betweenWafers.variance)
        expect(doubled.withinWafer.variance).toBe(4 * lot.withinWafer.variance)
      }),
    )
  })
})
