/** Sites by place: which lie in a window, which is nearest. A regular grid, so that a hundred thousand are no burden. */

export interface SiteGrid {
  /** Rows of the columns whose place lies in the window. */
  within(window: PlaceWindow): number[]
  /** The row nearest to a place and no farther than `reach_mm`; -1 where there is none. */
  nearest(x_mm: number, y_mm: number, reach_mm: number): number
}

export interface PlaceWindow {
  readonly left_mm: number
  readonly right_mm: number
  readonly bottom_mm: number
  readonly top_mm: number
}

const SITES_PER_CELL = 4

/** Rows without a place are in no cell. */
export function siteGrid(x_mm: ArrayLike<number>, y_mm: ArrayLike<number>): SiteGrid {
  const placed = placedRows(x_mm, y_mm)
  const box = boxOf(placed, x_mm, y_mm)
  const across = Math.max(1, Math.ceil(Math.sqrt(placed.length / SITES_PER_CELL)))
  const width = Math.max(1e-9, (box.right_mm - box.left_mm) / across)
  const height = Math.max(1e-9, (box.top_mm - box.bottom_mm) / across)
  const clamp = (cell: number): number => Math.min(across - 1, Math.max(0, Math.floor(cell)))
  const column = (x: number): number => clamp((x - box.left_mm) / width)
  const row = (y: number): number => clamp((y - box.bottom_mm) / height)
  const { start, order } = sorted(placed, across * across, (i) => row(y_mm[i]) * across + column(x_mm[i]))

  function within(window: PlaceWindow): number[] {
    const found: number[] = []
    if (window.right_mm < box.left_mm || window.left_mm > box.right_mm) return found
    for (let r = row(window.bottom_mm); r <= row(window.top_mm); r++) {
      for (let c = column(window.left_mm); c <= column(window.right_mm); c++) {
        const cell = r * across + c
        for (let k = start[cell]; k < start[cell + 1]; k++) if (isInside(window, order[k])) found.push(order[k])
      }
    }
    return found
  }
  function isInside(window: PlaceWindow, i: number): boolean {
    const { left_mm, right_mm, bottom_mm, top_mm } = window
    return x_mm[i] >= left_mm && x_mm[i] <= right_mm && y_mm[i] >= bottom_mm && y_mm[i] <= top_mm
  }
  function nearest(x: number, y: number, reach_mm: number): number {
    let best = -1
    let least = reach_mm
    const near = { left_mm: x - reach_mm, right_mm: x + reach_mm, bottom_mm: y - reach_mm, top_mm: y + reach_mm }
    for (const i of within(near)) {
      const distance = Math.hypot(x_mm[i] - x, y_mm[i] - y)
      if (distance > least) continue
      least = distance
      best = i
    }
    return best
  }
  return { within, nearest }
}

function placedRows(x_mm: ArrayLike<number>, y_mm: ArrayLike<number>): Uint32Array {
  const rows = new Uint32Array(x_mm.length)
  let count = 0
  for (let i = 0; i < x_mm.length; i++) if (Number.isFinite(x_mm[i]) && Number.isFinite(y_mm[i])) rows[count++] = i
  return rows.subarray(0, count)
}

function boxOf(rows: Uint32Array, x_mm: ArrayLike<number>, y_mm: ArrayLike<number>): PlaceWindow {
  let [left_mm, right_mm, bottom_mm, top_mm] = [Infinity, -Infinity, Infinity, -Infinity]
  for (const i of rows) {
    left_mm = Math.min(left_mm, x_mm[i])
    right_mm = Math.max(right_mm, x_mm[i])
    bottom_mm = Math.min(bottom_mm, y_mm[i])
    top_mm = Math.max(top_mm, y_mm[i])
  }
  return { left_mm, right_mm, bottom_mm, top_mm }
}

/** By cell, each cell's rows from start[cell] to start[cell + 1]. */
function sorted(rows: Uint32Array, cells: number, cellOf: (i: number) => number) {
  const start = new Uint32Array(cells + 1)
  for (const i of rows) start[cellOf(i) + 1]++
  for (let cell = 0; cell < cells; cell++) start[cell + 1] += start[cell]
  const next = start.slice()
  const order = new Uint32Array(rows.length)
  for (const i of rows) order[next[cellOf(i)]++] = i
  return { start, order }
}
