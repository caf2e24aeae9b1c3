/** Where a procedure's Gaussian process can't be had: which wafers, why, and what stands in. */
import { METHOD_TITLES, plainMethodFor } from '../map/interpolator'
import { whyNoProcess } from '../map/process-surface'
import type { Readings } from '../ingest/readings'
import type { Procedure } from '../procedure/schema'
import type { SiteColumns } from './lot-analysis'
import type { SitePositions } from './site-positions'
import type { WaferMembers } from './wafers'

export interface MapNotesInput {
  readonly readings: Readings
  readonly procedure: Procedure
  readonly positions: SitePositions | null
  readonly sites: SiteColumns
  readonly members: readonly WaferMembers[]
}

/** More wafers than this are counted, not named. */
const MOST_NAMED = 6

/** One sentence for each reason and stand-in; none where nothing was to be fitted, or all was. */
export function mapNotes({ readings, procedure, positions, sites, members }: MapNotesInput): string[] {
  if (procedure.map.interpolation !== 'gaussian-process' || !positions) return []
  const wafersBecause = new Map<string, string[]>()
  for (const { index, counting } of members) {
    if (counting.length === 0) continue
    const pick = (column: Float64Array): Float64Array => Float64Array.from(counting, (row) => column[row])
    const [x_mm, y_mm] = [pick(positions.x_mm), pick(positions.y_mm)]
    const why = whyNoProcess(x_mm, y_mm, pick(sites.value))
    if (!why) continue
    const sentence = `${why}. Maps and dies: ${METHOD_TITLES[plainMethodFor(x_mm, y_mm)]}.`
    wafersBecause.set(sentence, [...(wafersBecause.get(sentence) ?? []), readings.wafers[index].id])
  }
  return [...wafersBecause].map(
    ([sentence, wafers]) => `No Gaussian process was fitted to ${named(wafers)}: ${sentence}`,
  )
}

function named(wafers: readonly string[]): string {
  if (wafers.length > MOST_NAMED) return `${wafers.length} wafers`
  return `${wafers.length === 1 ? 'wafer' : 'wafers'} ${wafers.join(', ')}`
}
