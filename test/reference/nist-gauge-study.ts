/**
 * Gauge study of five four-point probes (1, 281, 283, 2062, 2362) on five silicon wafers (138 to 142), two runs, six days
 * a run, six readings an occasion: NIST/SEMATECH e-Handbook of Statistical Methods 2.6.1 and 2.6.3, figures for probe 2362
 * as printed by NIST's own program for these pages. Half a unit of the last printed digit is allowed.
 */
export const PROBE_2362 = {
  repeatability: { standardDeviation: 0.07287, degreesOfFreedom: 300, half: 5e-6 },
  day: { standardDeviation: 0.03617, degreesOfFreedom: 50, half: 5e-6 },
  run: { standardDeviation: 0.0196, degreesOfFreedom: 5, half: 5e-5 },
  /** The page rounds each run's standard deviation to five places before pooling: 2e-6 of its figures. */
  ownDay: { standardDeviation: 0.02057092, half: 2e-6 },
  ownRun: { standardDeviation: 0.01295841, half: 2e-6 },
  bias: { mean: -0.0393, standardDeviation: 0.0162, degreesOfFreedom: 9, half: 5e-5 },
  effectiveDegreesOfFreedom: 42,
  expandedUncertainty: { value: 0.0782, half: 5e-5 },
} as const

/** Bias of each probe on each wafer in run 1, 2.6.1.4; half a unit of the last digit. */
export const RUN_1_BIASES = {
  '138': { '1': 0.0247, '281': 0.0108, '283': 0.0192, '2062': -0.0175, '2362': -0.0372 },
  '139': { '1': -0.0035, '281': 0.0395, '283': 0.0057, '2062': -0.0323, '2362': -0.0094 },
  '140': { '1': 0.04, '281': 0.0187, '283': -0.0201, '2062': -0.0126, '2362': -0.0261 },
  '141': { '1': 0.0393, '281': -0.0107, '283': 0.0246, '2062': -0.028, '2362': -0.0252 },
  '142': { '1': 0.0062, '281': 0.0376, '283': -0.0044, '2062': -0.0011, '2362': -0.0383 },
} as const

/**
 * Check wafer 137 with probe 2362, 25 occasions: e-Handbook 2.6.2, as printed by NIST's own program. The page itself
 * prints 0.09238 for the precision limit, digits of 0.09283 exchanged: s1 root F of these data is 0.0928313.
 */
export const CHECK_WAFER_137 = {
  repeatability: { value: 0.06139, degreesOfFreedom: 125, half: 5e-6 },
  standardDeviation: { value: 0.0268, degreesOfFreedom: 24, half: 5e-5 },
  centerLine: { value: 97.06984, half: 5e-6 },
  lowerLimit: { value: 97.01624, half: 5e-6 },
  upperLimit: { value: 97.12344, half: 5e-6 },
  precisionUpperLimit: { value: 0.09283, half: 5e-6 },
} as const

/** Moving average of e-Handbook 6.3.2.4: centre 50, s 2.0539, lambda 0.3, width 3; the page's limits are the steady ones. */
export const EWMA_EXAMPLE = {
  centre: 50,
  standardDeviation: 2.0539,
  lambda: 0.3,
  width: 3,
  upper: 52.5884,
  lower: 47.4115,
} as const
