import { describe, expect, it } from 'vitest'
import { judgeLot } from '../../../core/conformity/judge-lot'
import type { WaferJudgement, WaferLimits } from '../../../core/conformity/judge-wafer'
import { lotSentence } from '../../../core/conformity/lot-sentence'
import { summarize } from '../../../core/statistics/summarize'
import { LIMITS, edgyWafer, goodWafer, judge, waferOf } from './wafers'

function tell(wafers: readonly WaferJudgement[], limits: WaferLimits = LIMITS): string {
  const { verdict } = judgeLot(wafers, limits)
  const means = wafers.map((wafer) => wafer.statistics.mean).filter((mean) => !Number.isNaN(mean))
  return lotSentence({ lot: 'TB-0417', verdict, wafers, statistics: summarize(Float64Array.from(means)), unit: 'Ω/sq' })
}

const good = (count: number) => Array.from({ length: count }, (_, i) => goodWafer(`g${i}`))

describe('the sentence', () => {
  it('names the wafer, the side and the place', () => {
    expect(tell([edgyWafer('07'), ...good(24)])).toBe(
      'TB-0417 is out of spec: wafer 07 reads high at the edge (43 of 49 sites in, mean 93.3 Ω/sq, 2.3 % spread); 24 wafers are in spec.',
    )
  })

  it('says no place where the sites out are elsewhere too', () => {
    const low = waferOf('7', (r, site) => (site === 0 || r > 90 ? 86 : 92))
    expect(tell([low, ...good(1)])).toBe(
      'TB-0417 is out of spec: wafer 7 reads low (24 of 49 sites in, mean 88.9 Ω/sq, 3.4 % spread); 1 wafer is in spec.',
    )
  })

  it('of both sides, of a mean alone, of uniformity alone', () => {
    const both = waferOf('a', (_, site) => (site === 3 ? 86 : site === 4 ? 98 : 92))
    expect(tell([both])).toMatch(
      /^TB-0417 is out of spec: wafer a reads both high and low \(47 of 49 sites in, .*\)\.$/,
    )
    expect(tell([waferOf('b', () => 96)])).toContain('wafer b has a high mean (49 of 49 sites in, mean 96.0 Ω/sq')
    expect(tell([waferOf('c', (_, site) => (site % 2 ? 88 : 96))])).toContain('wafer c is not uniform enough (49 of 49')
  })

  it('names the three worst and counts the rest', () => {
    const outBy = (id: string, sites: number) => waferOf(id, (_, site) => (site < sites ? 98 : 92))
    const sentence = tell([outBy('1', 1), outBy('2', 5), outBy('3', 3), outBy('4', 4), outBy('5', 2), ...good(2)])
    expect(sentence).toMatch(
      /wafer 2 reads high \(.*\), wafer 4 reads high \(.*\) and wafer 3 reads high \(.*\); 2 more wafers are out of spec; 2 wafers are in spec\.$/,
    )
    expect(tell([1, 2, 3, 4].map((n) => outBy(`${n}`, n)))).toMatch(/; 1 more wafer is out of spec\.$/)
  })

  it('in spec', () => {
    expect(tell(good(25))).toBe('TB-0417 is in spec: all 25 wafers, mean 92.24 Ω/sq.')
    expect(tell([goodWafer('07')])).toBe('TB-0417 is in spec: wafer 07, mean 92.24 Ω/sq.')
  })

  it('undecided', () => {
    const unread = judge('08', Float64Array.of(NaN), LIMITS)
    const single = judge('Wafer 9', Float64Array.of(92), LIMITS)
    expect(tell([unread, single, ...good(3)])).toBe(
      "TB-0417 is undecided: wafer 08 has no usable reading and Wafer 9 can't be decided; 3 wafers are in spec.",
    )
    expect(tell([edgyWafer('07'), unread])).toMatch(/spread\); 1 wafer is undecided\.$/)
  })

  it('not assessed', () => {
    const limits = { allowedSitesOut: 0 }
    const wafers = [judge('1', Float64Array.of(92), limits), judge('2', Float64Array.of(94), limits)]
    expect(tell(wafers, limits)).toBe(
      'TB-0417 was not assessed: the procedure sets no limits (2 wafers, mean 93.00 Ω/sq).',
    )
    expect(tell([])).toBe('TB-0417 was not assessed: no wafer has readings.')
  })

  it('speaks of sites in only where sites have limits', () => {
    const limits = { mean: { upper: 95 }, allowedSitesOut: 0 }
    expect(tell([judge('1', Float64Array.of(96, 98), limits)], limits)).toBe(
      'TB-0417 is out of spec: wafer 1 has a high mean (2 sites, mean 97.0 Ω/sq, 1.5 % spread).',
    )
  })
})
