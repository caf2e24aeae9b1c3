/** Which shapes a trend surface is made of, and in which order each takes its share of the variance. */
import type { ZernikeIndex } from './zernike'

/** From the simplest up. */
export const TREND_ORDERS = ['plane', 'bowl', 'zernike-2', 'zernike-3', 'zernike-4', 'zernike-6'] as const
export type TrendOrder = (typeof TREND_ORDERS)[number]

/** In the order of the sequential sums of squares: what several could explain goes to the first. */
export const TREND_GROUPS = ['tilt', 'bowl', 'higher-radial', 'two-fold', 'three-fold', 'rest'] as const
export type TrendGroupId = (typeof TREND_GROUPS)[number]

export const TREND_GROUP_TITLES: Readonly<Record<TrendGroupId, string>> = {
  tilt: 'tilt',
  bowl: 'bowl',
  'higher-radial': 'rings beyond the bowl',
  'two-fold': 'two-fold (saddle)',
  'three-fold': 'three-fold',
  rest: 'lopsided, four-fold and finer',
}

const DEGREES: Readonly<Record<TrendOrder, number>> = {
  plane: 1,
  bowl: 2,
  'zernike-2': 2,
  'zernike-3': 3,
  'zernike-4': 4,
  'zernike-6': 6,
}

/** The shapes of an order: the mean, then group after group, within one by degree, the cosine before the sine. */
export function trendTerms(order: TrendOrder): ZernikeIndex[] {
  const terms: ZernikeIndex[] = []
  for (let n = 1; n <= DEGREES[order]; n++) {
    for (let folds = n % 2; folds <= n; folds += 2) {
      for (const m of folds === 0 ? [0] : [folds, -folds]) terms.push({ n, m })
    }
  }
  const wanted = order === 'bowl' ? terms.filter(({ m }) => Math.abs(m) < 2) : terms
  const rank = (index: ZernikeIndex) => TREND_GROUPS.indexOf(trendGroupOf(index))
  // Sorting keeps the order of equals.
  return [{ n: 0, m: 0 }, ...wanted.sort((a, b) => rank(a) - rank(b))]
}

/** The group of any shape but the mean. */
export function trendGroupOf({ n, m }: ZernikeIndex): TrendGroupId {
  if (n === 1) return 'tilt'
  if (m === 0) return n === 2 ? 'bowl' : 'higher-radial'
  if (Math.abs(m) === 2) return 'two-fold'
  return Math.abs(m) === 3 ? 'three-fold' : 'rest'
}

/** The highest order whose terms leave at least one degree of freedom; null where not even a plane does. */
export function highestTrendOrder(siteCount: number): TrendOrder | null {
  return TREND_ORDERS.filter((order) => trendTerms(order).length < siteCount).at(-1) ?? null
}
