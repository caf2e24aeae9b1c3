/**
 * The benchmark's job done the plainest way, to compare with: row by row, every integral by Simpson's rule, every inverse
 * by bisection, nothing kept from one row to the next. It shares no code with the program, so that its results check it.
 */
import Papa from 'papaparse'

const ELEMENTARY_CHARGE_C = 1.602176634e-19
const RADIUS_MM = 100
const SPACING_MM = 1
const DEPTH_UM = 0.35
const BACKGROUND_CM3 = 1e15
const STEPS = 400
const HALVINGS = 60

export interface PlainRow {
  readonly sheetResistance_ohm_sq: number
  /** At the surface. */
  readonly concentration_cm3: number
}

/** Boron from the surface down to a junction, four pins along x on an insulated disc. */
export function plainRows(csv: string): PlainRow[] {
  const { data } = Papa.parse<Record<string, string>>(csv, { header: true, skipEmptyLines: true })
  return data.map((row) => {
    const forward = Number(row.voltage_V) / Number(row.current_A)
    const reverse = Number(row.voltage_rev_V) / Number(row.current_rev_A)
    const sheetResistance_ohm_sq = discFactor(Number(row.x_mm), Number(row.y_mm)) * ((forward + reverse) / 2)
    return { sheetResistance_ohm_sq, concentration_cm3: surfaceOf(sheetResistance_ohm_sq) }
  })
}

/** Current in at pin 1, out at pin 4, voltage between 2 and 3; the image of each current pin lies outside the disc. */
function discFactor(x_mm: number, y_mm: number): number {
  const pin = (k: number) => x_mm + (k - 1.5) * SPACING_MM
  const potential = (at: number, current: number): number => {
    const [a, c] = [pin(at) / RADIUS_MM, pin(current) / RADIUS_MM]
    const y = y_mm / RADIUS_MM
    const real = 1 - (a * c + y * y)
    const imaginary = y * (a - c)
    return -Math.log(Math.abs(a - c)) - Math.log(Math.hypot(real, imaginary))
  }
  return (2 * Math.PI) / (potential(1, 0) - potential(2, 0) - potential(1, 3) + potential(2, 3))
}

/** Masetti, Severi and Solmi, IEEE Trans. Electron Devices 30 (1983) 764, Table I: holes among boron. */
function holeMobility(impurity_cm3: number): number {
  return (
    44.9 * Math.exp(-9.23e16 / impurity_cm3) +
    470.5 / (1 + (impurity_cm3 / 2.23e17) ** 0.719) -
    29 / (1 + (6.1e20 / impurity_cm3) ** 2)
  )
}

/** Irvin's integral (Bell Syst. Tech. J. 41 (1962) 387) over a Gaussian profile. */
function layerSheetResistance(surface_cm3: number): number {
  const fall = Math.log(surface_cm3 / BACKGROUND_CM3)
  let sum = 0
  for (let k = 0; k <= STEPS; k++) {
    const dopant = surface_cm3 * Math.exp(-fall * (k / STEPS) ** 2)
    const conductivity = ELEMENTARY_CHARGE_C * (dopant - BACKGROUND_CM3) * holeMobility(dopant + BACKGROUND_CM3)
    sum += conductivity * (k === 0 || k === STEPS ? 1 : k % 2 === 1 ? 4 : 2)
  }
  return 1 / ((sum / (3 * STEPS)) * DEPTH_UM * 1e-4)
}

function surfaceOf(sheetResistance_ohm_sq: number): number {
  let low = Math.log(1.001 * BACKGROUND_CM3)
  let high = Math.log(1e21)
  for (let k = 0; k < HALVINGS; k++) {
    const middle = (low + high) / 2
    if (layerSheetResistance(Math.exp(middle)) > sheetResistance_ohm_sq) low = middle
    else high = middle
  }
  return Math.exp((low + high) / 2)
}
