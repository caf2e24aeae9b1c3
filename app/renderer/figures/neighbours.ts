/** Which site lies that way: the arrow keys move by place, not by number. */

export type Direction = 'left' | 'right' | 'up' | 'down'

const STEPS: Readonly<Record<Direction, readonly [number, number]>> = {
  left: [-1, 0], right: [1, 0], up: [0, 1], down: [0, -1],
} // prettier-ignore

/** How much a step aside counts against a step along. */
const ASIDE = 2.5

/** The row of the nearest place that way, a place aside counting as farther; `from` itself where there is none. */
export function neighbour(
  x_mm: ArrayLike<number>,
  y_mm: ArrayLike<number>,
  from: number,
  direction: Direction,
): number {
  const [dx, dy] = STEPS[direction]
  let best = from
  let least = Infinity
  for (let i = 0; i < x_mm.length; i++) {
    const along = (x_mm[i] - x_mm[from]) * dx + (y_mm[i] - y_mm[from]) * dy
    const aside = Math.abs((x_mm[i] - x_mm[from]) * dy) + Math.abs((y_mm[i] - y_mm[from]) * dx)
    if (!(along > 1e-6) || aside > ASIDE * along) continue
    const distance = along + ASIDE * aside
    if (distance >= least) continue
    least = distance
    best = i
  }
  return best
}

/** The row nearest the centre; -1 where no row has a place. */
export function centralRow(x_mm: ArrayLike<number>, y_mm: ArrayLike<number>): number {
  let best = -1
  let least = Infinity
  for (let i = 0; i < x_mm.length; i++) {
    const distance = Math.hypot(x_mm[i], y_mm[i])
    if (distance < least) {
      least = distance
      best = i
    }
  }
  return best
}
