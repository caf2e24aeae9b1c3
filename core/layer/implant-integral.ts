import { gaussLegendre, integratePanels } from '../numeric/quadrature'
import { conductivityOf, joins_cm3 } from './doped-silicon'
import type { DopedSilicon } from './doped-silicon'

export interface ImplantedGaussian {
  readonly silicon: DopedSilicon
  /** Projected range: depth of the peak. */
  readonly range_um: number
  readonly straggle_um: number
  readonly peak_cm3: number
  /** 0 where nothing of the other type bounds the layer. */
  readonly background_cm3: number
}

const RULE = gaussLegendre(16)
/** Falls of ln N below the peak at which panels end: fine where the dopant is, coarse where e^-fall has emptied it. */
const FALLS = [2, 4, 6, 8, 10, 13, 17, 22, 28, 35, 42] as const

/**
 * Sheet resistance of a buried Gaussian, N(x) = N_p exp(-(x - R_p)² / (2 ΔR_p²)) for x >= 0.
 *
 * @param range_um       R_p > 0 [um]
 * @param straggle_um    ΔR_p > 0 [um]
 * @param peak_cm3       N_p, above the background [cm^-3]
 * @param background_cm3 >= 0 [cm^-3]
 * @returns sheet resistance [ohm/sq]: 1 / Integral q mu(N + N_B) (N - N_B) dx over the depths where N > N_B; without a
 *          background over all x >= 0; without limit as the peak comes down to the background
 *
 * Assumes all of the dopant is active and ionised, no depletion, and probes that reach the layer where it lies buried.
 * Accuracy: quadrature to 1e-12 relative; the symmetric Gaussian leaves out the skewness and channelling of real ranges.
 * Sources: the Gaussian range distribution of J. Lindhard, M. Scharff, H. E. Schiøtt, Mat. Fys. Medd. Dan. Vid. Selsk.
 * 33 (1963) no. 14 (from memory); J. C. Irvin, Bell Syst. Tech. J. 41 (1962) 387-410 for the integral.
 */
export function implantSheetResistance_ohm_sq(implant: ImplantedGaussian): number {
  const { silicon, range_um, straggle_um, peak_cm3, background_cm3 } = implant
  const conductivity = conductivityOf(silicon)
  const integrand = (x_um: number): number => {
    const z = (x_um - range_um) / straggle_um
    const dopant_cm3 = peak_cm3 * Math.exp((-z * z) / 2)
    return conductivity(dopant_cm3 - background_cm3, dopant_cm3 + background_cm3)
  }
  return 1e4 / integratePanels(integrand, panelEdges_um(implant), RULE)
}

function panelEdges_um({ silicon, range_um, straggle_um, peak_cm3, background_cm3 }: ImplantedGaussian) {
  const end = background_cm3 > 0 ? Math.log(peak_cm3 / background_cm3) : FALLS[FALLS.length - 1]
  const joins = joins_cm3(silicon).map((join) => Math.log(peak_cm3 / (join - background_cm3)))
  const falls = [...FALLS, ...joins].filter((fall) => fall > 0 && fall < end)
  const edges = [range_um]
  for (const fall of [...falls, end]) {
    const away_um = straggle_um * Math.sqrt(2 * fall)
    edges.push(Math.max(0, range_um - away_um), range_um + away_um)
  }
  edges.sort((a, b) => a - b)
  return edges.filter((edge, i) => i === 0 || edge > edges[i - 1])
}

/** Dose of the whole Gaussian, the part of it above the surface included: sqrt(2 pi) ΔR_p N_p [cm^-2]. */
export function implantDose_cm2({ peak_cm3, straggle_um }: { peak_cm3: number; straggle_um: number }): number {
  return Math.sqrt(2 * Math.PI) * straggle_um * 1e-4 * peak_cm3
}
