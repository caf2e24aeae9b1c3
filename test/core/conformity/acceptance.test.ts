import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { acceptanceLimits, acceptanceWords, judgeBy, type Acceptance } from '../../../core/conformity/acceptance'
import { conformanceProbability } from '../../../core/conformity/conformance-probability'
import { globalRisks } from '../../../core/conformity/global-risk'
import { seededRandom } from '../../../core/numeric/random'

const by = (rule: Acceptance['rule'], changes: Partial<Acceptance> = {}): Acceptance => ({
  rule,
  guardFactor: 1,
  maximumFalseAcceptRisk: 0.05,
  ...changes,
})
const LIMITS = { lower: 87, upper: 97 }

describe('acceptance limits', () => {
  it('are a guard band w = r U, U = 2u, inside the limits or outside (JCGM 106:2012, 8.3)', () => {
    expect(acceptanceLimits(LIMITS, 0.5, by('simple'))).toEqual(LIMITS)
    expect(acceptanceLimits(LIMITS, 0.5, by('stringent'))).toEqual({ lower: 88, upper: 96 })
    expect(acceptanceLimits(LIMITS, 0.5, by('relaxed'))).toEqual({ lower: 86, upper: 98 })
    expect(acceptanceLimits({ upper: 97 }, 0.5, by('stringent', { guardFactor: 0.5 }))).toEqual({ lower: undefined, upper: 96.5 })
  })

  it('leave a one-sided risk of 2.3 % with r = 1 and of 5 % with w = 1.645 u (JCGM 106:2012, 8.3.2, from memory)', () => {
    const risk = (acceptance: Acceptance): number => {
      const { upper } = acceptanceLimits({ upper: 97 }, 0.5, acceptance)
      return 1 - conformanceProbability({ value: upper!, u: 0.5, upper: 97 })
    }
    expect(risk(by('stringent'))).toBeCloseTo(0.0228, 4)
    expect(risk(by('stringent', { guardFactor: 1.645 / 2 }))).toBeCloseTo(0.05, 4)
    expect(risk(by('risk'))).toBeCloseTo(0.05, 12)
  })

  it('by risk: at both ends the probability to conform is 1 - p, even where the other limit is near', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 2.4, noNaN: true }), fc.double({ min: 0.001, max: 0.3, noNaN: true }), (u, p) => {
        const { lower, upper } = acceptanceLimits(LIMITS, u, by('risk', { maximumFalseAcceptRisk: p }))
        if (lower! > upper!) {
          expect(conformanceProbability({ value: 92, u, ...LIMITS })).toBeLessThan(1 - p + 1e-9)
          return
        }
        for (const value of [lower!, upper!]) expect(conformanceProbability({ value, u, ...LIMITS })).toBeCloseTo(1 - p, 8)
      }),
      { numRuns: 100, seed: 4 },
    )
  })
}) // prettier-ignore

describe('a verdict by a rule', () => {
  it.each([
    ['simple', [86.9, 87, 92, 96.9, 97.1], ['out-of-spec', 'in-spec', 'in-spec', 'in-spec', 'out-of-spec']],
    ['stringent', [86.9, 87, 87.9, 88, 96, 96.5, 97.1], ['out-of-spec', 'undecided', 'undecided', 'in-spec', 'in-spec', 'undecided', 'out-of-spec']],
    ['relaxed', [85.9, 86, 92, 98, 98.1], ['out-of-spec', 'in-spec', 'in-spec', 'in-spec', 'out-of-spec']],
    ['risk', [86.9, 87.5, 88, 96, 96.5], ['out-of-spec', 'undecided', 'in-spec', 'in-spec', 'undecided']],
  ] as const)('%s', (rule, values, verdicts) => {
    expect(values.map((value) => judgeBy(value, 0.5, LIMITS, by(rule)))).toEqual(verdicts)
  })

  it('is simple without an uncertainty, and none without a value or limits', () => {
    expect(judgeBy(96.9, NaN, LIMITS, by('stringent'))).toBe('in-spec')
    expect(judgeBy(NaN, 0.5, LIMITS, by('stringent'))).toBe('not-assessed')
    expect(judgeBy(92, 0.5, {}, by('risk'))).toBe('not-assessed')
  })

  it('is said in words', () => {
    for (const rule of ['simple', 'stringent', 'relaxed', 'risk'] as const) expect(acceptanceWords(by(rule))).toMatch(/^[A-Z].*\.$/)
  })
}) // prettier-ignore

describe('global risks', () => {
  // JCGM 106:2012, 9.5.4 (resistors, set-up from memory): true values of s 0.12, u 0.04, limits +-0.2.
  const limits = { lower: -0.2, upper: 0.2 }
  const process = { mean: 0, standardDeviation: 0.12 }

  it('are those of an independent integration of the standard’s example', () => {
    const { consumer, producer } = globalRisks(limits, 0.04, process, by('simple'))
    expect(consumer).toBeCloseTo(0.018942206717029175, 10)
    expect(producer).toBeCloseTo(0.03720780017805758, 10)
  })

  it('are those of a seeded simulation, under every rule', () => {
    const random = seededRandom(8)
    const draws = Array.from({ length: 200_000 }, () => {
      const truth = 0.02 + 0.12 * random.normal()
      return { truth, measured: truth + 0.04 * random.normal() }
    })
    for (const rule of ['simple', 'stringent', 'relaxed', 'risk'] as const) {
      const risks = globalRisks(limits, 0.04, { mean: 0.02, standardDeviation: 0.12 }, by(rule, { guardFactor: 0.5 }))
      const accepted = acceptanceLimits(limits, 0.04, by(rule, { guardFactor: 0.5 }))
      const isAccepted = (value: number) => value >= accepted.lower! && value <= accepted.upper!
      const share = (test: (d: { truth: number; measured: number }) => boolean) => draws.filter(test).length / draws.length
      const conforms = (truth: number) => Math.abs(truth) <= 0.2
      // Three standard deviations of a share of 200,000.
      expect(Math.abs(share((d) => !conforms(d.truth) && isAccepted(d.measured)) - risks.consumer)).toBeLessThan(0.0012)
      expect(Math.abs(share((d) => conforms(d.truth) && !isAccepted(d.measured)) - risks.producer)).toBeLessThan(0.0021)
      expect(Math.abs(share((d) => isAccepted(d.measured)) - risks.accepted)).toBeLessThan(0.0027)
    }
  })

  it('trade one for the other as the guard band grows', () => {
    const at = (guardFactor: number) => globalRisks(limits, 0.04, process, by('stringent', { guardFactor }))
    for (let r = 0.2; r <= 2; r += 0.2) {
      expect(at(r).consumer).toBeLessThan(at(r - 0.2).consumer)
      expect(at(r).producer).toBeGreaterThan(at(r - 0.2).producer)
    }
    expect(at(0).consumer).toBeCloseTo(globalRisks(limits, 0.04, process, by('simple')).consumer, 14)
  })

  it('accept nothing where the guard bands meet', () => {
    const risks = globalRisks(limits, 0.12, process, by('stringent'))
    expect([risks.consumer, risks.accepted]).toEqual([0, expect.closeTo(0, 12)])
  })
}) // prettier-ignore
