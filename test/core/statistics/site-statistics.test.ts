import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { areaWeighted } from '../../../core/statistics/area-weighted'
import { capability } from '../../../core/statistics/capability'
import { meanInterval } from '../../../core/statistics/intervals'
import { andersonDarling } from '../../../core/statistics/normality'
import { siteAreas } from '../../../core/statistics/site-areas'
import { siteStatistics, type SitesToDescribe } from '../../../core/statistics/site-statistics'
import { summarize } from '../../../core/statistics/summarize'
import { concentricPlan } from '../../../core/wafer/site-patterns'

const plan = concentricPlan({ circles: 4, outerRadius_mm: 95 })
const values = plan.x_mm.map((x, i) => 92 + (x * x + plan.y_mm[i] ** 2) / 5000 + Math.sin(17 * i * i))
const wafer: SitesToDescribe = {
  values,
  x_mm: plan.x_mm,
  y_mm: plan.y_mm,
  outline: { shape: 'disc', diameter_mm: 200, fiducial: 'notch' },
  edgeExclusion_mm: 3,
  limits: { lower: 88, upper: 96 },
}
const reasons = (sites: SitesToDescribe) =>
  Object.fromEntries(siteStatistics(sites).missing.map(({ figure, why }) => [figure, why]))

describe('one record', () => {
  it('gathers what each calculation gives on its own', () => {
    const found = siteStatistics(wafer)
    const { mean, standardDeviation, count } = summarize(values)
    const { area_mm2 } = siteAreas({ ...plan, region: { shape: 'disc', radius_mm: 97 } })
    expect(found).toMatchObject({ count, mean, standardDeviation, missing: [] })
    expect(found.meanInterval).toEqual(meanInterval({ mean, standardDeviation, count, level: 0.95 }))
    expect(found.areaWeighted).toEqual({ method: 'rings', ...areaWeighted({ values, weights: area_mm2 }) })
    expect(found.capability).toEqual(capability({ mean, standardDeviation, count, limits: wafer.limits! }))
    expect(found.normality).toEqual(andersonDarling(values))
    expect(found.outliers!.steps).toHaveLength(8)
    expect(found.radialVariation!.nearEdge!.variationPercent).toBeGreaterThan(0)
  })

  it('names rows of the columns given, not of the rows that count', () => {
    const spiked = values.map((v, i) => (i === 40 ? 150 : v))
    const indices = Uint32Array.from({ length: 41 }, (_, i) => i + 20)
    expect(siteStatistics({ ...wafer, values: spiked, indices }).outliers!.rows[0]).toBe(40)
  })

  it('the confidence is that of every interval', () => {
    const found = siteStatistics({ ...wafer, confidence: 0.9 })
    expect([
      found.meanInterval!.level,
      found.standardDeviationInterval!.level,
      found.capability!.cpk.interval.level,
    ]).toEqual([0.9, 0.9, 0.9])
  })
})

describe('what is not defined is null, with a reason', () => {
  it('no site', () => {
    const found = siteStatistics({ ...wafer, indices: new Uint32Array(0) })
    expect(found.missing).toHaveLength(9)
    expect(found.mean).toBeNull()
  })

  it('one site', () => {
    const found = siteStatistics({ ...wafer, indices: Uint32Array.of(0) })
    expect([found.mean, found.standardDeviation, found.areaWeighted!.mean]).toEqual([92, null, 92])
    expect(found.missing.map(({ figure }) => figure)).not.toContain('areaWeighted')
  })

  it('five sites: too few for the test of normality', () => {
    expect(reasons({ ...wafer, indices: Uint32Array.of(0, 1, 3, 5, 7) })).toEqual({
      normality: 'it needs 8 sites or more, not 5',
      radialVariation: 'it needs values above 0 at the centre, and at half the radius or near the edge',
    })
  })

  it('one value throughout', () => {
    const why = 'all sites have one value'
    expect(reasons({ ...wafer, values: new Float64Array(81).fill(92) })).toEqual({
      outliers: why,
      capability: why,
      normality: why,
    })
  })

  it.each([
    ['no places', { x_mm: null, y_mm: null }, 'the places of the sites are not known'],
    ['a site without a place', { x_mm: plan.x_mm.map((x, i) => (i === 3 ? NaN : x)) }, 'a site has no place'],
    ['no edges', { outline: { shape: 'infinite' } }, 'the edges are not known'],
    ['a site in the edge exclusion', { edgeExclusion_mm: 8 }, 'a site lies outside the usable area'],
    ['no usable area', { edgeExclusion_mm: 100 }, 'the edge exclusion leaves no area'],
  ] as const)('%s', (_, change, why) => {
    expect(reasons({ ...wafer, ...change }).areaWeighted).toBe(why)
  })

  it('no limits, a plate', () => {
    const plate = { ...wafer, limits: {}, outline: { shape: 'rectangle', width_mm: 200, height_mm: 200 } } as const
    expect(reasons(plate)).toEqual({
      capability: 'there are no limits',
      radialVariation: 'only a round wafer has a radius',
    })
    expect(siteStatistics(plate).areaWeighted!.method).toBe('cells')
  })
})

describe('laws', () => {
  it('has no NaN whatever counts, and one reason for each null', () => {
    const rows = fc.uniqueArray(fc.integer({ min: 0, max: 80 }), { maxLength: 81 })
    fc.assert(
      fc.property(rows, fc.integer({ min: 0, max: 3 }), (rows, steps) => {
        const coarse = steps === 0 ? values : values.map((v) => Math.round(v / steps))
        const found = siteStatistics({ ...wafer, values: coarse, indices: Uint32Array.from(rows) })
        JSON.stringify(found, (_, value: unknown) => {
          if (typeof value === 'number') expect(Number.isFinite(value)).toBe(true)
          return value
        })
        const nulls = Object.entries(found).filter(([, value]) => value === null)
        expect(found.missing.map(({ figure }) => figure).sort()).toEqual(nulls.map(([figure]) => figure).sort())
      }),
    )
  })
})

describe('refusals', () => {
  it('a NaN that counts, a confidence of 1', () => {
    expect(() => siteStatistics({ ...wafer, values: values.map((v, i) => (i === 3 ? NaN : v)) })).toThrow(CoreError)
    expect(() => siteStatistics({ ...wafer, confidence: 1 })).toThrow(CoreError)
  })
})
