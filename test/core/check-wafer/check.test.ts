import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { checkHistory, standingAt } from '../../../core/check-wafer/check'
import { checkWords, standingWords } from '../../../core/check-wafer/check-words'
import { checkObject } from '../../../core/check-wafer/check-object'
import { readHistory, type CheckHistory } from '../../../core/check-wafer/history'
import { movingAverage } from '../../../core/check-wafer/moving-average'
import { brokenRules } from '../../../core/check-wafer/run-rules'
import { CHECK_WAFER_137, EWMA_EXAMPLE } from '../../reference/nist-gauge-study'

const NIST = join(import.meta.dirname, '..', '..', 'reference', 'nist')
const fileOf = (text: string) => ({ name: 'check.csv', bytes: new TextEncoder().encode(text), sha256: '' })

function historyOf(text: string): CheckHistory {
  const { history, problems } = readHistory(fileOf(text))
  expect(problems).toEqual([])
  return history!
}

describe('check wafer 137 with probe 2362 (NIST/SEMATECH e-Handbook 2.6.2)', () => {
  const history = historyOf(readFileSync(join(NIST, 'check-wafer-137.csv'), 'utf8'))
  const result = checkHistory(history)

  it('has the published limits', () => {
    const { limits } = result
    const near = (value: number, printed: { value: number; half: number }): void => expect(Math.abs(value - printed.value)).toBeLessThanOrEqual(printed.half)
    near(limits.centerLine, CHECK_WAFER_137.centerLine)
    near(limits.lowerLimit, CHECK_WAFER_137.lowerLimit)
    near(limits.upperLimit, CHECK_WAFER_137.upperLimit)
    near(limits.standardDeviation, CHECK_WAFER_137.standardDeviation)
    near(limits.repeatability!, CHECK_WAFER_137.repeatability)
    near(limits.precisionUpperLimit!, CHECK_WAFER_137.precisionUpperLimit)
    expect([limits.degreesOfFreedom, limits.repeatabilityDegreesOfFreedom]).toEqual([24, 125])
  })

  it('finds the two values and the two spreads outside (recomputed from the data)', () => {
    const outside = (chart: string) => result.alarms.filter((alarm) => alarm.chart === chart && alarm.rule === 'outside-limits').map(({ value }) => value)
    expect(outside('value').sort()).toEqual([97.014, 97.016])
    expect(outside('precision').sort()).toEqual([0.116, 0.117])
    // Rows of the file: 6, 8 and 20.
    expect(new Set(result.alarms.map(({ index }) => index))).toEqual(new Set([6, 8, 20]))
  })

  it('takes the occasions in the order of time, which is not that of the file', () => {
    expect([...history.order]).not.toEqual([...history.order].sort((a, b) => a - b))
    const times = [...history.order].map((row) => history.when[row])
    expect(times).toEqual([...times].sort())
  })

  it('is written whole', () => {
    const object = checkObject(result) as Record<string, unknown>
    for (const key of ['centerLine', 'lowerLimit', 'upperLimit', 'precisionUpperLimit', 'alarms']) expect(object).toHaveProperty(key)
    expect(JSON.stringify(object)).not.toContain('NaN')
  })
}) // prettier-ignore

describe('the moving average', () => {
  const rows = readFileSync(join(NIST, 'handbook-ewma.csv'), 'utf8').trim().split('\n').slice(2).map((row) => row.split(',').map(Number))
  const values = rows.map(([, y]) => y)

  it('is the published one (e-Handbook 6.3.2.4)', () => {
    const { average, steadyLower, steadyUpper } = movingAverage({ values, ...EWMA_EXAMPLE })
    rows.forEach(([, , printed], i) => expect(Math.abs(average[i] - printed)).toBeLessThanOrEqual(0.00501))
    // The page truncates the factor root(0.3/1.7) = 0.42008 to 0.4201 and so prints 52.5884 and 47.4115.
    expect(Math.abs(steadyUpper - EWMA_EXAMPLE.upper)).toBeLessThan(2e-4)
    expect(Math.abs(steadyLower - EWMA_EXAMPLE.lower)).toBeLessThan(2e-4)
  })

  it('begins with the limits of a single value times lambda, and widens to the steady ones', () => {
    const { lower, upper, steadyUpper } = movingAverage({ values, ...EWMA_EXAMPLE })
    expect(upper[0] - 50).toBeCloseTo(3 * 2.0539 * 0.3, 12)
    expect(50 - lower[0]).toBeCloseTo(upper[0] - 50, 12)
    upper.forEach((limit, i) => expect(limit).toBeGreaterThan(i === 0 ? 50 : upper[i - 1]))
    expect(upper[19]).toBeCloseTo(steadyUpper, 3)
  })

  it('with lambda 1 is the values and their own limits', () => {
    const { average, upper } = movingAverage({ values, centre: 50, standardDeviation: 2, lambda: 1, width: 3 })
    expect([...average]).toEqual(values)
    expect(new Set(upper)).toEqual(new Set([56]))
  })
}) // prettier-ignore

