import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { dieAt, dieCentre, dieLookup, isUsable, usableDies, type DieGrid } from '../../../core/wafer/die-grid'
import type { Outline } from '../../../core/wafer/outline'

const wafer200 = { shape: 'disc', diameter_mm: 200, fiducial: 'notch' } as const
const grid = { pitchX_mm: 10, pitchY_mm: 8, offsetX_mm: 0, offsetY_mm: 0 }

const outlines: fc.Arbitrary<Outline> = fc.oneof(
  fc.constant(wafer200),
  fc.constant({ shape: 'disc', diameter_mm: 100, fiducial: 'flat', flatLength_mm: 32.5 } as const),
  fc.constant({ shape: 'rectangle', width_mm: 120, height_mm: 70 } as const),
)
const grids: fc.Arbitrary<DieGrid> = fc.record({
  pitchX_mm: fc.double({ min: 3, max: 30, noNaN: true }),
  pitchY_mm: fc.double({ min: 3, max: 30, noNaN: true }),
  offsetX_mm: fc.double({ min: -40, max: 40, noNaN: true }),
  offsetY_mm: fc.double({ min: -40, max: 40, noNaN: true }),
})

/** The law itself, written out: every point of the die's rim is inside, sampled finely enough to catch a cut corner. */
function isWhollyInside(outline: Outline, exclusion: number, x: number, y: number, grid: DieGrid): boolean {
  const inside = (px: number, py: number) => {
    if (outline.shape === 'rectangle') {
      return (
        Math.abs(px) <= outline.width_mm / 2 - exclusion + 1e-9 &&
        Math.abs(py) <= outline.height_mm / 2 - exclusion + 1e-9
      )
    }
    if (outline.shape !== 'disc') return true
    const flat = outline.fiducial === 'flat' ? Math.sqrt(50 ** 2 - 16.25 ** 2) : Infinity
    return px * px + py * py <= (outline.diameter_mm / 2 - exclusion + 1e-9) ** 2 && py >= exclusion - flat - 1e-9
  }
  for (let i = 0; i <= 4; i++) {
    const s = (i / 4 - 0.5) * grid.pitchX_mm
    const t = (i / 4 - 0.5) * grid.pitchY_mm
    const [w, h] = [grid.pitchX_mm / 2, grid.pitchY_mm / 2]
    if (![inside(x + s, y - h), inside(x + s, y + h), inside(x - w, y + t), inside(x + w, y + t)].every(Boolean)) {
      return false
    }
  }
  return true
}

describe('by hand', () => {
  it('the four dies of a 20 x 20 mm piece', () => {
    const piece = { shape: 'rectangle', width_mm: 20, height_mm: 20 } as const
    const dies = usableDies({ outline: piece, edgeExclusion_mm: 0 }, { pitchX_mm: 10, pitchY_mm: 10, offsetX_mm: 5, offsetY_mm: 5 }) // prettier-ignore
    expect([...dies.dieX]).toEqual([-1, 0, -1, 0])
    expect([...dies.dieY]).toEqual([-1, -1, 0, 0])
    expect([...dies.x_mm]).toEqual([-5, 5, -5, 5])
  })

  it('a die whose corners just touch the usable circle is in, with less room it is out', () => {
    // Corners at (30, 40): radius 50.
    const one = { pitchX_mm: 60, pitchY_mm: 80, offsetX_mm: 0, offsetY_mm: 0 }
    const disc = { shape: 'disc', diameter_mm: 106, fiducial: 'none' } as const
    expect(usableDies({ outline: disc, edgeExclusion_mm: 3 }, one).count).toBe(1)
    expect(usableDies({ outline: disc, edgeExclusion_mm: 3.001 }, one).count).toBe(0)
  })

  it('an exclusion wider than the wafer leaves none', () => {
    expect(usableDies({ outline: wafer200, edgeExclusion_mm: 100 }, grid).count).toBe(0)
    expect(isUsable({ outline: wafer200, edgeExclusion_mm: 101 }, 0, 0)).toBe(false)
  })

  it('the flat bounds the usable area too', () => {
    const flat = { shape: 'disc', diameter_mm: 150, fiducial: 'flat', flatLength_mm: 57.5 } as const
    const round = { ...flat, fiducial: 'none' } as const
    expect(isUsable({ outline: flat, edgeExclusion_mm: 3 }, 0, -66.2)).toBe(true)
    expect(isUsable({ outline: flat, edgeExclusion_mm: 3 }, 0, -66.3)).toBe(false)
    expect(isUsable({ outline: round, edgeExclusion_mm: 3 }, 0, -66.3)).toBe(true)
  })
})

describe('laws', () => {
  it('no die sticks out, and none that fits is missing (brute force over all that could)', () => {
    fc.assert(
      fc.property(outlines, grids, fc.integer({ min: 0, max: 10 }), (outline, grid, edgeExclusion_mm) => {
        const dies = usableDies({ outline, edgeExclusion_mm }, grid)
        const found = new Set(Array.from(dies.dieX, (x, i) => `${x} ${dies.dieY[i]}`))
        expect(found.size).toBe(dies.count)
        const expected = new Set<string>()
        for (let y = -60; y <= 60; y++) {
          for (let x = -60; x <= 60; x++) {
            const centre = [grid.offsetX_mm + x * grid.pitchX_mm, grid.offsetY_mm + y * grid.pitchY_mm] as const
            if (isWhollyInside(outline, edgeExclusion_mm, ...centre, grid)) expected.add(`${x} ${y}`)
          }
        }
        expect(found).toEqual(expected)
      }),
      { numRuns: 60 },
    )
  })

  it('a place in a die is found in that die', () => {
    const within = fc.double({ min: -0.499, max: 0.499, noNaN: true })
    const die = fc.integer({ min: -50, max: 50 })
    fc.assert(
      fc.property(grids, die, die, within, within, (grid, dieX, dieY, s, t) => {
        const { x_mm, y_mm } = dieCentre(grid, dieX, dieY)
        expect(dieAt(grid, x_mm + s * grid.pitchX_mm, y_mm + t * grid.pitchY_mm)).toEqual({ dieX, dieY })
      }),
    )
  })

  it('the lookup finds each die, and no other', () => {
    const dies = usableDies({ outline: wafer200, edgeExclusion_mm: 5 }, grid)
    const rowOf = dieLookup(dies)
    for (let i = 0; i < dies.count; i++) expect(rowOf(dies.dieX[i]!, dies.dieY[i]!)).toBe(i)
    expect(rowOf(100, 0)).toBe(-1)
  })

  it('moving the grid by whole dies only renumbers them', () => {
    const area = { outline: wafer200, edgeExclusion_mm: 5 }
    const moved = usableDies(area, { ...grid, offsetX_mm: 30, offsetY_mm: -16 })
    expect(moved.x_mm).toEqual(usableDies(area, grid).x_mm)
    expect(moved.dieX).toEqual(usableDies(area, grid).dieX.map((die) => die - 3))
  })
})

describe('refusals', () => {
  const area = { outline: wafer200, edgeExclusion_mm: 5 }
  it.each([
    ['no edges', () => usableDies({ ...area, outline: { shape: 'infinite' } }, grid)],
    ['no pitch', () => usableDies(area, { ...grid, pitchX_mm: 0 })],
    ['a pitch that is no number', () => usableDies(area, { ...grid, pitchY_mm: NaN })],
    ['more dies than a wafer holds', () => usableDies(area, { ...grid, pitchX_mm: 0.01, pitchY_mm: 0.01 })],
  ])('%s', (_, call) => expect(call).toThrow(CoreError))
})
