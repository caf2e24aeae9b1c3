import type { LotAnalysis } from './lot-analysis'

/**
 * The site whose working a report sets out: the one nearest the centre of the first wafer that is out of spec, else of
 * the first; of the sites with a result.
 */
export function reportSite({ wafers, sites, readings }: LotAnalysis): number | null {
  const inOrder = [...wafers.filter(({ verdict }) => verdict === 'out-of-spec'), ...wafers]
  for (const wafer of inOrder) {
    const usable = wafer.sites.filter((i) => sites.value[i] > 0)
    if (usable.length === 0) continue
    const { x_mm, y_mm } = readings
    const radius = (i: number): number => (x_mm && y_mm ? Math.hypot(x_mm[i], y_mm[i]) : 0)
    return usable.reduce((nearest, i) => (radius(i) < radius(nearest) ? i : nearest))
  }
  return null
}
