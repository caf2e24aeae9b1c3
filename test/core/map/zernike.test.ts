import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { osaIndex, zernike, zernikeAt, zernikeColumn, zernikeName, type ZernikeIndex } from '../../../core/map/zernike'
import { CoreError } from '../../../core/problems/problem'
import { ZERNIKE_OSA } from '../../reference/zernike-osa'

const upTo = (degree: number) => Array.from({ length: ((degree + 1) * (degree + 2)) / 2 }, (_, j) => zernikeAt(j))
const polar = (rho: number, theta: number): [number, number] => [rho * Math.cos(theta), rho * Math.sin(theta)]

describe('published polynomials (OSA and ANSI order)', () => {
  it.each(ZERNIKE_OSA)('Z$j', ({ j, n, m, at }) => {
    expect(osaIndex({ n, m })).toBe(j)
    expect(zernikeAt(j)).toEqual({ n, m })
    for (const rho of [0, 0.2, 0.55, 0.9, 1]) {
      for (const theta of [0, 0.4, 1.7, 3.1, 5]) {
        expect(zernike({ n, m }, ...polar(rho, theta))).toBeCloseTo(at(rho, theta), 12)
      }
    }
  })
})

describe('limits', () => {
  it('at the edge the radial part is 1', () => {
    for (const { n, m } of upTo(20)) {
      const norm = Math.sqrt(m === 0 ? n + 1 : 2 * (n + 1))
      // Where the angular part is 1.
      const theta = m < 0 ? Math.PI / 2 / -m : 0
      expect(zernike({ n, m }, ...polar(1, theta)) / norm).toBeCloseTo(1, 10)
    }
  })

  it('at the centre only the even shapes that go round are left, with alternating sign', () => {
    for (const { n, m } of upTo(12)) {
      const expected = m === 0 ? (n % 4 === 0 ? 1 : -1) * Math.sqrt(n + 1) : 0
      expect(zernike({ n, m }, 0, 0)).toBeCloseTo(expected, 12)
    }
  })
})

describe('laws', () => {
  it('orthonormal over the disc: all products to degree 12, by exact quadrature', () => {
    const shapes = upTo(12)
    const { x, y, weight } = discRule(16, 32)
    const columns = shapes.map((index) => zernikeColumn(index, x, y))
    for (const [a, first] of columns.entries()) {
      for (const [b, second] of columns.entries()) {
        const mean = first.reduce((sum, value, i) => sum + weight[i] * value * second[i], 0)
        expect(Math.abs(mean - (a === b ? 1 : 0))).toBeLessThan(1e-13)
      }
    }
  })

  it('a turn mixes cosine and sine of the same degree and repetition only', () => {
    const place = fc.tuple(fc.double({ min: 0, max: 1, noNaN: true }), fc.double({ min: 0, max: 6.28, noNaN: true }))
    const shape = fc.integer({ min: 0, max: 90 }).map(zernikeAt)
    fc.assert(
      fc.property(shape, place, fc.double({ min: -3, max: 3, noNaN: true }), ({ n, m }, [rho, theta], turn) => {
        const folds = Math.abs(m)
        const at = (angle: number, sign: number) =>
          folds === 0 && sign < 0 ? 0 : zernike({ n, m: sign * folds }, ...polar(rho, angle))
        const mixed = Math.cos(folds * turn) * at(theta, 1) - Math.sin(folds * turn) * at(theta, -1)
        expect(at(theta + turn, 1)).toBeCloseTo(mixed, 10)
      }),
      { numRuns: 200 },
    )
  })

  it('index and degree belong to each other', () => {
    upTo(60).forEach((index, j) => expect(osaIndex(index)).toBe(j))
  })

  it('every shape to degree 8 has a name of its own', () => {
    const names = upTo(8).map(zernikeName)
    expect(new Set(names).size).toBe(names.length)
    expect(names.slice(0, 5)).toEqual(['mean', 'tilt y', 'tilt x', 'saddle, diagonal', 'bowl'])
  })
})

