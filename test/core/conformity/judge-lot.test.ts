import { describe, expect, it } from 'vitest'
import { judgeLot } from '../../../core/conformity/judge-lot'
import { LIMITS, edgyWafer, goodWafer, judge } from './wafers'

const undecided = judge('9', Float64Array.of(92), LIMITS)
const unread = judge('8', Float64Array.of(NaN), LIMITS)

describe('the verdict on a lot', () => {
  it('in spec where every wafer is', () => {
    expect(judgeLot([goodWafer('1'), goodWafer('2')], LIMITS)).toEqual({
      verdict: 'in-spec',
      reasons: ['all 2 wafers are in spec'],
    })
  })

  it('one wafer out outweighs everything, and its reason comes first', () => {
    const { verdict, reasons } = judgeLot([unread, goodWafer('1'), edgyWafer('7')], LIMITS)
    expect(verdict).toBe('out-of-spec')
    expect(reasons[0]).toBe('wafer 7: 6 of 49 sites outside 87 to 97 Ω/sq (all above)')
    expect(reasons[1]).toBe('wafer 8: no site has a usable reading')
  })

  it.each([
    ['an undecided wafer', undecided],
    ['a wafer that was not assessed', unread],
  ])('undecided with %s', (_, wafer) => {
    expect(judgeLot([goodWafer('1'), wafer], LIMITS).verdict).toBe('undecided')
  })

  it('not assessed without limits, or without wafers', () => {
    const noLimits = { allowedSitesOut: 0 }
    expect(judgeLot([judge('1', Float64Array.of(92), noLimits)], noLimits)).toEqual({
      verdict: 'not-assessed',
      reasons: ['the procedure sets no limits'],
    })
    expect(judgeLot([], LIMITS).verdict).toBe('not-assessed')
  })
})