describe('the run rules', () => {
  const last = (scores: number[]) => brokenRules(scores).at(-1)
  it.each([
    ['a point beyond three', [0, 3.1], ['beyond-3-sigma']],
    ['on either side', [0, -3.1], ['beyond-3-sigma']],
    ['two of three beyond two', [2.1, 0, 2.2], ['2-of-3-beyond-2-sigma']],
    ['not on both sides', [2.1, 0, -2.2], []],
    ['four of five beyond one', [-1.1, -1.2, 0.5, -1.3, -1.4], ['4-of-5-beyond-1-sigma']],
    ['eight on one side', [0.1, 0.3, 0.2, 0.4, 0.1, 0.3, 0.2, 0.4], ['8-on-one-side']],
    ['seven are none', [0.1, 0.3, 0.2, 0.4, 0.1, 0.3, 0.2], []],
    ['six rising', [-0.5, -0.3, -0.1, 0.1, 0.3, 0.5], ['6-rising-or-falling']],
    ['six falling', [0.5, 0.3, 0.1, -0.1, -0.3, -0.5], ['6-rising-or-falling']],
    ['fourteen in turn', Array.from({ length: 14 }, (_, k) => (k % 2 ? 0.5 : -0.5)), ['14-alternating']],
  ])('%s', (_, scores, broken) => expect(last(scores)).toEqual(broken))

  it('alarm for a sound process about as often as their theory says: beyond three sigma once in 370', () => {
    let state = 12345
    const uniform = (): number => (state = (state * 48271) % 2147483647) / 2147483647
    const scores = Array.from({ length: 40_000 }, () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform()))
    const beyond = scores.filter((score) => Math.abs(score) > 3).length
    expect(brokenRules(scores.slice(0, 4000)).filter((rules) => rules.includes('beyond-3-sigma')).length).toBe(scores.slice(0, 4000).filter((s) => Math.abs(s) > 3).length)
    // Two-sided normal tail, 0.0027: 108 of 40,000 with a standard deviation of 10.
    expect(Math.abs(beyond - 108)).toBeLessThan(42)
  })
}) // prettier-ignore

describe('false alarms of a sound process, from seeded normal values', () => {
  const normal = (seed: number) => {
    let state = seed
    const uniform = (): number => (state = (state * 48271) % 2147483647) / 2147483647
    return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform())
  }
  /** Occasions until the first alarm, over many histories. */
  const meanRunLength = (runs: number, next: () => number, alarmAt: (values: readonly number[]) => number): number => {
    let sum = 0
    for (let run = 0; run < runs; run++) {
      const values = Array.from({ length: 4000 }, next)
      const at = alarmAt(values)
      if (at < 0) throw new Error('no alarm in 4,000 occasions')
      sum += at + 1
    }
    return sum / runs
  }
  const firstOutside = (lambda: number, width: number) => (values: readonly number[]) => {
    const { average, lower, upper } = movingAverage({ values, centre: 0, standardDeviation: 1, lambda, width })
    return average.findIndex((value, i) => value < lower[i] || value > upper[i])
  }
  // Run lengths are near geometric: the mean of 400 has a standard error of a twentieth.
  it('the value alone alarms after 370 occasions on average (1/0.0027)', () => {
    const length = meanRunLength(400, normal(7), firstOutside(1, 3))
    expect(Math.abs(length / 370.4 - 1)).toBeLessThan(0.15)
  })

  it('the moving average as an integral equation of its run length says', () => {
    const length = meanRunLength(400, normal(11), firstOutside(0.3, 3))
    expect(Math.abs(length / steadyRunLength(0.3, 3, 0) - 1)).toBeLessThan(0.16)
    const shifted = normal(13)
    const seen = meanRunLength(400, () => 1 + shifted(), firstOutside(0.3, 3))
    // Limits that are narrow at first see a shift a little sooner than the steady ones.
    expect(seen / steadyRunLength(0.3, 3, 1)).toBeGreaterThan(0.75)
    expect(seen / steadyRunLength(0.3, 3, 1)).toBeLessThan(1.1)
  })

  /**
   * Mean run length of a moving average between steady limits: L(u) = 1 + integral of L(v) f((v - (1 - lambda) u)/lambda) / lambda,
   * solved at midpoints by fixed-point sweeps. Crowder, Technometrics 29, 4 (1987), from memory.
   */
  function steadyRunLength(lambda: number, width: number, shift: number): number {
    const half = width * Math.sqrt(lambda / (2 - lambda))
    const count = 81
    const step = (2 * half) / count
    const nodes = Array.from({ length: count }, (_, k) => -half + (k + 0.5) * step)
    const density = (z: number) => Math.exp(-z * z / 2) / Math.sqrt(2 * Math.PI)
    const kernel = nodes.map((u) => nodes.map((v) => (density((v - (1 - lambda) * u) / lambda - shift) / lambda) * step))
    let lengths = nodes.map(() => 1)
    for (let sweep = 0; sweep < 20_000; sweep++) {
      const next = kernel.map((row) => 1 + row.reduce((sum, weight, k) => sum + weight * lengths[k], 0))
      const change = Math.abs(next[40] / lengths[40] - 1)
      lengths = next
      if (change < 1e-9) break
    }
    return lengths[40]
  }
}) // prettier-ignore

