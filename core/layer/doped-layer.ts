import { requireRange } from '../problems/problem'
import { formatConcentration, formatQuantity, formatSignificant } from '../units/format'
import { curveInverse, requireDensity } from './curve-layer'
import type { CurveInverse } from './curve-layer'
import { LARGEST_DENSITY_CM3, joins_cm3, leastDensity_cm3, requireDopedSilicon, requireJunction } from './doped-silicon'
import type { DopedSilicon } from './doped-silicon'
import type { LayerCurve } from './layer-curve'
import type { Background, LayerKind, LayerStep, PreparedLayer, ProfileId } from './layer-kind'
import { meanNetDensity_cm3, sheetDepthProduct_ohm_um } from './profile-integral'
import type { LayerProfile } from './profiles/profile'
import { layerProfile } from './profiles/registry'

export interface DopedLayerSettings extends DopedSilicon {
  readonly profile: ProfileId
  /** Junction depth: where the profile has come down to the background [um]. */
  readonly depth_um: number
  readonly background: Background
}

const UM_IN_CM = 1e-4
const IRVIN = 'J. C. Irvin, Bell Syst. Tech. J. 41 (1962) 387'

/**
 * A diffused or annealed layer that its junction isolates, after Irvin: from sheet resistance the surface
 * concentration N_s, the active dose Integral (N - N_B) dx over 0..x_j, and the mean resistivity R_s x_j.
 *
 * Covers N_s from 1.01 N_B (or the mobility model's lower end) to 1e21 cm^-3; outside, concentration and dose are NaN,
 * mean resistivity is still given. The integral and its assumptions stand in `profile-integral.ts`.
 * Accuracy: 1e-9 relative in N_s for the model taken. Since R_s x_j depends on N_s alone, a relative error of depth
 * enters N_s with the same sensitivity as one of R_s.
 * @throws CoreError from prepare: background of the layer's own type, unknown dopant, quantities out of range
 */
export const dopedLayer = {
  id: 'doped-layer',
  title: 'Doped layer over a junction',
  gives: ['resistivity', 'concentration', 'dose'],
  concentrationMeans: 'surface concentration',
  sources: [IRVIN],
  conductsThroughWafer: false,
  prepare: prepareDopedLayer,
} as const satisfies LayerKind<DopedLayerSettings>

function prepareDopedLayer(settings: DopedLayerSettings): PreparedLayer {
  requireDopedSilicon(settings)
  requireJunction(settings.dopant, settings.background)
  requireRange('junction depth', settings.depth_um, 'um', 1e-4, 1000)
  const profile = layerProfile(settings.profile)
  const background_cm3 = settings.background.concentration_cm3
  const least = leastDensity_cm3(settings.mobility, background_cm3)
  const inverse = curveInverse(dopedLayerCurve(settings, profile, least))
  return {
    range_ohm_sq: inverse.range_ohm_sq,
    invert(sheets, into) {
      inverse.fill(sheets, into)
      for (let i = 0; i < sheets.length; i++) into.resistivity_ohm_cm[i] = sheets[i] * settings.depth_um * UM_IN_CM
      into.thickness_um.fill(NaN)
    },
    forward(surface_cm3) {
      requireDensity('surface concentration', surface_cm3, least, LARGEST_DENSITY_CM3)
      const doping = { silicon: settings, profile, surface_cm3, background_cm3 }
      return sheetDepthProduct_ohm_um(doping) / settings.depth_um
    },
    explain: (sheet) => explainDopedLayer({ settings, profile, inverse, least }, sheet),
  }
}

/** Along t = ln(N_s / N_B - 1), in which ln R_s is nearly straight at both ends. */
function dopedLayerCurve(settings: DopedLayerSettings, profile: LayerProfile, least: number): LayerCurve {
  const background_cm3 = settings.background.concentration_cm3
  const excessOf = (surface_cm3: number): number => Math.log(surface_cm3 / background_cm3 - 1)
  const dopingAt = (t: number) => {
    return { silicon: settings, profile, background_cm3, surface_cm3: background_cm3 * (1 + Math.exp(t)) }
  }
  return {
    from: excessOf(least),
    to: excessOf(LARGEST_DENSITY_CM3),
    bends: joins_cm3(settings).map((join) => excessOf(join - background_cm3)),
    lnConcentration: (t) => Math.log(background_cm3) + Math.log1p(Math.exp(t)),
    lnDose: (t) => Math.log(meanNetDensity_cm3(dopingAt(t)) * settings.depth_um * UM_IN_CM),
    lnSheetResistance: (t) => Math.log(sheetDepthProduct_ohm_um(dopingAt(t)) / settings.depth_um),
  }
}

interface Explained {
  readonly settings: DopedLayerSettings
  readonly profile: LayerProfile
  readonly inverse: CurveInverse
  readonly least: number
}

function explainDopedLayer(layer: Explained, sheet: number): readonly LayerStep[] {
  const { settings, profile, inverse } = layer
  const depth = formatQuantity(settings.depth_um, 'µm')
  const product = sheet * settings.depth_um
  const point = inverse.pointAt(sheet)
  return [
    {
      symbol: 'R_s · x_j',
      title: 'Sheet resistance times junction depth',
      value: product,
      unit: 'Ω·µm',
      formula: `${formatQuantity(sheet, 'Ω/sq')} × ${depth}`,
      source: IRVIN,
    },
    {
      symbol: 'ρ̄',
      title: 'Mean resistivity of the layer',
      value: product * UM_IN_CM,
      unit: 'Ω·cm',
      formula: `${formatQuantity(product, 'Ω·µm')} × 10⁻⁴ cm/µm`,
      source: 'the definition of resistivity',
    },
    { ...concentrationStep(layer, product), value: point.concentration },
    {
      symbol: 'Q',
      title: 'Active dose',
      value: point.dose,
      unit: 'cm⁻²',
      formula: `∫ (N − N_B) dx from the surface to ${depth}, with N_s = ${formatConcentration(point.concentration)}`,
      source: profile.source,
    },
    {
      symbol: 'd ln N_s / d ln R_s',
      title: 'Sensitivity of surface concentration to sheet resistance',
      value: point.concentrationSensitivity,
      unit: '',
      formula: 'slope of the same integral',
      source: IRVIN,
    },
  ]
}

function concentrationStep({ settings, profile, inverse, least }: Explained, product: number): LayerStep {
  const { min, max } = inverse.range_ohm_sq
  const sheet = product / settings.depth_um
  const background = `N_B = ${formatConcentration(settings.background.concentration_cm3)} ${settings.background.dopant}`
  const solved =
    `N_s for which 10⁴ / ∫₀¹ q µ(N + N_B) (N − N_B) dη = ${formatQuantity(product, 'Ω·µm')}, ` +
    `${profile.formula}, ${background}, mobility ${settings.mobility.title}`
  const outside =
    `none: the layer covers ${formatSignificant(min, 4)} to ${formatQuantity(max, 'Ω/sq')}, that is N_s from ` +
    `${formatConcentration(LARGEST_DENSITY_CM3)} down to ${formatConcentration(least)}`
  return {
    symbol: 'N_s',
    title: 'Surface concentration',
    value: NaN,
    unit: 'cm⁻³',
    formula: sheet >= min && sheet <= max ? solved : outside,
    source: `${IRVIN}; ${settings.mobility.source}`,
  }
}
