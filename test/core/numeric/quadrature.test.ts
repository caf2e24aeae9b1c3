import { describe, expect, it } from 'vitest'
import { gaussLegendre, integratePanels } from '../../../core/numeric/quadrature'

describe('Gauss-Legendre rule', () => {
  it('has the published five points (Abramowitz and Stegun 1964, table 25.4)', () => {
    const { nodes, weights } = gaussLegendre(5)
    const published = [
      [0, 0.568888888888889],
      [0.538469310105683, 0.478628670499366],
      [0.906179845938664, 0.236926885056189],
    ]
    published.forEach(([x, w], i) => {
      expect(nodes[2 + i]).toBeCloseTo(x, 14)
      expect(nodes[2 - i]).toBeCloseTo(-x, 14)
      expect(weights[2 + i]).toBeCloseTo(w, 14)
      expect(weights[2 - i]).toBeCloseTo(w, 14)
    })
  })

  it('integrates every power up to 2n - 1 exactly, and not the next', () => {
    for (const order of [2, 7, 16]) {
      const rule = gaussLegendre(order)
      const moment = (power: number) => integratePanels((x) => x ** power, [-1, 1], rule)
      for (let power = 0; power < 2 * order; power++) {
        expect(moment(power)).toBeCloseTo(power % 2 === 0 ? 2 / (power + 1) : 0, 13)
      }
      expect(Math.abs(moment(2 * order) - 2 / (2 * order + 1))).toBeGreaterThan(1e-11)
    }
  })

  it('has weights that sum to 2', () => {
    const sum = gaussLegendre(16).weights.reduce((total, w) => total + w, 0)
    expect(sum).toBeCloseTo(2, 14)
  })
})

describe('integral over panels', () => {
  it('is the closed form of an exponential, however the range is cut', () => {
    const rule = gaussLegendre(16)
    const exact = 1 - Math.exp(-3)
    for (const edges of [
      [0, 3],
      [0, 0.1, 3],
      [0, 1, 2, 3],
    ]) {
      expect(integratePanels((x) => Math.exp(-x), edges, rule)).toBeCloseTo(exact, 14)
    }
  })

  it('takes a jump at an edge', () => {
    const step = (x: number) => (x < 0.3 ? 1 : 5)
    expect(integratePanels(step, [0, 0.3, 1], gaussLegendre(4))).toBeCloseTo(0.3 + 5 * 0.7, 14)
  })

  it('is zero over no panel', () => {
    expect(integratePanels(() => 1, [2], gaussLegendre(4))).toBe(0)
  })
})
