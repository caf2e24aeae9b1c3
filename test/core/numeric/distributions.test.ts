import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  chiSquareProbability,
  chiSquareQuantile,
  chiSquareUpperProbability,
  fProbability,
  fQuantile,
  fUpperProbability,
  studentProbability,
  studentQuantile,
} from '../../../core/numeric/distributions'
import { normalProbability, normalQuantile } from '../../../core/numeric/normal'
import { CoreError } from '../../../core/problems/problem'
import {
  CHI_SQUARE_P,
  CHI_SQUARE_TABLE,
  F_TABLE,
  FURNACE_ANOVA,
  T_TABLE,
  T_TAIL,
  T_TAIL_0_001,
} from '../../reference/nist-handbook-statistics'

/** Half a unit of the third decimal, and what binary leaves of it. */
const THIRD_DECIMAL = 0.5e-3 + 1e-9

describe('published values', () => {
  it.each(T_TABLE)('NIST e-Handbook 1.3.6.7.2: t of %d degrees of freedom', (df, ...row) => {
    row.forEach((t, i) => expect(Math.abs(studentQuantile(1 - T_TAIL[i], df) - t)).toBeLessThan(THIRD_DECIMAL))
  })

  it.each(T_TAIL_0_001)('NIST e-Handbook 1.3.6.7.2: t of %d degrees of freedom, tail 0.001', (df, t) => {
    expect(Math.abs(studentQuantile(0.999, df) - t)).toBeLessThan(THIRD_DECIMAL)
  })

  it.each(CHI_SQUARE_TABLE)('NIST e-Handbook 1.3.6.7.4: chi-square of %d degrees of freedom', (df, ...row) => {
    row.forEach((x, i) => expect(Math.abs(chiSquareQuantile(CHI_SQUARE_P[i], df) - x)).toBeLessThan(THIRD_DECIMAL))
  })

  it.each(F_TABLE)('NIST e-Handbook 1.3.6.7.3: F of %s, %d over %d', (p, above, below, f) => {
    expect(Math.abs(fQuantile(p, above, below) - f)).toBeLessThan(THIRD_DECIMAL)
  })

  it('NIST e-Handbook 3.5.1.4: significance of the furnace zones, 3.85e-11', () => {
    const { f, p } = FURNACE_ANOVA.middle
    expect(Math.abs(fUpperProbability(f, 63, 84) - p)).toBeLessThan(0.005e-11)
  })
})

describe('limits', () => {
  it('closed forms: t of 1 and 2, chi-square of 2, F of 2 over 2', () => {
    for (const p of [1e-12, 0.001, 0.3, 0.75, 0.999]) {
      expect(studentQuantile(p, 1) / (-1 / Math.tan(Math.PI * p))).toBeCloseTo(1, 12)
      expect(studentQuantile(p, 2) / ((2 * p - 1) / Math.sqrt(2 * p * (1 - p)))).toBeCloseTo(1, 12)
      expect(chiSquareQuantile(p, 2) / (-2 * Math.log1p(-p))).toBeCloseTo(1, 12)
      expect(fQuantile(p, 2, 2) / (p / (1 - p))).toBeCloseTo(1, 12)
    }
  })

  it('t of very many degrees of freedom is normal, but for (z^3 + z) / (4 nu)', () => {
    for (const p of [0.001, 0.025, 0.2, 0.9]) {
      const z = normalQuantile(p)
      expect(studentQuantile(p, 1e8)).toBeCloseTo(z + (z ** 3 + z) / 4e8, 13)
    }
    expect(studentProbability(-6, 1e9) / normalProbability(-6)).toBeCloseTo(1, 6)
  })

  it('chi-square of 10000 about its mean: 1/2 + 1 / (3 sqrt(2 pi a))', () => {
    expect(chiSquareProbability(10000, 10000)).toBeCloseTo(0.5 + 1 / (3 * Math.sqrt(2 * Math.PI * 5000)), 6)
  })

  it('far tails keep their digits', () => {
    // exp(-x / 2) for chi-square of 2; 2 sqrt(3) / (pi t^3) for t of 3 far out.
    expect(chiSquareUpperProbability(600, 2) / Math.exp(-300)).toBeCloseTo(1, 12)
    expect(studentProbability(-1e6, 3) / ((2 * Math.sqrt(3)) / Math.PI / 1e18)).toBeCloseTo(1, 11)
    expect(studentQuantile(1e-60, 1)).toBeLessThan(-3e59)
  })

  it('at the ends', () => {
    expect([studentQuantile(0, 3), studentQuantile(0.5, 3), studentQuantile(1, 3)]).toEqual([-Infinity, 0, Infinity])
    expect([chiSquareQuantile(0, 3), chiSquareQuantile(1, 3)]).toEqual([0, Infinity])
    expect([fQuantile(0, 3, 4), fQuantile(1, 3, 4)]).toEqual([0, Infinity])
    expect([studentProbability(-Infinity, 3), studentProbability(Infinity, 3)]).toEqual([0, 1])
    expect([chiSquareProbability(0, 3), chiSquareUpperProbability(Infinity, 3)]).toEqual([0, 0])
    expect([fProbability(0, 3, 4), fUpperProbability(Infinity, 3, 4)]).toEqual([0, 0])
  })
})

