/**
 * Standard uncertainty of every site, first form: each component of the procedure moves the result through its first
 * derivative, components are uncorrelated with each other, and those common to all sites are kept apart from those
 * that every site has to itself (JCGM 100:2008, 5.1.2).
 */
import type { LayerColumns } from '../layer/layer-kind'
import type { Procedure, UncertaintyComponent } from '../procedure/schema'
import type { Corrections } from './corrections'
import { SITE_FLAGS } from './flags'

/** One component's relative effect on the results of a site: derivative times standard uncertainty, with its sign. */
export interface Contribution {
  readonly component: UncertaintyComponent
  readonly title: string
  readonly shared: boolean
  sheetResistance(site: number): number
  /** What the component does to resistivity beyond what it does to sheet resistance, e.g. thickness. */
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
export function contributions(procedure: Procedure, corrections: Corrections, flags: Uint32Array): Contribution[] {
  const given = procedure.uncertainty
  const shared = new Set(given.shared)
  const { slopes, thicknessSlope } = corrections
  const corrected = (site: number): boolean => (flags[site] & SITE_FLAGS.reported.bit) === 0
  const relativeThickness = procedure.wafer.thicknessUm ? given.thicknessUm / procedure.wafer.thicknessUm : 0
  const through = procedure.layer.kind === 'bulk' ? relativeThickness : 0
  const depth = procedure.layer.kind === 'doped-layer' ? given.depthUm / procedure.layer.depthUm : 0
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
      title: TITLES[component],
      shared: shared.has(component),
      sheetResistance:
        component === 'reportedRel'
          ? (site) => (corrected(site) ? 0 : given.reportedRel)
          : (site) => (effect && corrected(site) ? effect(site) : 0),
      resistivityExtra: component === 'thicknessUm' ? through : component === 'depthUm' ? depth : 0,
      concentrationExtra: component === 'mobilityRel' ? given.mobilityRel : 0,
    }
  })
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
      const onResistivity = effect + part.resistivityExtra
      const onConcentration = onResistivity + part.concentrationExtra
      sheet[site] += effect * effect
      bulk[site] += onResistivity * onResistivity
      sums.concentration[site] += onConcentration * onConcentration
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
