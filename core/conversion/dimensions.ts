/** What the dimensions of a piece make of its resistivity and sheet resistance, both ways. */
import { bulk } from '../layer/bulk'
import type { Resistor } from './conversion'

export const RESISTIVITY_SOURCE = bulk.sources[0]
export const RESISTANCE_SOURCE =
  'the definition of sheet resistance: R = R_s · L/W; uniform current along the length, contacts not counted'

const UM_IN_CM = 1e-4

/** rho = Rs w [ohm cm]. */
export function resistivityOf(sheetResistance_ohm_sq: number, thickness_um: number): number {
  return sheetResistance_ohm_sq * thickness_um * UM_IN_CM
}

/** Rs = rho/w [ohm/sq]. */
export function sheetResistanceOf(resistivity_ohm_cm: number, thickness_um: number): number {
  return resistivity_ohm_cm / (thickness_um * UM_IN_CM)
}

/** R = Rs L/W [ohm]. */
export function resistanceOf(sheetResistance_ohm_sq: number, { length_um, width_um }: Resistor): number {
  return (sheetResistance_ohm_sq * length_um) / width_um
}

/** Rs = R W/L [ohm/sq]. */
export function sheetResistanceFrom(resistance_ohm: number, { length_um, width_um }: Resistor): number {
  return (resistance_ohm * width_um) / length_um
}
