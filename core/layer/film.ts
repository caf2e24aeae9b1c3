import { CoreError, requireRange } from '../problems/problem'
import { formatQuantity } from '../units/format'
import type { LayerKind, LayerStep, PreparedLayer } from './layer-kind'

/** Exactly one of the two. */
export interface FilmSettings {
  readonly resistivity_ohm_cm?: number | undefined
  readonly thickness_um?: number | undefined
}

const UM_IN_CM = 1e-4
const SOURCE = 'the definition of resistivity: ρ = R_s · t'

/**
 * A film of one resistivity, metal or other, on an insulator: its thickness t = rho / R_s where the resistivity is
 * known, its resistivity rho = R_s t where the thickness is.
 *
 * Resistivity up to 1e12 ohm cm, thickness up to 1e4 um; every positive sheet resistance is covered.
 * Assumes the film is much thinner than the probe spacing and conducts alone.
 * @throws CoreError from prepare: neither or both given, or out of range
 */
export const film = {
  id: 'film',
  title: 'Film of one resistivity',
  gives: ['resistivity', 'thickness'],
  concentrationMeans: '',
  formula: 't = ρ/R_s where the resistivity is known, ρ = R_s t where the thickness is',
  sources: [SOURCE],
  conductsThroughWafer: false,
  prepare: prepareFilm,
} as const satisfies LayerKind<FilmSettings>

function prepareFilm({ resistivity_ohm_cm, thickness_um }: FilmSettings): PreparedLayer {
  if (resistivity_ohm_cm !== undefined && thickness_um === undefined) {
    requireRange('film resistivity', resistivity_ohm_cm, 'ohm cm', Number.MIN_VALUE, 1e12)
    return filmOfResistivity(resistivity_ohm_cm)
  }
  if (thickness_um !== undefined && resistivity_ohm_cm === undefined) {
    requireRange('film thickness', thickness_um, 'um', Number.MIN_VALUE, 1e4)
    return filmOfThickness(thickness_um)
  }
  const both = resistivity_ohm_cm !== undefined
  throw new CoreError({
    kind: 'not-applicable',
    what: both ? 'film with both resistivity and thickness' : 'film with neither resistivity nor thickness',
    why: 'give exactly one of the two; the other is what sheet resistance then tells',
  })
}

/** The resistivity column repeats what was given, so that a row can be read alone. */
function filmOfResistivity(resistivity_ohm_cm: number): PreparedLayer {
  const thicknessOf_um = (sheet: number): number => (sheet > 0 ? resistivity_ohm_cm / sheet / UM_IN_CM : NaN)
  return {
    range_ohm_sq: { min: 0, max: Infinity },
    invert(sheets, into) {
      clearSilicon(into)
      for (let i = 0; i < sheets.length; i++) {
        const thickness_um = thicknessOf_um(sheets[i])
        into.thickness_um[i] = thickness_um
        into.resistivity_ohm_cm[i] = Number.isNaN(thickness_um) ? NaN : resistivity_ohm_cm
      }
      into.resistivitySensitivity.fill(0)
    },
    forward(thickness_um) {
      requireRange('film thickness', thickness_um, 'um', Number.MIN_VALUE, Number.MAX_VALUE)
      return resistivity_ohm_cm / (thickness_um * UM_IN_CM)
    },
    explain: (sheet) => [thicknessStep(resistivity_ohm_cm, sheet, thicknessOf_um(sheet))],
  }
}

function thicknessStep(resistivity_ohm_cm: number, sheet: number, thickness_um: number): LayerStep {
  return {
    symbol: 't',
    title: 'Film thickness',
    value: thickness_um,
    unit: 'µm',
    formula: `${formatQuantity(resistivity_ohm_cm, 'Ω·cm')} / ${formatQuantity(sheet, 'Ω/sq')} × 10⁴ µm/cm`,
    source: SOURCE,
  }
}

function filmOfThickness(thickness_um: number): PreparedLayer {
  return {
    range_ohm_sq: { min: 0, max: Infinity },
    invert(sheets, into) {
      clearSilicon(into)
      for (let i = 0; i < sheets.length; i++) {
        into.resistivity_ohm_cm[i] = sheets[i] > 0 ? sheets[i] * thickness_um * UM_IN_CM : NaN
        into.thickness_um[i] = sheets[i] > 0 ? thickness_um : NaN
      }
      into.resistivitySensitivity.fill(1)
    },
    forward() {
      throw new CoreError({
        kind: 'not-applicable',
        what: 'sheet resistance from film thickness',
        why: 'the thickness was given and the resistivity is what is looked for',
      })
    },
    explain: (sheet) => [
      {
        symbol: 'ρ',
        title: 'Film resistivity',
        value: sheet > 0 ? sheet * thickness_um * UM_IN_CM : NaN,
        unit: 'Ω·cm',
        formula: `${formatQuantity(sheet, 'Ω/sq')} × ${formatQuantity(thickness_um, 'µm')} × 10⁻⁴ cm/µm`,
        source: SOURCE,
      },
    ],
  }
}

function clearSilicon(into: Parameters<PreparedLayer['invert']>[1]): void {
  into.concentration_cm3.fill(NaN)
  into.dose_cm2.fill(NaN)
  into.concentrationSensitivity.fill(NaN)
  into.doseSensitivity.fill(NaN)
}
