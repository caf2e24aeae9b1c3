import { describe, expect, it } from 'vitest'
import { chebyshevJet, chebyshevPanel, chebyshevPanels } from '../../../core/numeric/chebyshev'
import type { Jet } from '../../../core/numeric/chebyshev'

const emptyJet = (): Jet => ({ value: 0, slope: 0, curvature: 0 })

describe('Chebyshev panel', () => {
  it('returns a polynomial of degree 15 and its derivatives', () => {
    const panel = chebyshevPanel((x) => x ** 15 - 2 * x ** 3, -1, 1.5)
    for (const x of [-1, -0.3, 0, 0.8, 1.5]) {
      const { value, slope, curvature } = chebyshevJet(panel, x, emptyJet())
      expect(value).toBeCloseTo(x ** 15 - 2 * x ** 3, 9)
      expect(slope).toBeCloseTo(15 * x ** 14 - 6 * x ** 2, 8)
      expect(curvature).toBeCloseTo(210 * x ** 13 - 12 * x, 6)
    }
  })

  it('gives value, slope and curvature of an exponential at both ends too', () => {
    const panel = chebyshevPanel((x) => Math.exp(2 * x), 0, 1)
    for (const x of [0, 0.37, 1]) {
      const jet = chebyshevJet(panel, x, emptyJet())
      expect(jet.value / Math.exp(2 * x)).toBeCloseTo(1, 13)
      expect(jet.slope / (2 * Math.exp(2 * x))).toBeCloseTo(1, 12)
      expect(jet.curvature / (4 * Math.exp(2 * x))).toBeCloseTo(1, 10)
    }
  })
})

describe('Chebyshev panels', () => {
  const plan = { from: -6, to: 6, widest: 2, narrowest: 1 / 64, tolerance: 1e-12 }

  it('follow each other without a gap and never exceed the widest', () => {
    const panels = chebyshevPanels((x) => 1 / (1 + x * x), plan)
    expect(panels[0].from).toBe(-6)
    expect(panels[panels.length - 1].to).toBe(6)
    panels.slice(1).forEach((panel, i) => expect(panel.from).toBe(panels[i].to))
    expect(Math.max(...panels.map(({ from, to }) => to - from))).toBeLessThanOrEqual(2)
  })

  it('are split where the function bends, until it is met to the tolerance', () => {
    const f = (x: number) => 1 / (1 + 25 * x * x)
    const panels = chebyshevPanels(f, plan)
    expect(panels.every(({ isResolved }) => isResolved)).toBe(true)
    expect(panels.length).toBeGreaterThan(6)
    for (const panel of panels) {
      const x = panel.from + 0.31 * (panel.to - panel.from)
      expect(Math.abs(chebyshevJet(panel, x, emptyJet()).value - f(x))).toBeLessThan(1e-11)
    }
  })

  it('say where a function is not smooth', () => {
    const panels = chebyshevPanels((x) => Math.abs(x - 0.3), plan)
    const rough = panels.filter(({ isResolved }) => !isResolved)
    expect(rough.length).toBeGreaterThan(0)
    for (const { from, to } of rough) expect(from <= 0.3 && to >= 0.3).toBe(true)
  })
})
