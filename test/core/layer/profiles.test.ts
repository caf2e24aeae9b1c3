import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { layerProfile, layerProfiles } from '../../../core/layer/profiles/registry'
import { problemOf } from './layer-fixtures'

const ratios = fc.double({ min: -25, max: -0.01, noNaN: true }).map(Math.exp)
const falling = layerProfiles.filter(({ id }) => id !== 'uniform')

describe('layer profiles', () => {
  it('have unique ids, titles, formulas and sources', () => {
    expect(new Set(layerProfiles.map(({ id }) => id)).size).toBe(layerProfiles.length)
    for (const { title, formula, source } of layerProfiles) expect([title, formula, source]).not.toContain('')
  })

  it.each(falling)('$id: starts at the surface, ends at the background, falls between', (profile) => {
    fc.assert(
      fc.property(ratios, (ratio) => {
        const shape = profile.shape(ratio)
        expect(shape(0)).toBe(1)
        expect(Math.abs(shape(1) / ratio - 1)).toBeLessThan(1e-12)
        expect(shape(0.6)).toBeLessThan(shape(0.5))
      }),
    )
  })

  it.each(falling)('$id: depth of a level undoes the shape', (profile) => {
    fc.assert(
      fc.property(ratios, fc.double({ min: 0.01, max: 0.99, noNaN: true }), (ratio, eta) => {
        expect(profile.depthOf(profile.shape(ratio)(eta), ratio)).toBeCloseTo(eta, 9)
      }),
    )
  })

  it.each(falling)('$id: depth response is the slope of its depth', (profile) => {
    fc.assert(
      fc.property(ratios, (ratio) => {
        const [deeper, shallower] = [1e-5, -1e-5].map((step) => profile.depthInLengths(ratio * Math.exp(-step)))
        const slope = Math.log(deeper / shallower) / 2e-5
        expect(slope / profile.depthResponse(ratio)).toBeCloseTo(1, 5)
      }),
    )
  })

  it('uniform: a box', () => {
    const { shape, mean } = layerProfile('uniform')
    expect([shape(0.1)(0), shape(0.1)(1), mean(0.1)]).toEqual([1, 1, 1])
  })

  it('refuses a profile it does not know', () => {
    expect(problemOf(() => layerProfile('linear' as 'uniform'))).toMatchObject({ kind: 'unknown-id', id: 'linear' })
  })
})
