import type { LayerColumns } from '../layer/layer-kind'
import type { Corrections } from './corrections'
import { SITE_FLAGS } from './flags'
import type { Quantity, SiteColumns } from './lot-analysis'
import type { SiteUncertainties } from './uncertainty'

/** The columns that are shown of every site; verdicts and probabilities are still to be filled. */
export function siteColumns({
  corrections,
  layer,
  uncertainties,
  quantity,
  flags,
}: {
  readonly corrections: Corrections
  readonly layer: LayerColumns
  readonly uncertainties: SiteUncertainties
  readonly quantity: Quantity
  readonly flags: Uint32Array
}): SiteColumns {
  const { vOverI, geometryFactor, thickness, temperature, reported, sheetResistance_ohm_sq } = corrections
  const count = sheetResistance_ohm_sq.length
  const corrected = (column: Float64Array): Float64Array => (reported ? withoutReported(column, flags) : column)
  const isResistivity = quantity.id === 'resistivity'
  return {
    count,
    vOverI_ohm: vOverI.a_ohm,
    vOverIB_ohm: vOverI.b_ohm,
    geometryFactor: corrected(geometryFactor),
    thicknessFactor: corrected(new Float64Array(count).fill(thickness.value)),
    temperatureFactor: corrected(temperature.factor),
    sheetResistance_ohm_sq,
    resistivity_ohm_cm: layer.resistivity_ohm_cm,
    concentration_cm3: layer.concentration_cm3,
    dose_cm2: layer.dose_cm2,
    thickness_um: layer.thickness_um,
    ...uncertainties,
    value: isResistivity ? layer.resistivity_ohm_cm : sheetResistance_ohm_sq,
    u: isResistivity ? uncertainties.uResistivity_ohm_cm : uncertainties.uSheetResistance_ohm_sq,
    conformanceProbability: new Float64Array(count),
    verdict: new Uint8Array(count),
    flags,
  }
}

/** A value taken as the file reports it has none of our factors. */
function withoutReported(column: Float64Array, flags: Uint32Array): Float64Array {
  return column.map((value, site) => (flags[site] & SITE_FLAGS.reported.bit ? NaN : value))
}
