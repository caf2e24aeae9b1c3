/** SEMI MF1618-1104, Practice for determination of uniformity of thin films on silicon wafers. */

/** Concentric plan: number of circles and of sites. */
export const CONCENTRIC_PLANS = [
  [3, 49],
  [4, 81],
  [5, 121],
  [6, 169],
  [7, 225],
  [8, 289],
] as const

/** Cartesian plan: number of rows and of sites. */
export const CARTESIAN_PLANS = [
  [7, 37],
  [9, 69],
  [11, 97],
  [13, 137],
  [15, 177],
  [17, 225],
] as const

/** SUP = 100 s / mean and HLV = 200 (max - min) / (max + min), worked by hand on 90, 92, 94, 96, 98. */
export const BY_HAND = {
  values: [90, 92, 94, 96, 98],
  /** Mean 94; squares 16 + 4 + 0 + 4 + 16 = 40; s = sqrt(40 / 4). */
  sup: (100 * Math.sqrt(10)) / 94,
  /** 200 * 8 / 188. */
  hlv: 1600 / 188,
} as const
