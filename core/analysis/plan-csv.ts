/** A site plan as CSV, to be typed into a prober's recipe or read by one. */
import { writeCsv } from '../ingest/write-csv'
import type { DiePlan } from '../wafer/area-plans'
import { roundedSites, type SitePlan } from '../wafer/site-patterns'

/** site, x_mm, y_mm, r_mm, theta_deg from the centre, the notch or flat at the bottom; with dies also die_x, die_y. */
export function planCsv(plan: SitePlan & Partial<Pick<DiePlan, 'dieX' | 'dieY'>>): string {
  const { count, x_mm, y_mm, r_mm, theta_deg } = roundedSites(plan)
  const column = (name: string, values: Float64Array | Int32Array) => ({ name, cell: (row: number) => values[row] })
  const { dieX, dieY } = plan
  return writeCsv(
    [
      { name: 'site', cell: (row) => row + 1 },
      column('x_mm', x_mm),
      column('y_mm', y_mm),
      column('r_mm', r_mm),
      column('theta_deg', theta_deg),
      ...(dieX && dieY ? [column('die_x', dieX), column('die_y', dieY)] : []),
    ],
    count,
  )
}