describe('a history', () => {
  const made = (values: readonly number[]): string =>
    ['time,wafer,probe,value,standard_deviation,count', ...values.map((v, k) => `2026-03-${String(k + 1).padStart(2, '0')}T08:00:00Z,C1,P7,${v},0.05,6`)].join('\n')
  const steady = [90.02, 89.97, 90.05, 89.99, 90.01, 89.95, 90.03, 89.98, 90.04, 89.96]

  it('judges later occasions by the baseline, and says from when a lot is doubtful', () => {
    const result = checkHistory(historyOf(made([...steady, 90.2, 90.25, 90.0])), { baseline: 10 })
    const day = (n: number, hour = 12) => Date.UTC(2026, 2, n, hour)
    expect(result.limits.baseline).toBe(10)
    expect(new Set(result.alarms.filter(({ chart }) => chart === 'value').map(({ index }) => index))).toEqual(new Set([11, 12]))
    expect(standingAt(result, day(9)).state).toBe('in-control')
    expect(standingAt(result, day(11))).toMatchObject({ state: 'alarm', place: 11, byTime: true })
    expect(standingAt(result, day(12))).toMatchObject({ state: 'alarm', place: 12 })
    expect(standingAt(result, Date.UTC(2026, 1, 1)).state).toBe('before-history')
    expect(standingAt(result, NaN)).toMatchObject({ place: 13, byTime: false })
  })

  it('says that a lot is doubtful that an alarm fell into, or that began after one', () => {
    const result = checkHistory(historyOf(made([...steady, 90.2, 90.0, 90.01])), { baseline: 10 })
    const day = (n: number, hour = 12) => Date.UTC(2026, 2, n, hour)
    expect(standingAt(result, day(8), day(9))).toMatchObject({ state: 'in-control', place: 9, isDuring: true, lastGood: null })
    expect(standingAt(result, day(10), day(11))).toMatchObject({ state: 'alarm', place: 11, isDuring: true })
    expect(standingAt(result, day(10), day(13))).toMatchObject({ state: 'alarm', place: 11, isDuring: true })
    expect(standingAt(result, day(11), day(13))).toMatchObject({ state: 'alarm', place: 11, isDuring: false })
    expect(standingAt(result, Date.UTC(2026, 1, 1), day(2))).toMatchObject({ state: 'in-control', place: 2, isDuring: true })
    expect(standingWords(result, standingAt(result, day(10), day(11)))).toMatch(/^The check wafer raised an alarm on 2026-03-11 08:00, while the lot was measured/)
  })

  it('says that a lot is doubtful too that was measured between a good occasion and an alarm', () => {
    const result = checkHistory(historyOf(made([...steady, 90.2, 90.0, 90.01])), { baseline: 10 })
    const day = (n: number) => Date.UTC(2026, 2, n, 12)
    for (const standing of [standingAt(result, day(10)), standingAt(result, day(9), day(10))]) {
      expect(standing).toMatchObject({ state: 'doubtful', place: 11, isDuring: false, lastGood: '2026-03-10 08:00' })
      expect(standing.alarms[0]).toMatchObject({ place: 11, chart: 'value' })
      expect(standingWords(result, standing)).toMatch(
        /^The check wafer was in control on 2026-03-10 08:00, and raised an alarm on 2026-03-11 08:00, the next occasion after the lot .*The fault may have begun after the good occasion/,
      )
    }
  })

  it('leaves out a row that has no place in the order of time, and says which', () => {
    const { history, problems } = readHistory(fileOf('time,value\n03/04/2026,90\n2026-01-09,91\n,92\n2026-01-02,93\nsoon,95\n2026-01-01,94'))
    expect([...history!.order].map((row) => history!.value[row])).toEqual([94, 93, 91])
    expect(problems.map(({ line, why }) => [line, why])).toEqual([
      [2, expect.stringMatching(/"03\/04\/2026" can be read day first or month first/)],
      [4, expect.stringMatching(/no time/)],
      [6, expect.stringMatching(/"soon" can't be read/)],
    ])
  })

  it('stands in the order of the file where no time can be read, and says so', () => {
    const history = historyOf(['time,value', 'week 2,90', 'week 1,91', 'week 3,90.5', 'week 4,90.2'].join('\n'))
    expect([history.hasUnreadTimes, [...history.order]]).toEqual([true, [0, 1, 2, 3]])
    expect(checkWords(checkHistory(history)).join(' ')).toMatch(/"week 2", can't be read as dates/)
    expect(historyOf(['value', ...steady].join('\n')).hasUnreadTimes).toBe(false)
  })

  it('has values and their standard deviations in one unit', () => {
    const { value, standardDeviation, unit } = historyOf('resistivity [mohm.cm],sd,n\n97,5,6\n98,4,6')
    expect([[...value], [...standardDeviation], unit]).toEqual([[0.097, 0.098], [0.005, 0.004], 'Ω·cm'])
    const own = historyOf('resistivity [ohm.cm],sd [mohm.cm],n\n0.097,5,6')
    expect([...own.standardDeviation]).toEqual([0.005])
  })

  it('judges the precision of an occasion by its own count of readings', () => {
    const rows = [['97', '0.05', 20], ['97.1', '0.05', 20], ['97.2', '0.04', 20], ['97.1', '0.1', 2], ['97', '0.1', 20]]
    const { limits, alarms } = checkHistory(historyOf(['value,sd,n', ...rows.map((row) => row.join(','))].join('\n')))
    expect(alarms.filter(({ chart }) => chart === 'precision').map(({ index }) => index)).toEqual([5])
    // One degree of freedom: F(0.95; 1, n) is the square of t(0.975, n), here 77: 1.99125 (from tables).
    expect(limits.repeatabilityDegreesOfFreedom).toBe(77)
    expect(limits.precisionLimits[3] / limits.repeatability!).toBeCloseTo(1.99125, 4)
  })

  it('holds an accepted value in place of the mean', () => {
    const { limits, alarms } = checkHistory(historyOf(made(steady)), { accepted: 90.2 })
    expect([limits.centerLine, limits.isAccepted]).toEqual([90.2, true])
    expect(alarms.length).toBeGreaterThan(5)
  })

  it('does without standard deviations, and without times', () => {
    const { limits } = checkHistory(historyOf(['value', ...steady].join('\n')))
    expect([limits.precisionUpperLimit, limits.repeatability]).toEqual([null, null])
  })

  it('tells values that hang on their neighbours', () => {
    const drifting = Array.from({ length: 30 }, (_, k) => 90 + 0.01 * k + (k % 3) * 0.001)
    expect(checkHistory(historyOf(['value', ...drifting].join('\n'))).autocorrelation).toBeGreaterThan(0.7)
  })

  it.each([
    ['three occasions', ['value', 90, 91, 92], /3 occasions make no limits/],
    ['values all the same', ['value', 90, 90, 90, 90, 90], /all the same/],
    // The mean of seven 97.1 is not 97.1 to the last bit.
    ['the same, whose mean is rounded', ['value', ...Array<number>(7).fill(97.1)], /all the same/],
  ])('refuses %s', (_, rows, why) => {
    expect(() => checkHistory(historyOf(rows.join('\n')))).toThrow(expect.objectContaining({ problem: expect.objectContaining({ why: expect.stringMatching(why) as string }) as object }))
  })

  it.each([
    ['garbage', 'a;b\n1;2', /no line of it names/],
    ['two wafers', 'wafer,value\n1,90\n2,91', /several wafers/],
    ['values and spreads of two quantities', 'resistivity [ohm.cm],sd [ohm/sq]\n1,0.1', /its values in ohm.cm/],
    ['a scaled spread of values without unit', 'value,sd [mohm.cm]\n1,0.1', /name no unit/],
    ['a negative spread', 'value,sd\n90,-1', /negative/],
  ])('is not %s', (_, text, why) => {
    const { history, problems } = readHistory(fileOf(text))
    expect(history).toBeNull()
    expect(problems[0].why).toMatch(why)
  })
}) // prettier-ignore
