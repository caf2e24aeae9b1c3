import { describe, expect, it } from 'vitest'
import { cellsWithMargin, rasterGrid } from '../../../core/map/grid'
import { CoreError } from '../../../core/problems/problem'

const disc = { shape: 'disc', diameter_mm: 200, fiducial: 'notch' } as const
const grid = rasterGrid(disc, 41)

describe('the raster', () => {
  it('has its points through the centre, evenly, and so many across', () => {
    expect(grid.step_mm).toBe(5)
    expect(grid.x_mm[(grid.columns - 1) / 2]).toBe(0)
    expect(grid.y_mm[(grid.rows - 1) / 2]).toBe(0)
    expect(grid.x_mm.filter((x) => Math.abs(x) <= 100)).toHaveLength(41)
  })

  it('values stand in their cells, on the wafer and around it', () => {
    const cells = cellsWithMargin(grid, grid.targets.x_mm.map((x, t) => x + 1000 * grid.targets.y_mm[t])) // prettier-ignore
    let on = 0
    for (let row = 0; row < grid.rows; row++) {
      for (let column = 0; column < grid.columns; column++) {
        const [x, y] = [grid.x_mm[column], grid.y_mm[row]]
        if (Math.hypot(x, y) > 100) continue
        expect(cells[row * grid.columns + column]).toBe(x + 1000 * y)
        on++
      }
    }
    expect(on).toBe(grid.onWafer.reduce((sum, flag) => sum + flag, 0))
    // Area of the disc in cells of 25 mm^2, to the cells along the edge.
    expect(Math.abs(on - (Math.PI * 1e4) / 25)).toBeLessThan(20)
  })

  it('with its margin, every point on the wafer has all eight neighbours', () => {
    const cells = cellsWithMargin(grid, new Float64Array(grid.cell.length).fill(1))
    grid.cell.forEach((cell, t) => {
      if (!grid.onWafer[t]) return
      for (const dy of [-1, 0, 1]) for (const dx of [-1, 0, 1]) expect(cells[cell + dy * grid.columns + dx]).toBe(1)
    })
  })

  it('of a rectangle is as long and wide as it', () => {
    const { columns, rows } = rasterGrid({ shape: 'rectangle', width_mm: 100, height_mm: 50 }, 21)
    expect([columns, rows]).toEqual([23, 13])
  })
})

describe('refusals', () => {
  it.each([
    ['no edges', () => rasterGrid({ shape: 'infinite' }, 41)],
    ['one point', () => rasterGrid(disc, 1)],
    ['no number of points', () => rasterGrid(disc, NaN)],
  ])('%s', (_, call) => expect(call).toThrow(CoreError))
})
