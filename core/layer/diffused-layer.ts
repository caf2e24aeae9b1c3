import { CoreError, requireRange } from '../problems/problem'
import { formatConcentration, formatQuantity, formatSignificant } from '../units/format'
import { curveInverse, requireDensity } from './curve-layer'
import type { CurveInverse } from './curve-layer'
import { LARGEST_DENSITY_CM3, joins_cm3, leastDensity_cm3 } from './doped-silicon'
import type { DopedLayerSettings } from './doped-silicon'
import { JUNCTION_SOURCE } from './junction-depth'
import type { LayerCurve, LayerPoint } from './layer-curve'
import type { LayerColumns, LayerStep, PreparedLayer, ProfileId } from './layer-kind'
import { IRVIN, meanNetDensity_cm3, sheetDepthProduct_ohm_um } from './profile-integral'
import type { LayerProfile } from './profiles/profile'
import { layerProfile } from './profiles/registry'

const UM_IN_CM = 1e-4

/** What the layer's functions share. */
interface DiffusedLayer {
  readonly settings: DopedLayerSettings
  readonly profile: LayerProfile
  readonly background_cm3: number
  /** Least surface density that is looked for. */
  readonly least: number
  /** The depth given, or the one that the diffusion length makes at this surface density. */
  depthAt_um(surface_cm3: number): number
}

/**
 * A doped layer of one of the named profiles.
 *
 * With the junction depth given, R_s = (R_s x_j)(N_s) / x_j: a relative error of depth enters N_s with the same
 * sensitivity as one of R_s. With the diffusion length given instead, x_j grows with N_s (`junction-depth.ts`) and
 * R_s = (R_s x_j)(N_s) / x_j(N_s) falls all the more: the product falls with N_s and the depth rises, so that a sheet
 * resistance still has one N_s. R_s times length is a function of N_s alone, so the length's error enters likewise.
 * Mean resistivity is R_s x_j; with a length it ends where N_s does, with a depth it is given for every R_s.
 * Accuracy: 1e-9 relative in N_s for the model taken.
 * @throws CoreError neither or both of depth and length, a length for a uniform profile, or out of range
 */
export function prepareDiffusedLayer(settings: DopedLayerSettings): PreparedLayer {
  const layer = diffusedLayer(settings)
  const inverse = curveInverse(diffusedCurve(layer))
  return {
    range_ohm_sq: inverse.range_ohm_sq,
    invert(sheets, into) {
      inverse.fill(sheets, into)
      fillResistivity(layer, sheets, into)
      into.thickness_um.fill(NaN)
    },
    forward(surface_cm3) {
      requireDensity('surface concentration', surface_cm3, layer.least, LARGEST_DENSITY_CM3)
      return sheetResistanceAt(layer, surface_cm3)
    },
    explain: (sheet) => explainLayer(layer, inverse, sheet),
  }
}

function diffusedLayer(settings: DopedLayerSettings): DiffusedLayer {
  const { depth_um, diffusionLength_um, table } = settings
  const profile = layerProfile(settings.profile as ProfileId)
  const background_cm3 = settings.background.concentration_cm3
  const least = leastDensity_cm3(settings.mobility, background_cm3)
  const shared = { settings, profile, background_cm3, least }
  if (table !== undefined) refuse(`table for a ${profile.id} profile`, 'only a tabulated profile takes one')
  if (depth_um !== undefined && diffusionLength_um === undefined) {
    requireRange('junction depth', depth_um, 'um', 1e-4, 1000)
    return { ...shared, depthAt_um: () => depth_um }
  }
  if (diffusionLength_um !== undefined && depth_um === undefined) {
    requireRange('diffusion length', diffusionLength_um, 'um', 1e-5, 1000)
    // A uniform profile refuses here.
    profile.depthInLengths(background_cm3 / least)
    return { ...shared, depthAt_um: (n) => diffusionLength_um * profile.depthInLengths(background_cm3 / n) }
  }
  const both = depth_um !== undefined
  return refuse(
    `layer with ${both ? 'both junction depth and diffusion length' : 'neither junction depth nor diffusion length'}`,
    'give exactly one of the two; the other follows from it',
  )
}

function refuse(what: string, why: string): never {
  throw new CoreError({ kind: 'not-applicable', what, why })
}

function sheetResistanceAt({ settings, profile, background_cm3, depthAt_um }: DiffusedLayer, surface_cm3: number) {
  const doping = { silicon: settings, profile, surface_cm3, background_cm3 }
  return sheetDepthProduct_ohm_um(doping) / depthAt_um(surface_cm3)
}

