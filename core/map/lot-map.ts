/** The mean wafer of a lot: what all wafers share is the process, what differs from wafer to wafer is its drift. */
import { CoreError } from '../problems/problem'
import { interpolatorsFor } from './interpolator'
import { matchSites } from './matching-sites'
import type { SiteColumnsOfWafer } from './profiles'
import type { Targets } from './thin-plate-spline'
import { placed, valued, type CommonPlaces, type PlacedSites } from './wafer-arithmetic'

export interface LotMap {
  readonly places: CommonPlaces
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  /** Over the wafers that have a value there; NaN where none has. */
  readonly mean: Float64Array
  /** Sample standard deviation over wafers; NaN for fewer than two. */
  readonly standardDeviation: Float64Array
  /** How many wafers have a value there; on a grid, how many have it within the hull of their sites. */
  readonly count: Uint32Array
  readonly wafers: number
}

/**
 * At the sites of the first wafer where all have them at the same places (to 1e-6 mm, in any order), else all
 * interpolated to the grid, where extrapolated values don't count.
 *
 * @throws CoreError not-applicable for no wafers, or one without any value
 */
export function lotMap(wafers: readonly SiteColumnsOfWafer[], grid: Targets): LotMap {
  if (wafers.length === 0) throw new CoreError({ kind: 'not-applicable', what: 'lot map', why: 'there are no wafers' })
  const sites = wafers.map(placed)
  const partners = sites.map((wafer) => matchSites(sites[0], wafer))
  const isCommon = partners.every((partner) => partner !== null)
  const columns = isCommon
    ? sites.map((wafer, w) => Float64Array.from(partners[w] ?? [], (j) => wafer.value[j]))
    : gridColumns(sites, grid)
  const { x_mm, y_mm } = isCommon ? sites[0] : grid
  return {
    places: isCommon ? 'common-sites' : 'common-grid',
    x_mm,
    y_mm,
    ...moments(columns, x_mm.length),
    wafers: wafers.length,
  }
}

function gridColumns(sites: readonly PlacedSites[], grid: Targets): Float64Array[] {
  const interpolatorAt = interpolatorsFor(grid)
  return sites.map(valued).map(({ x_mm, y_mm, value }) => {
    const interpolator = interpolatorAt(x_mm, y_mm)
    return interpolator.evaluate(value).map((surface, t) => (interpolator.inside[t] === 1 ? surface : NaN))
  })
}

/** One pass over the wafers, by Welford's update, which doesn't cancel. */
function moments(
  columns: readonly Float64Array[],
  places: number,
): Pick<LotMap, 'mean' | 'standardDeviation' | 'count'> {
  const mean = new Float64Array(places)
  const squares = new Float64Array(places)
  const count = new Uint32Array(places)
  for (const column of columns) {
    for (let i = 0; i < places; i++) {
      if (!Number.isFinite(column[i])) continue
      const change = column[i] - mean[i]
      mean[i] += change / ++count[i]
      squares[i] += change * (column[i] - mean[i])
    }
  }
  return {
    mean: mean.map((value, i) => (count[i] > 0 ? value : NaN)),
    standardDeviation: squares.map((sum, i) => (count[i] > 1 ? Math.sqrt(sum / (count[i] - 1)) : NaN)),
    count,
  }
}
