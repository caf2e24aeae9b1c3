import { describe, expect, it } from 'vitest'
import { judgeWafer } from '../../../core/conformity/judge-wafer'
import { LIMITS, edgyWafer, goodWafer, judge, waferOf } from './wafers'

describe('the verdict on a wafer', () => {
  it('in spec, with everything that was judged', () => {
    const { verdict, reasons } = goodWafer('03')
    expect(verdict).toBe('in-spec')
    expect(reasons).toEqual([
      'wafer 03: 49 of 49 sites inside 87 to 97 Ω/sq',
      'wafer 03: mean 92.24 Ω/sq inside 89 to 95 Ω/sq',
      'wafer 03: non-uniformity 0.15 % within the limit of 3 % (100 s / mean)',
    ])
  })

  it('out of spec by its sites', () => {
    const { verdict, reasons } = edgyWafer('07')
    expect(verdict).toBe('out-of-spec')
    expect(reasons).toEqual(['wafer 07: 6 of 49 sites outside 87 to 97 Ω/sq (all above)'])
  })

  it('out of spec by its mean and its uniformity, sites within their allowance', () => {
    const limits = { ...LIMITS, allowedSitesOut: 30 }
    const { verdict, reasons } = waferOf('12', (_, site) => (site % 2 === 0 ? 85 : 90), limits)
    expect(verdict).toBe('out-of-spec')
    expect(reasons).toEqual(['wafer 12: mean 87.45 Ω/sq below the limit of 89 Ω/sq'])
    const uneven = waferOf('12', (_, site) => (site % 2 === 0 ? 85 : 97), limits)
    expect(uneven.reasons).toEqual(['wafer 12: non-uniformity 6.67 % above the limit of 3 % (100 s / mean)'])
  })

  it('one site more than allowed decides, as many as allowed do not', () => {
    const limits = { ...LIMITS, allowedSitesOut: 2, uniformity: undefined }
    expect(waferOf('12', (_, site) => (site < 2 ? 98 : 92), limits).verdict).toBe('in-spec')
    const third = waferOf('12', (_, site) => (site < 3 ? 98 : 92), limits)
    expect(third.verdict).toBe('out-of-spec')
    expect(third.reasons).toEqual(['wafer 12: 3 of 49 sites outside 87 to 97 Ω/sq (all above), 2 allowed'])
  })

  it('exactly on every limit is in spec', () => {
    const limits = { site: { lower: 87, upper: 97 }, mean: { lower: 92, upper: 92 }, allowedSitesOut: 0 }
    expect(judge('1', Float64Array.of(87, 97), limits).verdict).toBe('in-spec')
  })

  it('a mean that rounds to its limit is told with more digits', () => {
    const limits = { mean: { upper: 95 }, allowedSitesOut: 0 }
    expect(judge('1', Float64Array.of(95.0004), limits).reasons).toEqual([
      'wafer 1: mean 95.0004 Ω/sq above the limit of 95 Ω/sq',
    ])
  })

  it('uniformity of one site is undecided', () => {
    const { verdict, reasons } = judge('1', Float64Array.of(92), LIMITS)
    expect(verdict).toBe('undecided')
    expect(reasons).toEqual(["wafer 1: non-uniformity (100 s / mean) can't be told from 1 site"])
  })

  it('undecided sites make the wafer so, unless the allowance covers them or those that are out decide already', () => {
    const { statistics } = goodWafer('3')
    const withSites = (out: number, undecided: number, allowedSitesOut: number) => {
      const counts = { 'in-spec': 49 - out - undecided, 'out-of-spec': out, undecided, 'not-assessed': 0 }
      const findings = { counts, above: out, below: 0, outOnlyAtEdge: false }
      return judgeWafer({ id: '3', findings, statistics, limits: { ...LIMITS, allowedSitesOut }, unit: 'Ω/sq' })
    }
    expect(withSites(0, 2, 0)).toMatchObject({
      verdict: 'undecided',
      reasons: ['wafer 3: 2 of 49 sites undecided, in the guard band'],
    })
    expect(withSites(0, 2, 2).verdict).toBe('in-spec')
    expect(withSites(1, 2, 2).verdict).toBe('undecided')
    expect(withSites(3, 2, 2).verdict).toBe('out-of-spec')
  })

  it('a site without a reading is said and does not decide', () => {
    const { verdict, reasons } = judge('1', Float64Array.of(92, NaN, 98), { ...LIMITS, uniformity: undefined })
    expect(verdict).toBe('out-of-spec')
    expect(reasons).toEqual([
      'wafer 1: 1 of 2 sites outside 87 to 97 Ω/sq (above)',
      'wafer 1: 1 of 3 sites has no usable reading',
    ])
  })

  it('not assessed without limits, or without a reading', () => {
    const noLimits = judge('1', Float64Array.of(92, 93), { allowedSitesOut: 0, site: {} })
    expect(noLimits).toMatchObject({ verdict: 'not-assessed', reasons: ['wafer 1: the procedure sets no limits'] })
    const noReading = judge('1', Float64Array.of(NaN), LIMITS)
    expect(noReading).toMatchObject({ verdict: 'not-assessed', reasons: ['wafer 1: no site has a usable reading'] })
  })
})
