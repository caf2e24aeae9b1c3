/** What a conversion refuses before it starts. */
import { requireDopedSilicon } from '../layer/doped-silicon'
import { CoreError, requireRange } from '../problems/problem'
import type { ConversionQuery, ConversionStart } from './conversion'
import { INTRINSIC_CARRIERS_RANGE_K } from './intrinsic-carriers'

/** @throws CoreError out-of-range, quantity by quantity */
export function requireConversion(query: ConversionQuery): void {
  const { start, thickness_um, temperature_K, intrinsicDensity_cm3, resistor } = query
  requireStart(start)
  const { min, max } = INTRINSIC_CARRIERS_RANGE_K
  requireRange('temperature', temperature_K, 'K', min, max)
  if (thickness_um !== undefined) requireRange('thickness', thickness_um, 'µm', 1e-3, 2e4)
  if (intrinsicDensity_cm3 !== undefined) requireRange('intrinsic density', intrinsicDensity_cm3, 'cm^-3', 1e-20, 1e20)
  if (resistor !== undefined) {
    requireRange('length of the resistor', resistor.length_um, 'µm', 1e-3, 1e7)
    requireRange('width of the resistor', resistor.width_um, 'µm', 1e-3, 1e7)
  }
}

function requireStart(start: ConversionStart): void {
  switch (start.from) {
    case 'v-over-i':
      return requireRange('V/I', start.vOverI_ohm, 'ohm', 1e-9, 1e21)
    case 'sheet-resistance':
      return requireRange('sheet resistance', start.sheetResistance_ohm_sq, 'ohm/sq', 1e-9, 1e21)
    case 'resistivity':
      return requireRange('resistivity', start.resistivity_ohm_cm, 'ohm cm', 1e-9, 1e12)
    case 'concentration':
      return requireRange('concentration', start.concentration_cm3, 'cm^-3', 0, 1e22)
    case 'resistance':
      return requireRange('resistance', start.resistance_ohm, 'ohm', 1e-9, 1e21)
  }
}

/** @throws CoreError where the mobility model doesn't know the dopant or the temperature, or there is no dopant at all */
export function requireSilicon({ start, dopant, mobility, temperature_K }: ConversionQuery): void {
  const isIntrinsic = start.from === 'concentration' && start.concentration_cm3 === 0
  if (dopant === undefined && !isIntrinsic) {
    const why = 'the mobility depends on the dopant, and none is given'
    throw new CoreError({ kind: 'not-applicable', what: 'resistivity from concentration', why })
  }
  requireDopedSilicon({ dopant: dopant ?? 'phosphorus', mobility, temperature_K })
}
