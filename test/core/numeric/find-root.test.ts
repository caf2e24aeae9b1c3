import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { findRoot } from '../../../core/numeric/find-root'
import { CoreError } from '../../../core/problems/problem'

describe('known roots', () => {
  it.each([
    ['cosine less x (the Dottie number)', (x: number) => Math.cos(x) - x, 0, 1, 0.7390851332151607],
    ['x^3 - 2x - 5 (Wallis)', (x: number) => x ** 3 - 2 * x - 5, 2, 3, 2.0945514815423265],
    ['exp(x) - 2', (x: number) => Math.exp(x) - 2, -50, 50, Math.LN2],
    ['a step', (x: number) => (x < 1 / 3 ? -1 : 1), 0, 1, 1 / 3],
    ['a triple root', (x: number) => (x - 1) ** 3, 0, 2.7, 1],
    ['very flat', (x: number) => (x - 0.3) * Math.exp(-1 / (x - 0.3) ** 2), 0, 4, 0.3],
  ])('%s', (name, f, low, high, root) => {
    // Flat near its root, f is zero in floating point over a stretch about it: any point of that is a root.
    const found = findRoot({ f, low, high, tolerance: 0 })
    if (f(found) !== 0) expect(Math.abs(found - root), name).toBeLessThan(5e-15)
    expect(Math.abs(f(found))).toBeLessThanOrEqual(name === 'a step' ? 1 : 1e-13)
  })

  it('takes an end that is a root', () => {
    expect(findRoot({ f: (x) => x - 2, low: 2, high: 5, tolerance: 1e-9 })).toBe(2)
    expect(findRoot({ f: (x) => x - 5, low: 2, high: 5, tolerance: 1e-9 })).toBe(5)
  })

  it('does not lose the sign of values whose product underflows', () => {
    expect(findRoot({ f: (x) => 1e-200 * (x - 0.25), low: 0, high: 1, tolerance: 1e-12 })).toBeCloseTo(0.25, 11)
  })
})

it('keeps to its tolerance, wherever the root and whichever way the function runs', () => {
  const place = fc.double({ min: 0.001, max: 0.999, noNaN: true })
  fc.assert(
    fc.property(place, fc.constantFrom(-1, 1), fc.double({ min: 0.2, max: 6, noNaN: true }), (root, sign, power) => {
      const f = (x: number) => sign * (Math.pow(x, power) - Math.pow(root, power))
      expect(Math.abs(findRoot({ f, low: 0, high: 1, tolerance: 1e-7 }) - root)).toBeLessThanOrEqual(1e-7)
    }),
    { numRuns: 200 },
  )
})

it('needs few calls on a smooth function and no more than twice bisection on a bad one', () => {
  let calls = 0
  const counted = (f: (x: number) => number) => (x: number) => {
    calls++
    return f(x)
  }
  findRoot({ f: counted((x) => Math.exp(x) - 2), low: 0, high: 2, tolerance: 1e-12 })
  expect(calls).toBeLessThan(12)
  calls = 0
  findRoot({ f: counted((x) => (x < 0.1234 ? -1e-8 : 1e8)), low: 0, high: 1, tolerance: 1e-12 })
  expect(calls).toBeLessThan(2 * 42)
})

describe('refusals', () => {
  const kindOf = (act: () => unknown) => {
    try {
      act()
    } catch (error) {
      return error instanceof CoreError ? error.problem.kind : error
    }
    return 'returned'
  }
  it.each([
    ['no change of sign', { f: (x: number) => x * x + 1, low: -1, high: 1, tolerance: 1e-9 }],
    ['not a number at an end', { f: Math.log, low: -1, high: 2, tolerance: 1e-9 }],
    ['not a number inside', { f: (x: number) => (x === 0 ? NaN : x), low: -1, high: 1, tolerance: 1e-9 }],
    ['too few iterations', { f: (x: number) => Math.exp(x) - 2, low: -50, high: 50, tolerance: 0, maxIterations: 3 }],
    ['an end that is no number', { f: (x: number) => x, low: NaN, high: 1, tolerance: 1e-9 }],
  ])('%s', (_, search) => {
    expect(kindOf(() => findRoot(search))).toBe('not-applicable')
  })
})
