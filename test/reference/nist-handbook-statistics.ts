/**
 * NIST/SEMATECH e-Handbook of Statistical Methods, https://www.itl.nist.gov/div898/handbook/: worked examples and tables.
 * Data in `nist/handbook-*.csv`. Figures as printed; a test may ask for half a unit of their last digit.
 */

/** 3.5.1.4: oxide thickness, 2 wafers in 4 zones in 21 furnace runs (angstrom). */
export const FURNACE_ANOVA = {
  outer: { ss: 61442.29, df: 20, ms: 3072.11, f: 5.37404, p: 1.4e-7, variance: 312.55694, percent: 47.44, s: 17.679 },
  middle: { ss: 36014.5, df: 63, ms: 571.659, f: 4.72864, p: 3.85e-11, variance: 225.38294, percent: 34.21, s: 15.013 },
  inner: { ss: 10155, df: 84, ms: 120.893, variance: 120.89286, percent: 18.35, s: 10.995 },
  total: { ss: 107611.8, df: 167 },
} as const

/**
 * 3.5.1.2: capability of the same 168 values. The page also prints intervals of Cpl, 1.21845 to 1.48753, and of Cpu,
 * 1.14217 to 1.40436, narrower than that of the Cpk that equals Cpu, by a formula that it doesn't state.
 */
export const FURNACE_CAPABILITY = {
  limits: { lower: 460, upper: 660 },
  mean: [563.0357, 559.1692, 566.9023],
  standardDeviation: [25.3847, 22.9297, 28.4331],
  cp: [1.31313, 1.17234, 1.45372],
  cpl: 1.35299,
  cpu: 1.27327,
  cpk: [1.27327, 1.12771, 1.41882],
} as const

/** 1.3.5.17.3: Rosner's 54 values (Technometrics 25 (1983) 165): statistic and critical value, alpha 0.05. */
export const ROSNER_STEPS = [
  [3.118906, 3.158794],
  [2.942973, 3.15143],
  [3.179424, 3.14389],
  [2.810181, 3.136165],
  [2.81558, 3.128247],
  [2.848172, 3.120128],
  [2.279327, 3.111796],
  [2.310366, 3.103243],
  [2.101581, 3.094456],
  [2.067178, 3.085425],
] as const

/** 1.3.5.17.1: eight mass spectrometer measurements of a uranium isotope (Tietjen and Moore 1972). */
export const GRUBBS_URANIUM = {
  values: [199.31, 199.53, 200.19, 200.82, 201.92, 201.95, 202.18, 245.57],
  statistic: 2.468765,
  criticalLargest: 2.031652,
  /** Printed 2.126, cut rather than rounded. */
  criticalEither: 2.1266,
} as const

/** 1.4.2.8 and 1.3.5.2: 195 calibration factors of a heat flow meter; printed from single precision. */
export const ZARR13 = {
  mean: 9.26146,
  standardDeviation: 0.022789,
  interval: [9.258242, 9.264679],
  /** A squared times 1 + 4/n - 25/n^2, the adjustment of 1974. */
  andersonDarling1974: 0.129,
} as const

/** 1.3.6.7.2: upper critical values of Student's t. */
export const T_TAIL = [0.1, 0.05, 0.025, 0.01, 0.005] as const
export const T_TABLE: readonly (readonly number[])[] = [
  [1, 3.078, 6.314, 12.706, 31.821, 63.657],
  [2, 1.886, 2.92, 4.303, 6.965, 9.925],
  [3, 1.638, 2.353, 3.182, 4.541, 5.841],
  [4, 1.533, 2.132, 2.776, 3.747, 4.604],
  [5, 1.476, 2.015, 2.571, 3.365, 4.032],
  [6, 1.44, 1.943, 2.447, 3.143, 3.707],
  [7, 1.415, 1.895, 2.365, 2.998, 3.499],
  [8, 1.397, 1.86, 2.306, 2.896, 3.355],
  [10, 1.372, 1.812, 2.228, 2.764, 3.169],
  [15, 1.341, 1.753, 2.131, 2.602, 2.947],
  [24, 1.318, 1.711, 2.064, 2.492, 2.797],
  [30, 1.31, 1.697, 2.042, 2.457, 2.75],
  [60, 1.296, 1.671, 2, 2.39, 2.66],
  [100, 1.29, 1.66, 1.984, 2.364, 2.626],
]

/**
 * The same table's column for a tail of 0.001. Left out: 318.313 for 1 degree of freedom (its closed form gives 318.309),
 * and 4.782, 4.499, 4.296, 4.143, 4.024, 3.929 for 7 to 12, which are 1 to 3 units low in the last place.
 */
export const T_TAIL_0_001: readonly (readonly [df: number, t: number])[] = [
  [2, 22.327], [3, 10.215], [4, 7.173], [5, 5.893], [6, 5.208], [13, 3.852], [20, 3.552], [30, 3.385], [100, 3.174],
] // prettier-ignore

/** 1.3.6.7.4: critical values of chi-square below which those probabilities lie (the upper ones from memory). */
export const CHI_SQUARE_P = [0.001, 0.01, 0.025, 0.05, 0.1, 0.9, 0.95, 0.975, 0.99, 0.999] as const
export const CHI_SQUARE_TABLE: readonly (readonly number[])[] = [
  [2, 0.002, 0.02, 0.051, 0.103, 0.211, 4.605, 5.991, 7.378, 9.21, 13.816],
  [5, 0.21, 0.554, 0.831, 1.145, 1.61, 9.236, 11.07, 12.833, 15.086, 20.515],
  [10, 1.479, 2.558, 3.247, 3.94, 4.865, 15.987, 18.307, 20.483, 23.209, 29.588],
  [30, 11.588, 14.953, 16.791, 18.493, 20.599, 40.256, 43.773, 46.979, 50.892, 59.703],
  [100, 61.918, 70.065, 74.222, 77.929, 82.358, 118.498, 124.342, 129.561, 135.807, 149.449],
]

/** 1.3.6.7.3: F below which a share of p lies, degrees of freedom above and below the line (from memory). */
export const F_TABLE: readonly (readonly [p: number, above: number, below: number, f: number])[] = [
  [0.95, 1, 1, 161.448], [0.95, 1, 10, 4.965], [0.95, 2, 2, 19], [0.95, 2, 10, 4.103], [0.95, 5, 10, 3.326],
  [0.95, 10, 10, 2.978], [0.95, 20, 10, 2.774], [0.95, 10, 20, 2.348], [0.95, 10, 60, 1.993], [0.99, 1, 10, 10.044],
  [0.99, 5, 10, 5.636], [0.99, 10, 10, 4.849], [0.99, 2, 5, 13.274],
] // prettier-ignore
