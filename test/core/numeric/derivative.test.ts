import { expect, it } from 'vitest'
import { derivative } from '../../../core/numeric/derivative'

it('is exact for a quartic, up to rounding', () => {
  const f = (x: number) => 3 - x + 2 * x ** 2 - 0.5 * x ** 3 + 0.25 * x ** 4
  for (const x of [-2, 0, 0.7, 3])
    expect(derivative({ f, x, step: 0.125 })).toBeCloseTo(-1 + 4 * x - 1.5 * x ** 2 + x ** 3, 11)
})

it('misses the exponential by step^4 / 30', () => {
  for (const step of [0.1, 0.05]) {
    const miss = derivative({ f: Math.exp, x: 1, step }) / Math.E - 1
    expect(miss / (-(step ** 4) / 30)).toBeCloseTo(1, 2)
  }
})
