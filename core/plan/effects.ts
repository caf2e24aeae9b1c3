/** Shapes that a process leaves on a wafer, as a plan is asked whether it would see them. */
export const EFFECT_IDS = ['tilt', 'bowl', 'edge', 'two-fold', 'spot'] as const
export type EffectId = (typeof EFFECT_IDS)[number]

export interface Effect {
  readonly id: EffectId
  readonly title: string
  /** What its size is, as a phrase. */
  readonly size: string
  /** Over the size, at a place in units of the usable radius. */
  readonly shape: (x: number, y: number) => number
}

/** Where an edge roll-off begins, over the usable radius. Common practice, no source. */
export const EDGE_BEGINS = 0.8
/** Radius of a spot over that of the wafer, and where it lies. */
const SPOT_RADIUS = 0.2
const SPOT_PLACE = [0.45, 0.3] as const

export const EFFECTS: Readonly<Record<EffectId, Effect>> = {
  tilt: {
    id: 'tilt',
    title: 'tilt',
    size: 'from one edge to the other',
    shape: (x) => x / 2,
  },
  bowl: {
    id: 'bowl',
    title: 'bowl',
    size: 'from the centre to the edge',
    shape: (x, y) => x * x + y * y,
  },
  edge: {
    id: 'edge',
    title: 'edge roll-off',
    size: `at the edge, growing from ${EDGE_BEGINS} of the radius on`,
    shape: (x, y) => Math.max(0, (Math.hypot(x, y) - EDGE_BEGINS) / (1 - EDGE_BEGINS)),
  },
  'two-fold': {
    id: 'two-fold',
    title: 'two-fold pattern',
    size: 'from high to low along the edge',
    shape: (x, y) => (x * x - y * y) / 2,
  },
  spot: {
    id: 'spot',
    title: 'spot',
    size: `in the middle of a spot ${2 * SPOT_RADIUS} radii across`,
    shape: (x, y) => Math.exp(-(((x - SPOT_PLACE[0]) / SPOT_RADIUS) ** 2 + ((y - SPOT_PLACE[1]) / SPOT_RADIUS) ** 2) * 2),
  },
} // prettier-ignore
