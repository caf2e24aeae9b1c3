/**
 * Standard uncertainty of every site, first form: each component of the procedure moves the result through its first
 * derivative, components are uncorrelated with each other, and those common to all sites are kept apart from those
 * that every site has to itself (JCGM 100:2008, 5.1.2).
 */
import type { DepthTable, LayerColumns } from '../layer/layer-kind'
import type { Procedure, UncertaintyComponent } from '../procedure/schema'
import type { Corrections } from './corrections'
import { SITE_FLAGS } from './flags'

/** One component's relative effect on the results of a site: derivative times standard uncertainty, with its sign. */
export interface Contribution {
  readonly component: UncertaintyComponent
  readonly title: string
  readonly shared: boolean
  sheetResistance(site: number): number
  /**
   * What the component does by itself, in units of a relative change of sheet resistance: resistivity and concentration
   * follow from sheet resistance times a thickness, depth or diffusion length.
   */
  readonly resistivityExtra: number
  /** What it does to the concentration by itself, in units of a relative change of resistivity (mobility). */
  readonly concentrationExtra: number
}

const TITLES: Record<UncertaintyComponent, string> = {
  currentRel: 'current',
  voltageRel: 'voltage',
  spacingMm: 'each pin spacing',
  thicknessUm: 'wafer thickness',
  temperatureC: 'temperature',
  diameterMm: 'size of the wafer',
  positionMm: 'place of the probe',
  depthUm: 'junction depth',
  mobilityRel: 'mobility model',
  reportedRel: 'reported value',
}

/** The components with an uncertainty, each with how it acts on this lot. */
export function contributions(
  procedure: Procedure,
  profile: DepthTable | null,
  corrections: Corrections,
  flags: Uint32Array,
): Contribution[] {
  const given = procedure.uncertainty
  const shared = new Set(given.shared)
  const { slopes, thicknessSlope } = corrections
  const corrected = (site: number): boolean => (flags[site] & SITE_FLAGS.reported.bit) === 0
  const relativeThickness = procedure.wafer.thicknessUm ? given.thicknessUm / procedure.wafer.thicknessUm : 0
  const through = procedure.layer.kind === 'bulk' ? relativeThickness : 0
  const depth = depthOf(procedure.layer, profile)
  const hasSilicon = 'dopant' in procedure.layer
  const onSheet: Partial<Record<UncertaintyComponent, (site: number) => number>> = {
    currentRel: () => given.currentRel,
    voltageRel: (site) => given.voltageRel * slopes.voltage[site],
    spacingMm: (site) => given.spacingMm * slopes.spacing_per_mm[site],
    thicknessUm: () => relativeThickness * thicknessSlope,
    temperatureC: (site) => given.temperatureC * slopes.temperature_per_C[site],
    diameterMm: (site) => given.diameterMm * slopes.diameter_per_mm[site],
    positionMm: (site) => given.positionMm * slopes.position_per_mm[site],
  }
  const components = (Object.keys(TITLES) as UncertaintyComponent[]).filter((component) => given[component] > 0)
  return components.map((component) => {
    const effect = onSheet[component]
    return {
      component,
      title: component === 'depthUm' ? depth.title : TITLES[component],
      shared: shared.has(component),
      sheetResistance:
        component === 'reportedRel'
          ? (site) => (corrected(site) ? 0 : given.reportedRel)
          : (site) => (effect && corrected(site) ? effect(site) : 0),
      resistivityExtra:
        component === 'thicknessUm' ? through : component === 'depthUm' ? given.depthUm / depth.value_um : 0,
      concentrationExtra: component === 'mobilityRel' && hasSilicon ? given.mobilityRel : 0,
    }
  })
}

/**
 * The length that a layer's depth scale is known by. At a given shape everything along the depth goes with it, so sheet
 * resistance times this length is a function of the concentration alone. A profile file's depths are taken to be wrong
 * by one factor, as those of a sputtered crater are.
 */
function depthOf(layer: Procedure['layer'], profile: DepthTable | null): { title: string; value_um: number } {
  if (layer.kind !== 'doped-layer') return { title: TITLES.depthUm, value_um: Infinity }
  if (layer.depthUm !== undefined) return { title: TITLES.depthUm, value_um: layer.depthUm }
  if (layer.diffusionLengthUm !== undefined) return { title: 'diffusion length', value_um: layer.diffusionLengthUm }
  return {
    title: 'depths of the profile file',
    value_um: profile ? profile.depth_um[profile.depth_um.length - 1] : NaN,
  }
}

/** Relative effect of a component on a site's resistivity, of the sensitivity that the layer says. */
export function onResistivity(part: Contribution, site: number, sensitivity: number): number {
  const through = part.sheetResistance(site) + part.resistivityExtra
  // What a mobility does to the concentration it also does to a depth that is solved with it.
  return sensitivity * through + (sensitivity - 1) * part.concentrationExtra
}

/** Relative standard uncertainties, a column each; shared and independent parts are of sheet resistance and resistivity. */
export interface RelativeUncertainties {
  readonly sheetResistance: { readonly shared: Float64Array; readonly independent: Float64Array }
  readonly resistivity: { readonly shared: Float64Array; readonly independent: Float64Array }
  readonly concentration: Float64Array
}

/** Adds the contributions in quadrature, a column at a time. */
export function propagate(parts: readonly Contribution[], layer: LayerColumns, count: number): RelativeUncertainties {
  const sums = {
    sheetResistance: { shared: new Float64Array(count), independent: new Float64Array(count) },
    resistivity: { shared: new Float64Array(count), independent: new Float64Array(count) },
    concentration: new Float64Array(count),
  }
  for (const part of parts) {
    const sheet = part.shared ? sums.sheetResistance.shared : sums.sheetResistance.independent
    const bulk = part.shared ? sums.resistivity.shared : sums.resistivity.independent
    for (let site = 0; site < count; site++) {
      const effect = part.sheetResistance(site)
      const resistivity = onResistivity(part, site, layer.resistivitySensitivity[site])
      const concentration = effect + part.resistivityExtra + part.concentrationExtra
      sheet[site] += effect * effect
      bulk[site] += resistivity * resistivity
      sums.concentration[site] += concentration * concentration
    }
  }
  for (const column of [...Object.values(sums.sheetResistance), ...Object.values(sums.resistivity)]) {
    for (let site = 0; site < count; site++) column[site] = Math.sqrt(column[site])
  }
  for (let site = 0; site < count; site++) {
    sums.concentration[site] = Math.sqrt(sums.concentration[site]) * Math.abs(layer.concentrationSensitivity[site])
  }
  return sums
}
