import type { Procedure } from '../procedure/schema'
import { generalizedEsd, type CriticalDeviates } from '../statistics/outliers'
import { SITE_FLAGS } from './flags'
import type { WaferMembers } from './wafers'

/** A tenth of a wafer's sites may be outliers; more is no longer outliers, and a hundred are enough to test. */
const CANDIDATE_SHARE = 0.1
const MOST_CANDIDATES = 100

/**
 * Flags the sites of a wafer that a normal sample would hardly hold (generalized ESD test). They count all the same,
 * unless the procedure says that outliers are left out.
 *
 * @param critical of the procedure's alpha, for all wafers of the lot
 * @returns the flagged sites, farthest first
 */
export function flagOutliers(
  value: Float64Array,
  { counting }: Pick<WaferMembers, 'counting'>,
  { outliers }: Procedure['statistics'],
  flags: Uint32Array,
  critical: CriticalDeviates,
): Uint32Array {
  if (counting.length < 3) return new Uint32Array(0)
  const atMost = Math.min(MOST_CANDIDATES, Math.max(1, Math.floor(CANDIDATE_SHARE * counting.length)))
  const { rows } = generalizedEsd({ values: value, indices: counting, atMost, alpha: outliers.alpha, critical })
  const { bit } = outliers.leaveOut ? SITE_FLAGS.outlierLeftOut : SITE_FLAGS.outlier
  for (const row of rows) flags[row] |= bit
  return Uint32Array.from(rows)
}
