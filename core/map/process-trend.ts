/** Which trend the sites of a wafer can tell under a Gaussian process. */
import { frameOf } from './frame'
import { fillTrend, trendTerms, type ProcessSites, type TrendDegree } from './gaussian-process'
import { prepareLeastSquares } from './least-squares'

/** As of a trend surface's shapes: with less of its own (root mean square, over the extent of the sites) a term is a guess. */
const TELLING_SIZE = 0.01
/** A site that pulls the trend to itself this closely is the only one to tell of some term: left out, none is left. */
const MOST_LEVERAGE = 0.99

/**
 * The highest degree with three sites a term at least, all of whose terms the sites can tell, whichever of them is left
 * out. Sites on one circle can't tell a bowl from the mean, two crossed lines can't tell a twist, and a centre within a
 * circle tells of the bowl alone: there the trend is of a lower degree, and what it leaves is the process's.
 *
 * @param sites  distinct, not all on one line
 */
export function trendDegreeFor(sites: ProcessSites): TrendDegree {
  for (const degree of [2, 1] as const) {
    if (sites.count >= 3 * trendTerms(degree) && isTold(degree, sites)) return degree
  }
  return 0
}

function isTold(degree: TrendDegree, sites: ProcessSites): boolean {
  const design = prepareLeastSquares(trendColumns(degree, sites))
  const least = TELLING_SIZE * Math.sqrt(design.rows)
  if (design.ownLengths.some((length) => !(length >= least))) return false
  return design.fit(new Float64Array(design.rows)).leverage.every((leverage) => leverage <= MOST_LEVERAGE)
}

/** About the middle of the sites, in units of their spread, so that it doesn't matter where on the wafer they lie. */
function trendColumns(degree: TrendDegree, { x, y, count }: ProcessSites): Float64Array[] {
  const { centreX_mm: centreX, centreY_mm: centreY, scale_mm: scale } = frameOf(x, y)
  const columns = Array.from({ length: trendTerms(degree) }, () => new Float64Array(count))
  const row = new Float64Array(columns.length)
  for (let i = 0; i < count; i++) {
    fillTrend(degree, (x[i] - centreX) / scale, (y[i] - centreY) / scale, row, 0)
    columns.forEach((column, term) => (column[i] = row[term]))
  }
  return columns
}
