import { erfc as complementaryErrorFunction, erfcInverse } from '../../numeric/erfc'
import type { LayerProfile } from './profile'

/** Diffusion from a constant surface density: N_s erfc(x / (2 sqrt(Dt))), which is N_s erfc(u eta) with erfc(u) = N_B/N_s. */
export const erfc = {
  id: 'erfc',
  title: 'Complementary error function (a constant surface density)',
  formula: 'N(η) = N_s · erfc(u · η), erfc(u) = N_B/N_s',
  source: 'J. C. Irvin, Bell Syst. Tech. J. 41 (1962) 387',
  shape(ratio) {
    const u = erfcInverse(ratio)
    return (eta) => complementaryErrorFunction(u * eta)
  },
  depthOf: (level, ratio) => erfcInverse(level) / erfcInverse(ratio),
  mean(ratio) {
    const u = erfcInverse(ratio)
    // 1 - exp(-u²) by expm1, so that a shallow profile does not lose its digits.
    return ratio - Math.expm1(-u * u) / (u * Math.sqrt(Math.PI))
  },
  depthFormula: 'x_j = 2 √(D t) · erfc⁻¹(N_B/N_s)',
  lengthSymbol: '√(D t)',
  depthInLengths: (ratio) => 2 * erfcInverse(ratio),
  depthResponse(ratio) {
    const u = erfcInverse(ratio)
    return (ratio * Math.sqrt(Math.PI) * Math.exp(u * u)) / (2 * u)
  },
} as const satisfies LayerProfile
