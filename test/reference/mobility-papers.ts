/**
 * Mobilities at 300 K [cm^2/(V s)] computed from the coefficients of the papers by an implementation independent of the project's.
 * Coefficients confirmed in two or more public transcriptions, except: Caughey-Thomas's hole 47.7 and 495 and Arora's 7.4e8, 1.36e8,
 * 1.26e17 and 2.35e17, from memory, cross-checked at 300 K against the normalised form (1252 and 407).
 */
import type { MobilityId } from '../../core/silicon/mobility/registry'
import type { Carrier } from '../../core/silicon/mobility-model'
import type { Dopant } from '../../core/silicon/dopants'

export type MobilityRow = readonly [carrier: Carrier, dopant: Dopant, impurity_cm3: number, mobility: number]

/** Caughey and Thomas, Proc. IEEE 55 (1967) 2192. */
const caugheyThomas: readonly MobilityRow[] = [
  ['electron', 'phosphorus', 1e15, 1280.394],
  ['electron', 'phosphorus', 1e17, 660.5366],
  ['electron', 'arsenic', 1e19, 104.5792],
  ['hole', 'boron', 1e15, 476.5984],
  ['hole', 'boron', 1e17, 232.4816],
  ['hole', 'boron', 1e19, 57.01028],
]

/** Arora, Hauser, Roulston, IEEE Trans. Electron Devices 29 (1982) 292. */
const arora: readonly MobilityRow[] = [
  ['electron', 'phosphorus', 1e15, 1322.31],
  ['electron', 'arsenic', 1e17, 777.3355],
  ['electron', 'phosphorus', 1e19, 114.1044],
  ['hole', 'boron', 1e15, 457.959],
  ['hole', 'boron', 1e17, 330.87],
  ['hole', 'boron', 1e19, 68.76701],
]

/** Masetti, Severi, Solmi, IEEE Trans. Electron Devices 30 (1983) 764, Table I. */
const masetti: readonly MobilityRow[] = [
  ['electron', 'phosphorus', 1e13, 1411.958],
  ['electron', 'phosphorus', 1e15, 1362.056],
  ['electron', 'phosphorus', 1e17, 721.3141],
  ['electron', 'phosphorus', 1e19, 114.7841],
  ['electron', 'phosphorus', 1e20, 73.22728],
  ['electron', 'phosphorus', 1e21, 20.17109],
  ['electron', 'arsenic', 1e17, 727.0544],
  ['electron', 'arsenic', 1e19, 108.0496],
  ['electron', 'arsenic', 1e20, 60.86727],
  ['electron', 'arsenic', 1e21, 15.90745],
  ['hole', 'boron', 1e13, 470.1486],
  ['hole', 'boron', 1e15, 461.0525],
  ['hole', 'boron', 1e17, 319.0981],
  ['hole', 'boron', 1e19, 73.16573],
  ['hole', 'boron', 1e20, 49.86248],
  ['hole', 'boron', 1e21, 24.87201],
]

/** Klaassen, Solid-State Electron. 35 (1992) 953; the last four are minority carriers. */
const klaassen: readonly MobilityRow[] = [
  ['electron', 'phosphorus', 1e15, 1362.056],
  ['electron', 'phosphorus', 1e17, 721.3141],
  ['electron', 'phosphorus', 1e18, 276.961],
  ['electron', 'phosphorus', 1e19, 114.778],
  ['electron', 'phosphorus', 1e20, 73.639],
  ['electron', 'arsenic', 1e19, 108.035],
  ['electron', 'arsenic', 1e20, 60.912],
  ['hole', 'boron', 1e15, 461.954],
  ['hole', 'boron', 1e17, 317.409],
  ['hole', 'boron', 1e19, 70.838],
  ['hole', 'boron', 1e20, 49.299],
  ['electron', 'boron', 1e17, 676.0975],
  ['electron', 'boron', 1e19, 211.2365],
  ['hole', 'phosphorus', 1e17, 315.253],
  ['hole', 'phosphorus', 1e19, 145.4495],
]

export const PAPER_MOBILITIES: Partial<Record<MobilityId, readonly MobilityRow[]>> = {
  'caughey-thomas': caugheyThomas,
  arora,
  masetti,
  klaassen,
}

/** Klaassen, holes in 1e18 cm^-3 phosphorus with the two values of r5: -0.8552 (figures 6 and 7 of the paper) and -0.01552 (its Table 2). */
export const KLAASSEN_HOLES_IN_1E18_PHOSPHORUS = { r5AsInFigures: 194.6, r5AsPrinted: 184.0 }
/** Klaassen 1992: P below which G(P) is held at its minimum, 300 K. */
export const KLAASSEN_P_MIN = { electron: 0.3246, hole: 0.2891 }
