import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { junctionDepth_um } from '../../../core/layer/junction-depth'
import { erfc } from '../../../core/numeric/erfc'
import { junctionDepths } from '../../reference/irvin-layers'
import { problemOf } from './layer-fixtures'

describe('junction depth', () => {
  it.each(junctionDepths)('is the reference in units of sqrt(Dt): $profile', ({ depthInLengths, ...question }) => {
    expect(junctionDepth_um({ ...question, length_um: 1 })).toBeCloseTo(depthInLengths, 8)
  })

  it('is where the diffusion profile has come down to the background', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.1, max: 8, noNaN: true }),
        fc.double({ min: 0.01, max: 5, noNaN: true }),
        (decades, length_um) => {
          const question = { surface_cm3: 10 ** (14 + decades), background_cm3: 1e14, length_um }
          const x = (profile: 'gaussian' | 'erfc' | 'exponential') => junctionDepth_um({ ...question, profile })
          const ns = question.surface_cm3
          const levels = [
            ns * Math.exp(-((x('gaussian') / (2 * length_um)) ** 2)),
            ns * erfc(x('erfc') / (2 * length_um)),
            ns * Math.exp(-x('exponential') / length_um),
          ]
          for (const level of levels) expect(Math.abs(level / 1e14 - 1)).toBeLessThan(1e-11)
        },
      ),
    )
  })

  it('refuses a surface that does not exceed the background, and a uniform layer', () => {
    const question = { profile: 'gaussian', surface_cm3: 1e15, background_cm3: 1e15, length_um: 1 } as const
    expect(problemOf(() => junctionDepth_um(question))).toMatchObject({
      kind: 'out-of-range',
      quantity: 'surface concentration',
    })
    expect(problemOf(() => junctionDepth_um({ ...question, surface_cm3: NaN }))).toMatchObject({ kind: 'out-of-range' })
    expect(problemOf(() => junctionDepth_um({ ...question, surface_cm3: 1e18, length_um: 0 }))).toMatchObject({
      quantity: 'diffusion length',
    })
    expect(problemOf(() => junctionDepth_um({ ...question, profile: 'uniform', surface_cm3: 1e18 }))).toMatchObject({
      kind: 'not-applicable',
    })
  })
})
