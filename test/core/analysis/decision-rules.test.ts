import { describe, expect, it } from 'vitest'
import { acceptanceLimits } from '../../../core/conformity/acceptance'
import { VERDICTS } from '../../../core/conformity/verdict'
import { runLot } from './trust-lots'

describe('a lot under each decision rule', () => {
  const verdictsOf = (rule: string, extra = {}) => {
    const analysis = runLot('TB-0417', (procedure) => ({ ...procedure, acceptance: { rule, ...extra } }))
    const counts = { 'in-spec': 0, 'out-of-spec': 0, undecided: 0, 'not-assessed': 0 }
    for (const code of analysis.sites.verdict) counts[VERDICTS[code]]++
    return { analysis, counts }
  }
  const simple = verdictsOf('simple')

  it('the stringent one leaves those near a limit undecided, the relaxed one accepts some that are out', () => {
    const stringent = verdictsOf('stringent')
    const relaxed = verdictsOf('relaxed', { guardFactor: 4 })
    expect(simple.counts.undecided).toBe(0)
    expect(stringent.counts.undecided).toBeGreaterThan(0)
    expect(stringent.counts['out-of-spec']).toBe(simple.counts['out-of-spec'])
    expect(relaxed.counts['out-of-spec']).toBeLessThan(simple.counts['out-of-spec'])
    expect(relaxed.counts.undecided).toBe(0)
  })

  it('every verdict is that of its own uncertainty, of sites and of dies', () => {
    const { analysis } = verdictsOf('stringent')
    const { acceptance } = analysis.procedure
    const limits = { lower: 87, upper: 97 }
    for (const { value, u, verdict } of [analysis.sites, analysis.dies!]) {
      value.forEach((v, i) => {
        if (Number.isNaN(v) || VERDICTS[verdict[i]] === 'not-assessed') return
        const { lower, upper } = acceptanceLimits(limits, u[i], acceptance)
        const expected = v >= lower! && v <= upper! ? 'in-spec' : v >= 87 && v <= 97 ? 'undecided' : 'out-of-spec'
        expect(VERDICTS[verdict[i]]).toBe(expected)
      })
    }
  })

  it('a wafer whose sites or mean lie in a guard band is undecided, and says so; so is its lot', () => {
    const { analysis } = verdictsOf('stringent', { guardFactor: 3 })
    const undecided = analysis.wafers.filter(({ verdict }) => verdict === 'undecided')
    expect(undecided.length).toBeGreaterThan(0)
    expect(undecided[0].reasons[0]).toMatch(/in the guard band/)
    const onlyGood = runLot('TB-0417', (p) => ({ ...p, acceptance: { rule: 'stringent', guardFactor: 3 }, limits: { sheetResistanceOhmSq: { lower: 50, upper: 300 }, waferMeanOhmSq: { lower: 90.5, upper: 97 } } }))
    expect(onlyGood.lot.verdict).toBe('undecided')
    expect(onlyGood.lot.sentence).toMatch(/is undecided/)
  })

  it('tells the risks of the lot: a stringent rule accepts less that is bad, and rejects more that is good', () => {
    const { risks } = simple.analysis
    expect(risks!.byRule.stringent.consumer).toBeLessThan(risks!.byRule.simple.consumer)
    expect(risks!.byRule.stringent.producer).toBeGreaterThan(risks!.byRule.simple.producer)
    expect(risks!.byRule.relaxed.consumer).toBeGreaterThan(risks!.byRule.simple.consumer)
    expect(risks!.consumer).toBe(risks!.byRule.simple.consumer)
  })
}) // prettier-ignore
