/** Shapes that a process leaves on a wafer, as a plan is asked whether it would see them. */
export const EFFECT_IDS = ['tilt', 'bowl', 'edge', 'two-fold', 'spot'] as const
export type EffectId = (typeof EFFECT_IDS)[number]

/** Over the size, at a place in units of the usable radius. */
export type Shape = (x: number, y: number) => number

export interface Effect {
  readonly id: EffectId
  readonly title: string
  /** What its size is, as a phrase. */
  readonly size: string
  /**
   * Nobody knows beforehand which way a pattern lies, or where. `turned`: cos a times the first shape and sin a times the
   * second, at any a, if there are two. `placed`: any one of them.
   */
  readonly family: 'turned' | 'placed'
  readonly shapes: readonly Shape[]
}

/** Where an edge roll-off begins, over the usable radius. Common practice, no source. */
export const EDGE_BEGINS = 0.8
/** Over the radius of the wafer. */
const SPOT_RADIUS = 0.2

export const EFFECTS: Readonly<Record<EffectId, Effect>> = {
  tilt: {
    id: 'tilt',
    title: 'tilt',
    size: 'from one edge to the other, in whatever direction',
    family: 'turned',
    shapes: [(x) => x / 2, (_, y) => y / 2],
  },
  bowl: {
    id: 'bowl',
    title: 'bowl',
    size: 'from the centre to the edge',
    family: 'turned',
    shapes: [(x, y) => x * x + y * y],
  },
  edge: {
    id: 'edge',
    title: 'edge roll-off',
    size: `at the edge, growing from ${EDGE_BEGINS} of the radius on`,
    family: 'turned',
    shapes: [(x, y) => Math.max(0, (Math.hypot(x, y) - EDGE_BEGINS) / (1 - EDGE_BEGINS))],
  },
  'two-fold': {
    id: 'two-fold',
    title: 'two-fold pattern',
    size: 'from high to low along the edge, however it is turned',
    family: 'turned',
    shapes: [(x, y) => (x * x - y * y) / 2, (x, y) => x * y],
  },
  spot: {
    id: 'spot',
    title: 'spot',
    size: `in the middle of a spot ${2 * SPOT_RADIUS} radii across, wherever it lies`,
    family: 'placed',
    shapes: spotPlaces().map(([atX, atY]) => (x, y) => Math.exp((-2 * ((x - atX) ** 2 + (y - atY) ** 2)) / SPOT_RADIUS ** 2)),
  },
} // prettier-ignore

/** Middles of spots that lie whole on the usable area, half their radius apart. */
function spotPlaces(): readonly (readonly [number, number])[] {
  const step = SPOT_RADIUS / 2
  const reach = Math.floor((1 - SPOT_RADIUS) / step)
  const along = Array.from({ length: 2 * reach + 1 }, (_, k) => (k - reach) * step)
  return along.flatMap((x) =>
    along.flatMap((y): [number, number][] => (Math.hypot(x, y) <= 1 - SPOT_RADIUS + 1e-9 ? [[x, y]] : [])),
  )
}
