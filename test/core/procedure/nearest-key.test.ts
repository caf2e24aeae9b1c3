import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { editDistance, nearestKey } from '../../../core/procedure/nearest-key'

/** The definition, word for word; slow, and only for short texts. */
function distanceByDefinition(a: string, b: string): number {
  if (a === '' || b === '') return a.length + b.length
  const same = a.at(-1) === b.at(-1)
  const least = Math.min(
    distanceByDefinition(a.slice(0, -1), b) + 1,
    distanceByDefinition(a, b.slice(0, -1)) + 1,
    distanceByDefinition(a.slice(0, -1), b.slice(0, -1)) + (same ? 0 : 1),
  )
  const swapped = a.length > 1 && b.length > 1 && a.at(-1) === b.at(-2) && a.at(-2) === b.at(-1)
  return swapped ? Math.min(least, distanceByDefinition(a.slice(0, -2), b.slice(0, -2)) + 1) : least
}

describe('editDistance', () => {
  it.each([
    ['', '', 0],
    ['depthUm', 'depthUm', 0],
    ['dephtUm', 'depthUm', 1],
    ['diametreMm', 'diameterMm', 1],
    ['pitch', '', 5],
  ])('%j to %j is %d', (a, b, distance) => {
    expect(editDistance(a, b)).toBe(distance)
  })

  it('is what its definition says', () => {
    const short = fc.string({ maxLength: 5, unit: fc.constantFrom('a', 'b', 'c') })
    fc.assert(
      fc.property(short, short, (a, b) => editDistance(a, b) === distanceByDefinition(a, b)),
      { numRuns: 200 },
    )
  })

  it('stays small for a key of a million letters', () => {
    expect(editDistance('x'.repeat(1e6), 'depthUm')).toBe(999_993)
  })
})

describe('nearestKey', () => {
  const known = ['diameterMm', 'widthMm', 'heightMm', 'thicknessUm']
  it.each([
    ['diametreMm', 'diameterMm'],
    ['DiameterMM', 'diameterMm'],
    ['thicknesUm', 'thicknessUm'],
    ['colour', null],
    ['', null],
  ])('takes %j for %j', (written, meant) => {
    expect(nearestKey(written, known)).toBe(meant)
  })

  it('has nothing to offer where nothing is known', () => {
    expect(nearestKey('a', [])).toBeNull()
  })
})
