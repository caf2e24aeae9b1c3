/**
 * Standard uncertainty of every site, first form: each component of the procedure moves the result through its first
 * derivative, components are uncorrelated with each other, and those common to all sites are kept apart from those
 * that every site has to itself (JCGM 100:2008, 5.1.2).
 */
import type { LayerColumns } from '../layer/layer-kind'
import type { Contribution } from './contributions'
import type { Quantity } from './lot-analysis'

/** Relative effect on resistivity of a component with that effect on sheet resistance, at the layer's sensitivity. */
export function onResistivity(part: Contribution, onSheet: number, sensitivity: number): number {
  // What a mobility does to the concentration it also does to a depth that is solved with it.
  return sensitivity * (onSheet + part.resistivityExtra) + (sensitivity - 1) * part.concentrationExtra
}

/** Standard uncertainties, a column each: the effects of the components, which are not correlated, added in quadrature. */
export interface SiteUncertainties {
  readonly uSheetResistance_ohm_sq: Float64Array
  readonly uResistivity_ohm_cm: Float64Array
  readonly uConcentration_cm3: Float64Array
  /** The two parts of that of the judged quantity: what all sites have in common, and what each has to itself. */
  readonly uShared: Float64Array
  readonly uIndependent: Float64Array
}

/**
 * @param judged  which of the two quantities the shared and independent parts are of
 */
export function propagate(
  parts: readonly Contribution[],
  layer: LayerColumns,
  sheetResistance_ohm_sq: Float64Array,
  judged: Quantity['id'],
): SiteUncertainties {
  const column = () => new Float64Array(sheetResistance_ohm_sq.length)
  const into: SiteUncertainties = {
    uSheetResistance_ohm_sq: column(),
    uResistivity_ohm_cm: column(),
    uConcentration_cm3: column(),
    uShared: column(),
    uIndependent: column(),
  }
  for (let site = 0; site < sheetResistance_ohm_sq.length; site++) {
    addUp(parts, layer, sheetResistance_ohm_sq[site], judged, site, into)
  }
  return into
}

function addUp(
  parts: readonly Contribution[],
  layer: LayerColumns,
  sheetResistance_ohm_sq: number,
  judged: Quantity['id'],
  site: number,
  into: SiteUncertainties,
): void {
  let sheetShared = 0
  let sheetIndependent = 0
  let bulkShared = 0
  let bulkIndependent = 0
  let concentration = 0
  for (const part of parts) {
    const onSheet = part.sheetResistance(site)
    const onBulk = onResistivity(part, onSheet, layer.resistivitySensitivity[site])
    const onConcentration = onSheet + part.resistivityExtra + part.concentrationExtra
    if (part.shared) {
      sheetShared += onSheet * onSheet
      bulkShared += onBulk * onBulk
    } else {
      sheetIndependent += onSheet * onSheet
      bulkIndependent += onBulk * onBulk
    }
    concentration += onConcentration * onConcentration
  }
  const rho_ohm_cm = layer.resistivity_ohm_cm[site]
  const isResistivity = judged === 'resistivity'
  const value = isResistivity ? rho_ohm_cm : sheetResistance_ohm_sq
  const perPart = layer.concentration_cm3[site] * Math.abs(layer.concentrationSensitivity[site])
  into.uSheetResistance_ohm_sq[site] = sheetResistance_ohm_sq * Math.sqrt(sheetShared + sheetIndependent)
  into.uResistivity_ohm_cm[site] = rho_ohm_cm * Math.sqrt(bulkShared + bulkIndependent)
  into.uConcentration_cm3[site] = perPart * Math.sqrt(concentration)
  into.uShared[site] = value * Math.sqrt(isResistivity ? bulkShared : sheetShared)
  into.uIndependent[site] = value * Math.sqrt(isResistivity ? bulkIndependent : sheetIndependent)
}
