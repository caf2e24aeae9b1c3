/** Sheet resistance and resistivity, whichever way they are had: by the probe, from a resistor, or given. */
import { CoreError } from '../problems/problem'
import type { ConversionQuery, ConversionStep, Resistor } from './conversion'
import { givenStep, missingStep, resistivityStep, sheetResistanceStep, wantedSheetStep } from './dimension-steps'
import { resistivityOf, sheetResistanceFrom, sheetResistanceOf } from './dimensions'
import { probedSheet } from './probed-sheet'

export interface Electrical {
  /** null where only resistivity is given and no thickness. */
  readonly sheetResistance_ohm_sq: number | null
  /** null without a thickness. */
  readonly resistivity_ohm_cm: number | null
  readonly steps: readonly ConversionStep[]
}

export const NO_THICKNESS = 'it needs the thickness of what conducts'

/** From any start but a concentration. @throws CoreError as `probedSheet`; not-applicable for a resistance of no resistor */
export function electrical({ start, thickness_um, resistor }: ConversionQuery): Electrical {
  switch (start.from) {
    case 'v-over-i': {
      const { sheetResistance_ohm_sq, steps } = probedSheet({ ...start, thickness_um })
      return fromSheet(sheetResistance_ohm_sq, steps, thickness_um)
    }
    case 'sheet-resistance': {
      const sheet = start.sheetResistance_ohm_sq
      return fromSheet(sheet, [givenStep('R_s', 'Sheet resistance', sheet, 'Ω/sq')], thickness_um)
    }
    case 'resistance': {
      const described = requireResistor(resistor)
      const sheet = sheetResistanceFrom(start.resistance_ohm, described)
      const given = givenStep('R', 'Resistance wanted', start.resistance_ohm, 'Ω')
      return fromSheet(sheet, [given, wantedSheetStep(sheet, start.resistance_ohm, described)], thickness_um)
    }
    case 'resistivity':
      return fromResistivity(start.resistivity_ohm_cm, thickness_um)
    case 'concentration':
      throw new Error('a concentration is converted forwards')
  }
}

function fromSheet(sheet: number, steps: readonly ConversionStep[], thickness_um: number | undefined): Electrical {
  if (thickness_um === undefined) {
    const missing = missingStep('ρ', 'Resistivity', 'Ω·cm', NO_THICKNESS)
    return { sheetResistance_ohm_sq: sheet, resistivity_ohm_cm: null, steps: [...steps, missing] }
  }
  const rho = resistivityOf(sheet, thickness_um)
  const found = resistivityStep(rho, sheet, thickness_um)
  return { sheetResistance_ohm_sq: sheet, resistivity_ohm_cm: rho, steps: [...steps, found] }
}

function fromResistivity(rho: number, thickness_um: number | undefined): Electrical {
  const given = givenStep('ρ', 'Resistivity', rho, 'Ω·cm')
  if (thickness_um === undefined) return { sheetResistance_ohm_sq: null, resistivity_ohm_cm: rho, steps: [given] }
  const sheet = sheetResistanceOf(rho, thickness_um)
  const steps = [given, sheetResistanceStep(sheet, rho, thickness_um)]
  return { sheetResistance_ohm_sq: sheet, resistivity_ohm_cm: rho, steps }
}

function requireResistor(resistor: Resistor | undefined): Resistor {
  if (resistor) return resistor
  const why = 'a resistance needs the length and width of its resistor'
  throw new CoreError({ kind: 'not-applicable', what: 'sheet resistance from resistance', why })
}
