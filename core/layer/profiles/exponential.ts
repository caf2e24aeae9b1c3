import type { LayerProfile } from './profile'

/** A straight line on a logarithmic scale: N_s exp(-x/L), which is N_s exp(-ln(N_s/N_B) eta). */
export const exponential = {
  id: 'exponential',
  title: 'Exponential',
  formula: 'N(η) = N_s · exp(−ln(N_s/N_B) · η)',
  source: 'J. C. Irvin, Bell Syst. Tech. J. 41 (1962) 387',
  shape(ratio) {
    const lnRatio = Math.log(ratio)
    return (eta) => Math.exp(lnRatio * eta)
  },
  depthOf: (level, ratio) => Math.log(level) / Math.log(ratio),
  mean: (ratio) => (ratio - 1) / Math.log(ratio),
  depthFormula: 'x_j = L · ln(N_s/N_B)',
  lengthSymbol: 'L',
  depthInLengths: (ratio) => -Math.log(ratio),
  depthResponse: (ratio) => -1 / Math.log(ratio),
} as const satisfies LayerProfile
