import type { Readings } from '../ingest/readings'
import type { Procedure } from '../procedure/schema'

export interface SitePositions {
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  /** How they were had, for the notes; null when the file gave them. */
  readonly note: string | null
}

/** Positions from the file, else from its die indices and the procedure's die grid, else none. */
export function sitePositions(readings: Readings, procedure: Procedure): SitePositions | null {
  if (readings.x_mm && readings.y_mm) return { x_mm: readings.x_mm, y_mm: readings.y_mm, note: null }
  const grid = procedure.dieGrid
  if (readings.dieX && readings.dieY && grid) {
    return {
      x_mm: readings.dieX.map((die) => grid.offsetXMm + die * grid.pitchXMm),
      y_mm: readings.dieY.map((die) => grid.offsetYMm + die * grid.pitchYMm),
      note: 'The file gives die indices only: each site is taken to lie at the centre of its die.',
    }
  }
  return null
}
