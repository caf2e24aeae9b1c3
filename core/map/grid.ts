/** A wafer as a regular raster, for pictures. */
import { CoreError, requireRange } from '../problems/problem'
import { edgeDistance_mm, type Outline } from '../wafer/outline'

export interface RasterGrid {
  readonly columns: number
  readonly rows: number
  readonly step_mm: number
  /** Of each column, ascending, and of each row, from the bottom up. */
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  /** The points that get a value: on the wafer or so near its edge that a contour can run out over it. */
  readonly targets: { readonly x_mm: Float64Array; readonly y_mm: Float64Array }
  /** For each target its cell, row * columns + column. */
  readonly cell: Uint32Array
  /** 1 for each target on the wafer itself. */
  readonly onWafer: Uint8Array
}

/** How far beyond the edge values are wanted, in steps: a diagonal neighbour of every point on the wafer. */
const MARGIN_STEPS = 1.5

/**
 * @param outline  with edges
 * @param across   points over the longer side, 2 to 2000
 * @throws CoreError not-applicable for an outline without edges
 */
export function rasterGrid(outline: Outline, across: number): RasterGrid {
  requireRange('raster points across', across, '', 2, 2000)
  const { width_mm, height_mm } = size(outline)
  const step_mm = Math.max(width_mm, height_mm) / (Math.round(across) - 1)
  const x_mm = centredAxis(width_mm, step_mm)
  const y_mm = centredAxis(height_mm, step_mm)
  const cells: number[] = []
  for (let row = 0; row < y_mm.length; row++) {
    for (let column = 0; column < x_mm.length; column++) {
      const distance_mm = edgeDistance_mm(outline, x_mm[column]!, y_mm[row]!)
      if (distance_mm >= -MARGIN_STEPS * step_mm) cells.push(row * x_mm.length + column)
    }
  }
  const targets = {
    x_mm: Float64Array.from(cells, (cell) => x_mm[cell % x_mm.length]!),
    y_mm: Float64Array.from(cells, (cell) => y_mm[Math.floor(cell / x_mm.length)]!),
  }
  const onWafer = Uint8Array.from(cells, (_, t) =>
    edgeDistance_mm(outline, targets.x_mm[t]!, targets.y_mm[t]!) >= 0 ? 1 : 0,
  )
  return {
    columns: x_mm.length,
    rows: y_mm.length,
    step_mm,
    x_mm,
    y_mm,
    targets,
    cell: Uint32Array.from(cells),
    onWafer,
  }
}

/** One value a cell from one a target, with the margin beyond the edge: contours are clipped to the outline when drawn. */
export function cellsWithMargin(grid: RasterGrid, values: Float64Array): Float64Array {
  const cells = new Float64Array(grid.columns * grid.rows).fill(NaN)
  for (let t = 0; t < grid.cell.length; t++) cells[grid.cell[t]] = values[t]
  return cells
}

/** Points through zero that reach at least one step beyond either end. */
function centredAxis(length_mm: number, step_mm: number): Float64Array {
  const half = Math.ceil(length_mm / 2 / step_mm - 1e-9) + 1
  return Float64Array.from({ length: 2 * half + 1 }, (_, i) => (i - half) * step_mm)
}

function size(outline: Outline): { width_mm: number; height_mm: number } {
  switch (outline.shape) {
    case 'disc':
      return { width_mm: outline.diameter_mm, height_mm: outline.diameter_mm }
    case 'rectangle':
      return { width_mm: outline.width_mm, height_mm: outline.height_mm }
    case 'infinite':
      throw new CoreError({ kind: 'not-applicable', what: 'wafer raster', why: 'its edges are not known' })
  }
}