describe('laws', () => {
  const df = fc.double({ min: 0.5, max: 5000, noNaN: true })
  const p = fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true })

  it('the quantile undoes the probability', () => {
    fc.assert(
      fc.property(df, df, p, (m, n, share) => {
        expect(studentProbability(studentQuantile(share, n), n) / share).toBeCloseTo(1, 10)
        expect(chiSquareProbability(chiSquareQuantile(share, n), n) / share).toBeCloseTo(1, 10)
        expect(fProbability(fQuantile(share, m, n), m, n) / share).toBeCloseTo(1, 9)
      }),
    )
  })

  it('both tails make up the whole', () => {
    fc.assert(
      fc.property(df, df, fc.double({ min: 0, max: 50, noNaN: true }), (m, n, x) => {
        expect(chiSquareProbability(x, n) + chiSquareUpperProbability(x, n)).toBeCloseTo(1, 13)
        expect(fProbability(x, m, n) + fUpperProbability(x, m, n)).toBeCloseTo(1, 12)
        expect(studentProbability(x, n) + studentProbability(-x, n)).toBeCloseTo(1, 14)
      }),
    )
  })

  it('t squared is F of 1 over its degrees of freedom, and the inverse of F is F the other way round', () => {
    fc.assert(
      fc.property(df, df, p, (m, n, share) => {
        expect(studentQuantile((1 + share) / 2, n) ** 2 / fQuantile(share, 1, n)).toBeCloseTo(1, 8)
        expect(fQuantile(share, m, n) * fQuantile(1 - share, n, m)).toBeCloseTo(1, 9)
      }),
    )
  })
})

describe('a second implementation: Simpson over the densities', () => {
  it.each([4, 7, 24.5, 200])('%s degrees of freedom', (df) => {
    const t = (x: number) => (1 + (x * x) / df) ** (-(df + 1) / 2)
    const half = simpson(t, 0, 2) / (2 * simpson((u) => t(Math.tan(u)) / Math.cos(u) ** 2, 0, Math.PI / 2 - 1e-9))
    expect(studentProbability(2, df)).toBeCloseTo(0.5 + half, 10)
    const mode = df - 2
    const chi = (x: number) => (x === 0 ? 0 : Math.exp(mode / 2 - x / 2 + (mode / 2) * Math.log(x / mode)))
    const end = df + 40 * Math.sqrt(2 * df) + 40
    expect(chiSquareProbability(df * 0.9, df)).toBeCloseTo(simpson(chi, 0, df * 0.9) / simpson(chi, 0, end), 7)
  })
})

describe('refusals', () => {
  it.each([NaN, -0.1, 1.1])('no quantile at %s', (p) => {
    for (const quantile of [() => studentQuantile(p, 5), () => chiSquareQuantile(p, 5), () => fQuantile(p, 5, 5)]) {
      expect(quantile).toThrow(CoreError)
    }
  })

  it.each([NaN, 0, -1, 1e10])('no distribution of %s degrees of freedom', (df) => {
    for (const call of [
      () => studentQuantile(0.5, df),
      () => studentProbability(1, df),
      () => chiSquareQuantile(0, df),
      () => chiSquareProbability(1, df),
      () => fQuantile(1, df, 5),
      () => fProbability(1, 5, df),
    ]) {
      expect(call).toThrow(CoreError)
    }
  })

  it('no probability at NaN, nor of a negative sum of squares', () => {
    expect(() => studentProbability(NaN, 5)).toThrow(CoreError)
    expect(() => chiSquareProbability(-1, 5)).toThrow(CoreError)
    expect(() => fProbability(-1, 5, 5)).toThrow(CoreError)
  })
})

function simpson(f: (x: number) => number, from: number, to: number, steps = 20_000): number {
  const h = (to - from) / steps
  let sum = f(from) + f(to)
  for (let i = 1; i < steps; i++) sum += (i % 2 === 0 ? 2 : 4) * f(from + i * h)
  return (sum * h) / 3
}