/** Along t = ln(N_s / N_B - 1), in which ln R_s is nearly straight at both ends. */
function diffusedCurve(layer: DiffusedLayer): LayerCurve {
  const { settings, profile, background_cm3, least, depthAt_um } = layer
  const excessOf = (surface_cm3: number): number => Math.log(surface_cm3 / background_cm3 - 1)
  const surfaceAt = (t: number): number => background_cm3 * (1 + Math.exp(t))
  return {
    from: excessOf(least),
    to: excessOf(LARGEST_DENSITY_CM3),
    bends: joins_cm3(settings).map((join) => excessOf(join - background_cm3)),
    lnConcentration: (t) => Math.log(background_cm3) + Math.log1p(Math.exp(t)),
    lnDose(t) {
      const surface_cm3 = surfaceAt(t)
      const mean_cm3 = meanNetDensity_cm3({ profile, surface_cm3, background_cm3 })
      return Math.log(mean_cm3 * depthAt_um(surface_cm3) * UM_IN_CM)
    },
    lnSheetResistance: (t) => Math.log(sheetResistanceAt(layer, surfaceAt(t))),
  }
}

/** After concentration and its sensitivity. */
function fillResistivity(layer: DiffusedLayer, sheets: Float64Array, into: LayerColumns): void {
  const { settings, profile, background_cm3, depthAt_um } = layer
  const { resistivity_ohm_cm, resistivitySensitivity, concentration_cm3, concentrationSensitivity } = into
  if (settings.depth_um !== undefined) {
    for (let i = 0; i < sheets.length; i++) resistivity_ohm_cm[i] = sheets[i] * settings.depth_um * UM_IN_CM
    resistivitySensitivity.fill(1)
    return
  }
  for (let i = 0; i < sheets.length; i++) {
    const surface_cm3 = concentration_cm3[i]
    const isKnown = !Number.isNaN(surface_cm3)
    resistivity_ohm_cm[i] = isKnown ? sheets[i] * depthAt_um(surface_cm3) * UM_IN_CM : NaN
    resistivitySensitivity[i] = isKnown
      ? 1 + profile.depthResponse(background_cm3 / surface_cm3) * concentrationSensitivity[i]
      : NaN
  }
}

function explainLayer(layer: DiffusedLayer, inverse: CurveInverse, sheet: number): readonly LayerStep[] {
  const { settings, profile, depthAt_um } = layer
  const point = inverse.pointAt(sheet)
  const depth_um = settings.depth_um ?? (Number.isNaN(point.concentration) ? NaN : depthAt_um(point.concentration))
  const depth = formatQuantity(depth_um, 'µm')
  const product = sheet * depth_um
  const found = concentrationStep(layer, inverse, sheet, point)
  const solved = settings.depth_um === undefined ? [found, depthStep(layer, depth_um, point)] : []
  return [
    ...solved,
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
    ...(solved.length > 0 ? [] : [found]),
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

function depthStep({ settings, profile }: DiffusedLayer, depth_um: number, point: LayerPoint): LayerStep {
  const length = `${profile.lengthSymbol} = ${formatQuantity(settings.diffusionLength_um ?? NaN, 'µm')}`
  return {
    symbol: 'x_j',
    title: 'Junction depth, solved with the surface concentration',
    value: depth_um,
    unit: 'µm',
    formula: `${profile.depthFormula}, ${length}, N_s = ${formatConcentration(point.concentration)}`,
    source: JUNCTION_SOURCE,
  }
}

function concentrationStep(
  { settings, profile, least }: DiffusedLayer,
  inverse: CurveInverse,
  sheet: number,
  point: LayerPoint,
): LayerStep {
  const { min, max } = inverse.range_ohm_sq
  const background = `N_B = ${formatConcentration(settings.background.concentration_cm3)} ${settings.background.dopant}`
  const integral = '∫₀¹ q µ(N + N_B) (N − N_B) dη'
  const wanted =
    settings.depth_um === undefined
      ? `10⁴ / (x_j ${integral}) = ${formatQuantity(sheet, 'Ω/sq')}, ${profile.depthFormula}`
      : `10⁴ / ${integral} = ${formatQuantity(sheet * settings.depth_um, 'Ω·µm')}`
  const solved = `N_s for which ${wanted}, ${profile.formula}, ${background}, mobility ${settings.mobility.title}`
  const outside =
    `none: the layer covers ${formatSignificant(min, 4)} to ${formatQuantity(max, 'Ω/sq')}, that is N_s from ` +
    `${formatConcentration(LARGEST_DENSITY_CM3)} down to ${formatConcentration(least)}`
  return {
    symbol: 'N_s',
    title: 'Surface concentration',
    value: point.concentration,
    unit: 'cm⁻³',
    formula: Number.isNaN(point.concentration) ? outside : solved,
    source: `${IRVIN}; ${settings.mobility.source}`,
  }
}
