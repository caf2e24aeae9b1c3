import { prepareConcentrations } from '../silicon/concentration-table'
import type { LayerColumns, PreparedLayer } from '../layer/layer-kind'
import type { Procedure } from '../procedure/schema'
import { CELSIUS_ZERO_K } from '../units/constants'
import type { Corrections } from './corrections'
import { SITE_FLAGS } from './flags'
import { layerMobility } from './prepare-layer'

/** What the layer gives at every site. A resistivity that the file reports stands as it is and is inverted itself. */
export function layerResults(
  procedure: Procedure,
  layer: PreparedLayer | null,
  corrections: Corrections,
  flags: Uint32Array,
): LayerColumns {
  const { sheetResistance_ohm_sq: sheet, reported } = corrections
  const columns = emptyLayerColumns(sheet.length)
  layer?.invert(sheet, columns)
  if (reported) useReportedResistivity(procedure, reported.resistivity_ohm_cm, columns)
  flagRanges(procedure, sheet, columns, flags)
  return columns
}

/** Of NaN throughout. */
export function emptyLayerColumns(count: number): LayerColumns {
  const column = () => new Float64Array(count).fill(NaN)
  return {
    resistivity_ohm_cm: column(),
    concentration_cm3: column(),
    dose_cm2: column(),
    thickness_um: column(),
    resistivitySensitivity: column(),
    concentrationSensitivity: column(),
    doseSensitivity: column(),
  }
}

function useReportedResistivity(procedure: Procedure, resistivity_ohm_cm: Float64Array, columns: LayerColumns): void {
  for (let i = 0; i < resistivity_ohm_cm.length; i++) {
    if (Number.isNaN(resistivity_ohm_cm[i])) continue
    columns.resistivity_ohm_cm[i] = resistivity_ohm_cm[i]
    columns.resistivitySensitivity[i] = 1
  }
  const mobility = layerMobility(procedure.layer)
  if (procedure.layer.kind !== 'bulk' || !mobility) return
  const { dopant } = procedure.layer
  const temperature_K = procedure.temperature.referenceC + CELSIUS_ZERO_K
  const { concentration_cm3, concentrationSensitivity: sensitivity } = columns
  prepareConcentrations({ dopant, mobility, temperature_K }).fill(columns.resistivity_ohm_cm, {
    concentration_cm3,
    sensitivity,
  })
}

/** A site whose sheet resistance no layer of this kind has, or whose concentration its mobility model doesn't cover. */
function flagRanges(procedure: Procedure, sheet: Float64Array, columns: LayerColumns, flags: Uint32Array): void {
  const range = layerMobility(procedure.layer)?.range_cm3
  if (!range) return
  for (let i = 0; i < sheet.length; i++) {
    const n = columns.concentration_cm3[i]
    if (n < range.min || n > range.max) flags[i] |= SITE_FLAGS.mobilityRange.bit
    const isKnown = sheet[i] > 0 || columns.resistivity_ohm_cm[i] > 0
    if (isKnown && Number.isNaN(n)) flags[i] |= SITE_FLAGS.layerRange.bit
  }
}
