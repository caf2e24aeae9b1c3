import type { Readings } from '../ingest/readings'
import type { Procedure } from '../procedure/schema'
import { SITE_FLAGS } from './flags'

/** Sites whose result the file gives ready made; NaN elsewhere. */
export interface ReportedValues {
  readonly sheetResistance_ohm_sq: Float64Array
  readonly resistivity_ohm_cm: Float64Array
}

const UM_IN_CM = 1e-4

/**
 * Where a site has no V/I but a reported sheet resistance or resistivity: with the constant it was made with
 * (`reported.factor`) its V/I is recovered into `vOverI_ohm`, to be corrected like any other; without, it stands as
 * reported and the site is flagged so. Null where no site stands as reported.
 */
export function takeReported(
  readings: Readings,
  procedure: Procedure,
  vOverI_ohm: Float64Array,
  flags: Uint32Array,
): ReportedValues | null {
  const { sheetResistance_ohm_sq: sheet, resistivity_ohm_cm: bulk, count } = readings
  if (!sheet && !bulk) return null
  const factor = procedure.reported?.factor
  const thickness_cm = (procedure.wafer.thicknessUm ?? NaN) * UM_IN_CM
  const reported = {
    sheetResistance_ohm_sq: new Float64Array(count).fill(NaN),
    resistivity_ohm_cm: new Float64Array(count).fill(NaN),
  }
  let any = false
  for (let i = 0; i < count; i++) {
    if (!Number.isNaN(vOverI_ohm[i])) continue
    const rho = bulk ? bulk[i] : NaN
    const rs = sheet && !Number.isNaN(sheet[i]) ? sheet[i] : rho / thickness_cm
    if (factor !== undefined && !Number.isNaN(rs)) {
      vOverI_ohm[i] = rs / factor
    } else if (!Number.isNaN(rs) || !Number.isNaN(rho)) {
      reported.sheetResistance_ohm_sq[i] = rs
      reported.resistivity_ohm_cm[i] = rho
      flags[i] |= SITE_FLAGS.reported.bit
      any = true
    }
  }
  return any ? reported : null
}
