import { erfc } from '../../numeric/erfc'
import type { LayerProfile } from './profile'

/** A fixed dose driven in: N_s exp(-x²/4Dt), which is N_s exp(-ln(N_s/N_B) eta²). */
export const gaussian = {
  id: 'gaussian',
  title: 'Gaussian (a fixed dose driven in)',
  formula: 'N(η) = N_s · exp(−ln(N_s/N_B) · η²)',
  source: 'J. C. Irvin, Bell Syst. Tech. J. 41 (1962) 387',
  shape(ratio) {
    const lnRatio = Math.log(ratio)
    return (eta) => Math.exp(lnRatio * eta * eta)
  },
  depthOf: (level, ratio) => Math.sqrt(Math.log(level) / Math.log(ratio)),
  mean(ratio) {
    const root = Math.sqrt(-Math.log(ratio))
    return ((1 - erfc(root)) * Math.sqrt(Math.PI)) / (2 * root)
  },
  depthFormula: 'x_j = 2 √(D t) · √ln(N_s/N_B)',
  lengthSymbol: '√(D t)',
  depthInLengths: (ratio) => 2 * Math.sqrt(-Math.log(ratio)),
  depthResponse: (ratio) => -1 / (2 * Math.log(ratio)),
} as const satisfies LayerProfile
