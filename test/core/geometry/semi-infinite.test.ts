import { describe, expect, it } from 'vitest'
import { semiInfiniteResistivity_ohm_cm } from '../../../core/geometry/semi-infinite'
import { unequalThicknessFactor } from '../../../core/geometry/thickness'
import { thinSheetFactor } from '../../../core/geometry/thin-sheet'
import { CoreError } from '../../../core/problems/problem'

describe('semiInfiniteResistivity_ohm_cm', () => {
  it('is 2 pi s V/I for equal pins (SEMI MF43-0705 eq. 5), s in cm', () => {
    const found = semiInfiniteResistivity_ohm_cm({ spacings_mm: [1.59, 1.59, 1.59], vOverI_ohm: 3 })
    expect(found).toBeCloseTo(2 * Math.PI * 0.159 * 3, 12)
  })

  it('is where sheet factor, thickness and thickness factor lead for a thick slab with unequal pins', () => {
    const spacings_mm = [0.9, 1.1, 1.05] as const
    const sheet = { outline: { shape: 'infinite' }, configuration: 'A', x_mm: 0, y_mm: 0 } as const
    const thin = thinSheetFactor({ ...sheet, orientation: 'radial', spacings_mm }).value
    const { value } = unequalThicknessFactor({ thickness_um: 1e5, spacings_mm, back: 'insulating' })
    const solid = semiInfiniteResistivity_ohm_cm({ spacings_mm, vOverI_ohm: 1 })
    expect(Math.abs((thin * value * 10) / solid - 1)).toBeLessThan(1e-5)
  })

  it('refuses bad spacings and V/I', () => {
    expect(() => semiInfiniteResistivity_ohm_cm({ spacings_mm: [1, 0, 1], vOverI_ohm: 1 })).toThrow(CoreError)
    expect(() => semiInfiniteResistivity_ohm_cm({ spacings_mm: [1, 1, 1], vOverI_ohm: NaN })).toThrow(CoreError)
  })
})
