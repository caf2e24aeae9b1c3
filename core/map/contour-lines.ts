/** Lines of equal value in mm, and where on each its label goes. Bands to fill are in `contours.ts`. */
import { requireRange } from '../problems/problem'
import { edgeDistance_mm, type Outline } from '../wafer/outline'
import type { RasterGrid } from './grid'

export interface ContourLine {
  readonly value: number
  /** x and y in turn; the higher values lie to the left as one goes along. */
  readonly places_mm: readonly number[]
  /** It ends where it began, which is not repeated; else it ends where the values do. */
  readonly isClosed: boolean
  /** Null where no part of it lies far enough within the edge. */
  readonly label: LabelAnchor | null
}

export interface LabelAnchor {
  readonly x_mm: number
  readonly y_mm: number
  /** Of the line there, anticlockwise from +x, above -90 to 90, so that text along it stands upright. */
  readonly angle_deg: number
}

/**
 * Marching squares on the points of the raster, linear between them. A cell with a point without a value has no line.
 *
 * @param cells       one value a cell of the grid, NaN where there is none (`cellsWithMargin`)
 * @param thresholds  finite
 * @param labels      outline on which labels must lie, and how far within its edge
 * @returns by threshold in the order given, each line once
 */
export function contourLines(
  grid: RasterGrid,
  cells: Float64Array,
  thresholds: readonly number[],
  labels: { readonly outline: Outline; readonly margin_mm: number },
): ContourLine[] {
  requireRange('margin of contour labels', labels.margin_mm, 'mm', 0, 1e4)
  return thresholds.flatMap((value) => {
    requireRange('contour threshold', value, '', -1e300, 1e300)
    return joined(segments(grid, cells, value)).flatMap(({ edges, isClosed }): ContourLine[] => {
      const places_mm = distinct(
        edges.map((edge) => crossing(grid, cells, value, edge)),
        isClosed,
      )
      if (places_mm.length < 4) return []
      return [{ value, places_mm, isClosed, label: labelAnchor(places_mm, isClosed, labels) }]
    })
  })
}

/** From edge to edge of the raster. An edge is 2 * cell for the one to the right of a point, 2 * cell + 1 for the one up from it. */
type Segments = Map<number, number>

/**
 * Every segment runs with the higher values on its left, so that an edge is left once and entered once. Corners are
 * taken anticlockwise from the lower left; a segment begins on the side where one comes down from high to low.
 */
function segments({ columns, rows }: RasterGrid, cells: Float64Array, value: number): Segments {
  const next: Segments = new Map()
  for (let row = 0; row < rows - 1; row++) {
    for (let column = 0; column < columns - 1; column++) {
      const cell = row * columns + column
      const corners = [cell, cell + 1, cell + columns + 1, cell + columns]
      const sides = [2 * cell, 2 * (cell + 1) + 1, 2 * (cell + columns), 2 * cell + 1]
      const sum = corners.reduce((total, corner) => total + cells[corner], 0)
      if (Number.isNaN(sum)) continue
      const isHigh = corners.map((corner) => cells[corner] >= value)
      const falls = [0, 1, 2, 3].filter((side) => isHigh[side] && !isHigh[(side + 1) % 4])
      const rises = [0, 1, 2, 3].filter((side) => !isHigh[side] && isHigh[(side + 1) % 4])
      // Where two opposite corners are high, the middle tells whether they are joined across.
      const turn = falls.length === 2 && sum / 4 >= value ? 1 : 3
      for (const side of falls) {
        const end = rises.length === 1 ? rises[0] : (side + turn) % 4
        next.set(sides[side], sides[end])
      }
    }
  }
  return next
}

function joined(next: Segments): { readonly edges: readonly number[]; readonly isClosed: boolean }[] {
  const entered = new Set(next.values())
  const open = [...next.keys()].filter((edge) => !entered.has(edge))
  const lines = open.map((start) => ({ edges: follow(next, start), isClosed: false }))
  // What is left goes round.
  for (const start of next.keys()) lines.push({ edges: follow(next, start), isClosed: true })
  return lines
}

/** Takes the segments it follows out of the map. */
function follow(next: Segments, start: number): number[] {
  const edges = [start]
  for (let edge = start; ;) {
    const end = next.get(edge)
    next.delete(edge)
    if (end === undefined || end === start) return edges
    edges.push(end)
    edge = end
  }
}

function crossing(grid: RasterGrid, cells: Float64Array, value: number, edge: number): [number, number] {
  const cell = Math.floor(edge / 2)
  const isUp = edge % 2 === 1
  const [low, high] = [cells[cell], cells[cell + (isUp ? grid.columns : 1)]]
  const share = (value - low) / (high - low)
  const column = cell % grid.columns
  const row = Math.floor(cell / grid.columns)
  return [grid.x_mm[column] + (isUp ? 0 : share * grid.step_mm), grid.y_mm[row] + (isUp ? share * grid.step_mm : 0)]
}

/** A line through a point of the raster crosses two edges there, and round a peak as high as the threshold all of them. */
function distinct(places: readonly (readonly [number, number])[], isClosed: boolean): number[] {
  return places.flatMap((place, i) => {
    const before = places[i > 0 || !isClosed ? i - 1 : places.length - 1]
    return before?.[0] === place[0] && before[1] === place[1] ? [] : place
  })
}

/** Half way along the longest part of the line that lies within the margin. */
function labelAnchor(
  places_mm: readonly number[],
  isClosed: boolean,
  { outline, margin_mm }: { readonly outline: Outline; readonly margin_mm: number },
): LabelAnchor | null {
  const count = places_mm.length / 2
  const place = (i: number): [number, number] => [places_mm[2 * (i % count)], places_mm[2 * (i % count) + 1]]
  const isWithin = (i: number) => edgeDistance_mm(outline, ...place(i)) >= margin_mm
  let longest = { start: 0, end: 0, length: 0 }
  let run = { start: 0, end: 0, length: 0 }
  for (let i = 0; i < (isClosed ? count : count - 1); i++) {
    if (!isWithin(i) || !isWithin(i + 1)) continue
    const [[ax, ay], [bx, by]] = [place(i), place(i + 1)]
    const length = Math.hypot(bx - ax, by - ay)
    run =
      run.end === i && run.length > 0
        ? { ...run, end: i + 1, length: run.length + length }
        : { start: i, end: i + 1, length }
    if (run.length > longest.length) longest = run
  }
  return longest.length > 0 ? halfWay(longest, place) : null
}

function halfWay(
  { start, end, length }: { readonly start: number; readonly end: number; readonly length: number },
  place: (i: number) => [number, number],
): LabelAnchor | null {
  let gone = 0
  for (let i = start; i < end; i++) {
    const [[ax, ay], [bx, by]] = [place(i), place(i + 1)]
    const step = Math.hypot(bx - ax, by - ay)
    if (gone + step >= length / 2 && step > 0) {
      const share = (length / 2 - gone) / step
      return { x_mm: ax + share * (bx - ax), y_mm: ay + share * (by - ay), angle_deg: upright_deg(bx - ax, by - ay) }
    }
    gone += step
  }
  return null
}

function upright_deg(dx: number, dy: number): number {
  const angle = (Math.atan2(dy, dx) * 180) / Math.PI
  if (angle > 90) return angle - 180
  return angle <= -90 ? angle + 180 : angle
}
