import { describe, expect, it } from 'vitest'
import { limitsText, plural, sitesReason, uniformityReason, waferName } from '../../../core/conformity/reasons'

const findings = (above: number, below: number) => ({
  counts: { 'in-spec': 49 - above - below, 'out-of-spec': above + below, undecided: 0, 'not-assessed': 0 },
  above,
  below,
  outOnlyAtEdge: false,
})
const reason = (above: number, below: number, limits: { lower?: number; upper?: number }) =>
  sitesReason({ findings: findings(above, below), limits, unit: 'Ω/sq', allowed: 0 })

describe('words', () => {
  it('limits keep the digits they were given with', () => {
    expect(limitsText({ lower: 87, upper: 97.25 }, 'Ω/sq')).toBe('87 to 97.25 Ω/sq')
    expect(limitsText({ lower: 0.5 }, 'Ω·cm')).toBe('at least 0.5 Ω·cm')
    expect(limitsText({ upper: 12000 }, 'Ω/sq')).toBe('at most 12\u202f000 Ω/sq')
    expect(limitsText({ upper: 100 }, 'Ω/sq')).toBe('at most 100 Ω/sq')
  })

  it('sites out: which side', () => {
    expect(reason(4, 2, { lower: 87, upper: 97 })).toBe('6 of 49 sites outside 87 to 97 Ω/sq (4 above, 2 below)')
    expect(reason(0, 2, { lower: 87, upper: 97 })).toBe('2 of 49 sites outside 87 to 97 Ω/sq (all below)')
    expect(reason(3, 0, { upper: 97 })).toBe('3 of 49 sites above 97 Ω/sq')
    expect(reason(0, 1, { lower: 87 })).toBe('1 of 49 sites below 87 Ω/sq')
  })

  it('a percentage that rounds to its limit is told with more digits', () => {
    expect(uniformityReason(1.501, 1.5, '100 s / mean')).toBe(
      'non-uniformity 1.501 % above the limit of 1.5 % (100 s / mean)',
    )
  })

  it('plurals and names', () => {
    expect([plural(0, 'site'), plural(1, 'site'), plural(2, 'site')]).toEqual(['0 sites', '1 site', '2 sites'])
    expect([waferName('07'), waferName('Wafer 7'), waferName('wafers')]).toEqual([
      'wafer 07',
      'Wafer 7',
      'wafer wafers',
    ])
  })
})
