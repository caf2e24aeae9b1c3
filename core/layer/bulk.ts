import { requireRange } from '../problems/problem'
import { prepareConcentrations } from '../silicon/concentration-table'
import type { PreparedConcentrations } from '../silicon/concentration-table'
import { concentrationSensitivity, concentration_cm3, resistivity_ohm_cm } from '../silicon/resistivity'
import { formatQuantity, formatSignificant } from '../units/format'
import { requireDopedSilicon } from './doped-silicon'
import type { DopedSilicon } from './doped-silicon'
import type { LayerKind, LayerStep, PreparedLayer } from './layer-kind'

export interface BulkSettings extends DopedSilicon {
  /** Of the wafer, or of a layer that conducts in its whole thickness [um]. */
  readonly thickness_um: number
}

const UM_IN_CM = 1e-4
const SOURCE = 'the definition of resistivity: ρ = R_s · w'

/**
 * Uniform silicon that conducts through its whole thickness: resistivity rho = R_s w, and the dopant concentration that
 * has this resistivity under the mobility model taken.
 *
 * Outside the concentrations that silicon's conversion covers (1e12 to 1e21 cm^-3) concentration is NaN; resistivity is
 * given for every sheet resistance. The thickness factor is in the sheet resistance already.
 * @throws CoreError from prepare: unknown dopant, quantities out of range, those of the resistivity conversion
 */
export const bulk = {
  id: 'bulk',
  title: 'Bulk silicon',
  gives: ['resistivity', 'concentration'],
  concentrationMeans: 'dopant concentration',
  formula: 'ρ = R_s w, w the wafer’s thickness; N from ρ by the mobility model',
  sources: [SOURCE],
  conductsThroughWafer: true,
  prepare: prepareBulk,
} as const satisfies LayerKind<BulkSettings>

function prepareBulk(settings: BulkSettings): PreparedLayer {
  requireDopedSilicon(settings)
  requireRange('thickness', settings.thickness_um, 'um', 1e-3, 2e4)
  const thickness_cm = settings.thickness_um * UM_IN_CM
  const concentrations = prepareConcentrations(settings)
  const { min, max } = concentrations.range_ohm_cm
  return {
    range_ohm_sq: { min: min / thickness_cm, max: max / thickness_cm },
    invert(sheets, into) {
      for (let i = 0; i < sheets.length; i++) into.resistivity_ohm_cm[i] = sheets[i] * thickness_cm
      const { concentration_cm3, concentrationSensitivity: sensitivity } = into
      concentrations.fill(into.resistivity_ohm_cm, { concentration_cm3, sensitivity })
      into.dose_cm2.fill(NaN)
      into.doseSensitivity.fill(NaN)
      into.thickness_um.fill(NaN)
      into.resistivitySensitivity.fill(1)
    },
    forward: (concentration_cm3) => resistivity_ohm_cm({ ...settings, concentration_cm3 }) / thickness_cm,
    explain: (sheet) => explainBulk(settings, concentrations, sheet),
  }
}

function explainBulk(settings: BulkSettings, concentrations: PreparedConcentrations, sheet: number): LayerStep[] {
  const { min, max } = concentrations.range_ohm_cm
  const resistivity = sheet * settings.thickness_um * UM_IN_CM
  const isCovered = resistivity >= min && resistivity <= max
  const query = { ...settings, resistivity_ohm_cm: resistivity }
  return [
    {
      symbol: 'ρ',
      title: 'Resistivity',
      value: resistivity,
      unit: 'Ω·cm',
      formula: `${formatQuantity(sheet, 'Ω/sq')} × ${formatQuantity(settings.thickness_um, 'µm')} × 10⁻⁴ cm/µm`,
      source: SOURCE,
    },
    {
      symbol: 'N',
      title: 'Dopant concentration',
      value: isCovered ? concentration_cm3(query) : NaN,
      unit: 'cm⁻³',
      formula: isCovered
        ? `N for which ρ(N) = ${formatQuantity(resistivity, 'Ω·cm')}, ${settings.dopant}, mobility ${settings.mobility.title}`
        : `none: the model covers ${formatSignificant(min, 4)} to ${formatQuantity(max, 'Ω·cm')}`,
      source: settings.mobility.source,
    },
    {
      symbol: 'd ln N / d ln R_s',
      title: 'Sensitivity of concentration to sheet resistance',
      value: isCovered ? concentrationSensitivity(query) : NaN,
      unit: '',
      formula: 'slope of the same relation',
      source: settings.mobility.source,
    },
  ]
}
