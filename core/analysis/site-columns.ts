import type { LayerColumns } from '../layer/layer-kind'
import type { Corrections } from './corrections'
import { SITE_FLAGS } from './flags'
import type { Quantity, SiteColumns } from './lot-analysis'
import type { RelativeUncertainties } from './uncertainty'

/** The columns that are shown of every site; verdicts and probabilities are still to be filled. */
export function siteColumns({
  corrections,
  layer,
  relative,
  quantity,
  flags,
}: {
  readonly corrections: Corrections
  readonly layer: LayerColumns
  readonly relative: RelativeUncertainties
  readonly quantity: Quantity
  readonly flags: Uint32Array
}): SiteColumns {
  const { vOverI, geometryFactor, thickness, temperature, reported, sheetResistance_ohm_sq } = corrections
  const count = sheetResistance_ohm_sq.length
  const corrected = (column: Float64Array): Float64Array => (reported ? withoutReported(column, flags) : column)
  const isResistivity = quantity.id === 'resistivity'
  const parts = isResistivity ? relative.resistivity : relative.sheetResistance
  const value = isResistivity ? layer.resistivity_ohm_cm : sheetResistance_ohm_sq
  const uSheetResistance_ohm_sq = absolute(sheetResistance_ohm_sq, relative.sheetResistance)
  const uResistivity_ohm_cm = absolute(layer.resistivity_ohm_cm, relative.resistivity)
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
    uSheetResistance_ohm_sq,
    uResistivity_ohm_cm,
    uConcentration_cm3: times(layer.concentration_cm3, relative.concentration),
    uShared: times(value, parts.shared),
    uIndependent: times(value, parts.independent),
    value,
    u: isResistivity ? uResistivity_ohm_cm : uSheetResistance_ohm_sq,
    conformanceProbability: new Float64Array(count),
    verdict: new Uint8Array(count),
    flags,
  }
}

/** A value taken as the file reports it has none of our factors. */
function withoutReported(column: Float64Array, flags: Uint32Array): Float64Array {
  return column.map((value, site) => (flags[site] & SITE_FLAGS.reported.bit ? NaN : value))
}

function absolute(
  value: Float64Array,
  { shared, independent }: { readonly shared: Float64Array; readonly independent: Float64Array },
): Float64Array {
  const u = new Float64Array(value.length)
  for (let i = 0; i < u.length; i++) {
    u[i] = value[i] * Math.sqrt(shared[i] * shared[i] + independent[i] * independent[i])
  }
  return u
}

function times(value: Float64Array, relative: Float64Array): Float64Array {
  const product = new Float64Array(value.length)
  for (let i = 0; i < product.length; i++) product[i] = value[i] * relative[i]
  return product
}
