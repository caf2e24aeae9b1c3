/**
 * What every picture of a lot shares: order of wafers, limits, one colour scale. It is the report's own context, so that
 * screen and paper show the same scale and the same marks.
 */
import type { LotAnalysis, WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { markOf, type MarkKind } from '../../../core/report/figures/marks'
import { reportContext, waferMarkOf, type ReportContext } from '../../../core/report/report-context'
import { sourceList } from '../../../core/report/source-list'

export type LotPictures = ReportContext

export function lotPictures(analysis: LotAnalysis): LotPictures {
  const nothing = { working: null, date: null, program: '', paper: 'A4', sources: [] } as const
  return reportContext({ analysis, ...nothing }, sourceList([], []))
}

/** Calm is null. */
export function waferMark(pictures: LotPictures, wafer: WaferAnalysis): MarkKind | null {
  return waferMarkOf(wafer, pictures)
}

export function siteMark({ analysis, siteLimits }: LotPictures, site: number): MarkKind {
  return markOf(analysis.sites.verdict[site], analysis.sites.value[site], siteLimits)
}

/** A place in the cassette: a wafer, or a slot that stands empty. */
export interface RackPlace {
  readonly slot: number
  readonly wafer: WaferAnalysis | null
}

/** The slots of a cassette of 25, or as many as are named; wafers without a slot follow. */
export function rackPlaces(wafers: readonly WaferAnalysis[]): readonly RackPlace[] {
  const slotted = wafers.filter(({ slot }) => Number.isInteger(slot) && slot >= 1 && slot <= 200)
  const rest = wafers.filter((wafer) => !slotted.includes(wafer)).map((wafer) => ({ slot: NaN, wafer }))
  if (slotted.length === 0) return rest
  const last = Math.max(slotted.length > 1 ? 25 : 1, ...slotted.map(({ slot }) => slot))
  const places = Array.from({ length: last }, (_, i) => slotted.filter(({ slot }) => slot === i + 1))
  const racked = places.flatMap((here, i): RackPlace[] =>
    here.length > 0 ? here.map((wafer) => ({ slot: i + 1, wafer })) : [{ slot: i + 1, wafer: null }],
  )
  return [...racked, ...rest]
}

export type RackOrder = 'slot' | 'mean' | 'spread' | 'verdict'

const VERDICT_RANK = { 'out-of-spec': 0, undecided: 1, 'not-assessed': 2, 'in-spec': 3 } as const

/** In slot order empty slots are shown; otherwise highest, widest or worst first. */
export function orderedRack(wafers: readonly WaferAnalysis[], order: RackOrder): readonly RackPlace[] {
  if (order === 'slot') return rackPlaces(wafers)
  const size = (value: number): number => (Number.isNaN(value) ? -Infinity : value)
  const rank = {
    mean: (wafer: WaferAnalysis) => -size(wafer.statistics.mean),
    spread: (wafer: WaferAnalysis) => -size(wafer.statistics.nonuniformityPercent),
    verdict: (wafer: WaferAnalysis) => VERDICT_RANK[wafer.verdict],
  }[order]
  return [...wafers].sort((a, b) => rank(a) - rank(b)).map((wafer) => ({ slot: wafer.slot, wafer }))
}

/** A map narrower than its figures says too little; a wider one only takes room. */
const LEAST_PX = 74
const MOST_PX = 330

/** How many columns make the maps of a rack largest without scrolling; where they can't all be seen, the narrowest. */
export function rackColumns(count: number, width: number, height: number): number {
  const most = Math.max(1, Math.floor(width / LEAST_PX))
  for (let columns = Math.max(1, Math.floor(width / MOST_PX)); columns <= most; columns++) {
    if (Math.ceil(count / columns) * placeHeight(width / columns) <= height) return columns
  }
  return most
}

/** The map, its name and its figures, which take two lines where they don't fit into one. */
function placeHeight(width: number): number {
  return 0.82 * (width - 14) + (width < 100 ? 74 : 58)
}
