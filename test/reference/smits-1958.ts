/**
 * F. M. Smits, Measurement of Sheet Resistivities with the Four-Point Probe, Bell Syst. Tech. J. 37 (1958) 711-718.
 * Both tables from memory.
 */

/** Table of the circle: C against d/s, probe at the centre. At 7.5, 10, 15, 40 the fourth decimal is off by up to 4. */
export const SMITS_CIRCLE: readonly (readonly [diameterOverSpacing: number, factor: number])[] = [
  [3, 2.2662],
  [4, 2.9289],
  [5, 3.3625],
  [7.5, 3.9273],
  [10, 4.1716],
  [15, 4.3646],
  [20, 4.4364],
  [40, 4.5076],
]
export const SMITS_CIRCLE_TOLERANCE = 5e-4

/** Table of the rectangle: side d across the pin line in pitches, ratio a/d (a along the line), C. */
export const SMITS_RECTANGLE: readonly (readonly [dOverS: number, aOverD: number, factor: number])[] = [
  [1, 3, 0.9988],
  [1, 4, 0.9994],
  [1.25, 3, 1.2467],
  [1.25, 4, 1.2248],
  [1.5, 2, 1.4788],
  [1.5, 3, 1.4893],
  [1.5, 4, 1.4893],
  [1.75, 2, 1.7196],
  [1.75, 3, 1.7238],
  [1.75, 4, 1.7238],
  [2, 2, 1.9454],
  [2, 3, 1.9475],
  [2, 4, 1.9475],
  [2.5, 2, 2.3532],
  [2.5, 3, 2.3541],
  [2.5, 4, 2.3541],
  [3, 1, 2.4575],
  [3, 2, 2.7],
  [3, 3, 2.7005],
  [3, 4, 2.7005],
  [4, 1, 3.1137],
  [4, 2, 3.2246],
  [4, 3, 3.2248],
  [4, 4, 3.2248],
  [5, 1, 3.5098],
  [5, 2, 3.5749],
  [5, 3, 3.575],
  [5, 4, 3.575],
  [7.5, 1, 4.0095],
  [7.5, 2, 4.0361],
  [7.5, 3, 4.0362],
  [7.5, 4, 4.0362],
  [10, 1, 4.2209],
  [10, 2, 4.2357],
  [10, 3, 4.2357],
  [10, 4, 4.2357],
  [15, 1, 4.3882],
  [15, 2, 4.3947],
  [15, 3, 4.3947],
  [15, 4, 4.3947],
  [20, 1, 4.4516],
  [20, 2, 4.4553],
  [20, 3, 4.4553],
  [20, 4, 4.4553],
  [40, 1, 4.512],
  [40, 2, 4.5129],
  [40, 3, 4.5129],
  [40, 4, 4.5129],
]
/** Absolute. The printed table is off by up to 2e-3, at d/s = 20. */
export const SMITS_RECTANGLE_TOLERANCE = 2.5e-3
/**
 * One entry stands apart: at d/s = 1.25, a/d = 4 the table as remembered has 1.2248, lower than the 1.2467 of the
 * shorter rectangle a/d = 3, though C can only grow with a. Taken for a misprint (or misremembered) of 1.2468.
 */
export const SMITS_RECTANGLE_MISPRINT = { dOverS: 1.25, aOverD: 4 } as const

/** The same entries, exact, from image lattice and conformal map in agreement to 12 digits (not Smits'). */
export const RECTANGLE_EXACT: readonly (readonly [dOverS: number, aOverD: number, factor: number])[] = [
  [1, 3, 0.9988137],
  [1, 4, 0.9994054],
  [1.25, 3, 1.2466814],
  [1.25, 4, 1.2467556],
  [1.5, 2, 1.4787469],
  [1.5, 3, 1.4892779],
  [1.5, 4, 1.4892975],
  [1.75, 2, 1.7196531],
  [1.75, 3, 1.7238596],
  [1.75, 4, 1.7238674],
  [2, 2, 1.94539],
  [2, 3, 1.9475427],
  [2, 4, 1.9475467],
  [2.5, 2, 2.3532277],
  [2.5, 3, 2.3540872],
  [2.5, 4, 2.3540888],
  [3, 1, 2.456173],
  [3, 2, 2.7000498],
  [3, 3, 2.7005161],
  [3, 4, 2.700517],
  [4, 1, 3.1134307],
  [4, 2, 3.2243689],
  [4, 3, 3.2245782],
  [4, 4, 3.2245786],
  [5, 1, 3.5097518],
  [5, 2, 3.5748525],
  [5, 3, 3.5749747],
  [5, 4, 3.5749749],
  [7.5, 1, 4.0088878],
  [7.5, 2, 4.0357793],
  [7.5, 3, 4.0358296],
  [7.5, 4, 4.0358297],
  [10, 1, 4.2208081],
  [10, 2, 4.2356132],
  [10, 3, 4.2356408],
  [10, 4, 4.2356409],
  [15, 1, 4.3878176],
  [15, 2, 4.3943084],
  [15, 3, 4.3943205],
  [15, 4, 4.3943205],
  [20, 1, 4.4497778],
  [20, 2, 4.4534128],
  [20, 3, 4.4534196],
  [20, 4, 4.4534196],
  [40, 1, 4.5113959],
  [40, 2, 4.512301],
  [40, 3, 4.5123027],
  [40, 4, 4.5123027],
]

/** Smits' thickness factors, from memory. */
export const SMITS_THICKNESS: readonly (readonly [thicknessRatio: number, factor: number])[] = [
  [0.5, 0.9974],
  [1, 0.9214],
  [2, 0.6337],
]
