/** `persquare sites`: a site plan of SEMI MF1618 as CSV. */
import { writeCsv } from '../../core/ingest/write-csv'
import {
  cartesianPlan,
  concentricPlan,
  diameterPlan,
  outerRadius_mm,
  roundedSites,
  type SitePlan,
} from '../../core/wafer/site-patterns'
import { namedOptions, numberOf, refuse } from './convert-arguments'

export const SITES_USAGE = `usage: persquare sites (one plan) --diameter-mm MM --edge-exclusion-mm MM [options]

  --circles K               concentric: the centre and K circles, 1 + 4 K (K + 1) sites
  --rows N                  Cartesian: a square lattice of N rows, N odd, cut to the circle
  --diameter-sites N        N sites along one diameter
  --spot-mm MM              the outermost spots, so wide, touch the edge exclusion from inside (method A);
                            without it the outermost sites lie on it (method B)
  --start +x|+y             with --circles: where every circle begins (default: +x)
  --angle-deg DEG           with --diameter-sites: its direction, anticlockwise from +x (default: 0)

Plans of SEMI MF1618, as CSV: site, x_mm, y_mm, r_mm, theta_deg from the centre, the notch or flat at the bottom (-y).

exit status: 0 planned; 2 not planned`

const PLANS = ['circles', 'rows', 'diameter-sites'] as const

const OPTIONS = {
  circles: { type: 'string' },
  rows: { type: 'string' },
  'diameter-sites': { type: 'string' },
  'diameter-mm': { type: 'string' },
  'edge-exclusion-mm': { type: 'string' },
  'spot-mm': { type: 'string' },
  start: { type: 'string' },
  'angle-deg': { type: 'string' },
} as const

type Given = ReturnType<typeof namedOptions<typeof OPTIONS>>

export async function sitesCommand(args: readonly string[]): Promise<number> {
  process.stdout.write(sitesCsv(args))
  return 0
}

/** What is printed. @throws CoreError bad-argument, out-of-range */
export function sitesCsv(args: readonly string[]): string {
  return planCsv(planOf(namedOptions(args, OPTIONS)))
}

function planOf(given: Given): SitePlan {
  const [plan, second] = PLANS.filter((name) => given[name] !== undefined)
  if (plan === undefined) refuse('sites', 'name one plan: --circles K, --rows N or --diameter-sites N')
  if (second !== undefined) refuse(`--${second}`, `--${plan} is given already; one plan at a time`)
  if (given.start !== undefined && plan !== 'circles') refuse('--start', 'only the circles of --circles have a start')
  if (given['angle-deg'] !== undefined && plan !== 'diameter-sites') {
    refuse('--angle-deg', 'only the line of --diameter-sites has a direction')
  }
  const count = numberOf(plan, given[plan] ?? '')
  if (!Number.isInteger(count)) refuse(`--${plan}`, `${count} is not a whole number`)
  const outer = { outerRadius_mm: radiusOf(given) }
  switch (plan) {
    case 'circles':
      return concentricPlan({ circles: count, startAngle_deg: startOf(given), ...outer })
    case 'rows':
      if (count % 2 === 0) refuse('--rows', `a lattice about the centre has an odd number of rows, not ${count}`)
      return cartesianPlan({ rows: count, ...outer })
    case 'diameter-sites':
      return diameterPlan({ count, angle_deg: numberOf('angle-deg', given['angle-deg'] ?? '0'), ...outer })
  }
}

function radiusOf(given: Given): number {
  const needed = (name: 'diameter-mm' | 'edge-exclusion-mm', what: string) =>
    numberOf(name, given[name] ?? refuse(`--${name}`, `give ${what}`))
  const spot = given['spot-mm']
  return outerRadius_mm({
    diameter_mm: needed('diameter-mm', 'the diameter of the wafer'),
    edgeExclusion_mm: needed('edge-exclusion-mm', 'the width of the ring along the edge that is left out, 0 for none'),
    ...(spot === undefined ? {} : { spot_mm: numberOf('spot-mm', spot) }),
  })
}

function startOf({ start = '+x' }: Given): number {
  if (start === '+x') return 0
  if (start === '+y') return 90
  return refuse('--start', `it is +x or +y, not "${start}"`)
}

function planCsv(plan: SitePlan): string {
  const { count, x_mm, y_mm, r_mm, theta_deg } = roundedSites(plan)
  const column = (name: string, values: Float64Array) => ({ name, cell: (row: number) => values[row] })
  return writeCsv(
    [
      { name: 'site', cell: (row) => row + 1 },
      column('x_mm', x_mm),
      column('y_mm', y_mm),
      column('r_mm', r_mm),
      column('theta_deg', theta_deg),
    ],
    count,
  )
}