describe('a second implementation: the sum of powers in whole numbers', () => {
  it.each([
    [20, 0], [31, 5], [40, -8], [60, 0], [60, 2], [59, -59],
  ])('n = %i, m = %i', (n, m) => {
    for (const sixtyFourths of [3, 17, 40, 55, 63]) {
      const rho = sixtyFourths / 64
      const theta = 0.3
      const angular = m < 0 ? Math.sin(-m * theta) : Math.cos(m * theta)
      const expected = Math.sqrt(m === 0 ? n + 1 : 2 * (n + 1)) * exactRadial(n, Math.abs(m), sixtyFourths) * angular
      expect(Math.abs(zernike({ n, m }, ...polar(rho, theta)) - expected)).toBeLessThan(1e-12)
    }
  }) // prettier-ignore
})

describe('refusals', () => {
  const refused: ZernikeIndex[] = [
    { n: 2, m: 1 }, { n: 2, m: 4 }, { n: -1, m: 0 }, { n: 61, m: 1 }, { n: 2.5, m: 0.5 }, { n: 2, m: NaN },
  ] // prettier-ignore
  it.each(refused)('n = $n, m = $m', (index) => {
    expect(() => zernike(index, 0, 0)).toThrow(CoreError)
    expect(() => zernikeColumn(index, new Float64Array(1), new Float64Array(1))).toThrow(CoreError)
  })

  it.each([-1, 1.5, NaN, 1891])('index %s', (j) => expect(() => zernikeAt(j)).toThrow(CoreError))
})

/** Exact for polynomials of degree below 4 radii - 1 in rho^2 and of fewer repetitions than angles. */
function discRule(radii: number, angles: number): { x: Float64Array; y: Float64Array; weight: Float64Array } {
  const [x, y, weight] = [[], [], []] as number[][]
  for (let k = 0; k < radii; k++) {
    let t = Math.cos((Math.PI * (k + 0.75)) / (radii + 0.5))
    for (let step = 0; step < 20; step++) t -= legendre(radii, t)[0] / legendre(radii, t)[1]
    // The mean over the disc is that over rho^2 from 0 to 1.
    const share = 1 / ((1 - t * t) * legendre(radii, t)[1] ** 2)
    for (let a = 0; a < angles; a++) {
      const [px, py] = polar(Math.sqrt((1 + t) / 2), (2 * Math.PI * (a + 0.25)) / angles)
      x.push(px)
      y.push(py)
      weight.push(share / angles)
    }
  }
  return { x: Float64Array.from(x), y: Float64Array.from(y), weight: Float64Array.from(weight) }
}

/** P_n and its slope. */
function legendre(n: number, t: number): [number, number] {
  let [before, current] = [1, t]
  for (let k = 2; k <= n; k++) [before, current] = [current, ((2 * k - 1) * t * current - (k - 1) * before) / k]
  return [current, (n * (before - t * current)) / (1 - t * t)]
}

/** sum (-1)^k (n-k)! / (k! ((n+m)/2-k)! ((n-m)/2-k)!) rho^(n-2k), with rho in 64ths. */
function exactRadial(n: number, m: number, sixtyFourths: number): number {
  const factorial = (k: number): bigint => (k < 2 ? 1n : BigInt(k) * factorial(k - 1))
  let sum = 0n
  for (let k = 0; k <= (n - m) / 2; k++) {
    const coefficient = factorial(n - k) / (factorial(k) * factorial((n + m) / 2 - k) * factorial((n - m) / 2 - k))
    sum += (k % 2 === 0 ? 1n : -1n) * coefficient * BigInt(sixtyFourths) ** BigInt(n - 2 * k) * 64n ** BigInt(2 * k)
  }
  // Sixty decimals before the last rounding.
  return Number((sum * 10n ** 60n) / 64n ** BigInt(n)) / 1e60
}
