/** `persquare sites`: a site plan as CSV, or what plans see of an effect. */
import { assess, candidatePlans, recommended, type Assessed, type Need } from '../../core/plan/candidates'
import { EFFECT_IDS, EFFECTS, type EffectId } from '../../core/plan/effects'
import { planCsv } from '../../core/analysis/plan-csv'
import { POWER_SOURCE } from '../../core/plan/power'
import { formatFixed, formatSignificant } from '../../core/units/format'
import { diePlan, equalAreaPlan, onWafer } from '../../core/wafer/area-plans'
import { usableDies, type DieGrid } from '../../core/wafer/die-grid'
import type { Outline } from '../../core/wafer/outline'
import {
  cartesianPlan,
  concentricPlan,
  diameterPlan,
  outerRadius_mm,
  type SitePlan,
} from '../../core/wafer/site-patterns'
import { namedOptions, numberOf, refuse } from './convert-arguments'
import { jsonText } from './json-text'
import { alignedNumbers } from './text-table'

export const SITES_USAGE = `usage: persquare sites (one plan) --diameter-mm MM --edge-exclusion-mm MM [options]

  --circles K               concentric: the centre and K circles, 1 + 4 K (K + 1) sites
  --rows N                  Cartesian: a square lattice of N rows, N odd, cut to the circle
  --diameter-sites N        N sites along one diameter
  --equal-area K            the centre and K rings, each site in the middle of an equal share of the usable area
  --dies N                  N die centres, spread evenly; needs --pitch-mm X,Y and takes --offset-mm X,Y
  --spot-mm MM              the outermost spots, so wide, touch the edge exclusion from inside (method A);
                            without it the outermost sites lie on it (method B)
  --start +x|+y             with --circles or --equal-area: where every circle begins (default: +x)
  --angle-deg DEG           with --diameter-sites: its direction, anticlockwise from +x (default: 0)
  --flat-mm MM              a flat of this length at the bottom: sites on it are left out, and said

Plans of SEMI MF1618 and beside them, as CSV: site, x_mm, y_mm, r_mm, theta_deg from the centre, the notch or flat at the
bottom (-y); with --dies also die_x, die_y.

  --effect SHAPE            tilt, bowl, edge, two-fold or spot: prints what the plan sees of it, or without a plan which of
                            the usual plans do
  --size-percent S          the size of the effect that is to be seen
  --repeatability-percent R how far a single site spreads
  --power P                 how surely it is to be seen (default: 0.9)
  --alpha A                 chance of seeing it where it isn't (default: 0.05)
  --json                    with --effect: print one object instead of the table

exit status: 0 planned; 1 no plan sees the effect so surely; 2 not planned`

const PLANS = ['circles', 'rows', 'diameter-sites', 'equal-area', 'dies'] as const

/** Those that ask what a plan sees. */
const OF_EFFECT = ['size-percent', 'repeatability-percent', 'power', 'alpha', 'json'] as const

const OPTIONS = {
  circles: { type: 'string' },
  rows: { type: 'string' },
  'diameter-sites': { type: 'string' },
  'diameter-mm': { type: 'string' },
  'edge-exclusion-mm': { type: 'string' },
  'spot-mm': { type: 'string' },
  start: { type: 'string' },
  'angle-deg': { type: 'string' },
  'equal-area': { type: 'string' },
  dies: { type: 'string' },
  'pitch-mm': { type: 'string' },
  'offset-mm': { type: 'string' },
  'flat-mm': { type: 'string' },
  effect: { type: 'string' },
  'size-percent': { type: 'string' },
  'repeatability-percent': { type: 'string' },
  power: { type: 'string' },
  alpha: { type: 'string' },
  json: { type: 'boolean' },
} as const

type Given = ReturnType<typeof namedOptions<typeof OPTIONS>>

export async function sitesCommand(args: readonly string[]): Promise<number> {
  const given = namedOptions(args, OPTIONS)
  if (given.effect !== undefined) return askPlans(given)
  for (const name of OF_EFFECT) {
    if (given[name] !== undefined) refuse(`--${name}`, 'it has a meaning only together with --effect')
  }
  const { text, said } = planText(given)
  if (said) console.error(said)
  process.stdout.write(text)
  return 0
}

/** What is printed. @throws CoreError bad-argument, out-of-range */
export function sitesCsv(args: readonly string[]): string {
  return planText(namedOptions(args, OPTIONS)).text
}

function planText(given: Given): { readonly text: string; readonly said: string | null } {
  const { plan, leftOut } = onWafer(planOf(given), outlineOf(given), 0)
  const said = leftOut > 0 ? `! ${leftOut} ${leftOut === 1 ? 'site lies' : 'sites lie'} on the flat and ${leftOut === 1 ? 'was' : 'were'} left out.` : null
  return { text: planCsv(plan), said }
} // prettier-ignore

/** The plan given, or else the usual ones, asked whether they see an effect. */
function askPlans(given: Given): number {
  const usable_mm = usableRadius(given)
  const need = needOf(given)
  const hasPlan = PLANS.some((name) => given[name] !== undefined)
  const candidates = hasPlan
    ? [{ id: 'given', title: 'the plan given', plan: onWafer(planOf(given), outlineOf(given), 0).plan, source: '' }]
    : candidatePlans(usable_mm, outlineOf(given), 0)
  const assessed = assess(candidates, usable_mm, need)
  const best = recommended(assessed)
  process.stdout.write(given.json ? jsonText(planObject(assessed, best, need)) : planWords(assessed, best, need))
  return best ? 0 : 1
}

function needOf(given: Given): Need {
  const { effect } = given
  if (!EFFECT_IDS.some((id) => id === effect)) refuse('--effect', `it is ${EFFECT_IDS.join(', ')}, not "${effect}"`)
  const percent = (name: 'size-percent' | 'repeatability-percent', what: string): number => {
    const value = numberOf(name, given[name] ?? refuse(`--${name}`, `give ${what}`)) / 100
    return value > 0 ? value : refuse(`--${name}`, 'it lies above 0')
  }
  return {
    effect: effect as EffectId,
    size: percent('size-percent', 'the size of the effect that is to be seen'),
    repeatability: percent('repeatability-percent', 'how far a single site spreads'),
    power: numberOf('power', given.power ?? '0.9'),
    alpha: numberOf('alpha', given.alpha ?? '0.05'),
  }
}

function planObject(assessed: readonly Assessed[], best: Assessed | null, need: Need): object {
  return {
    format: 'persquare-site-plan/1',
    need,
    recommended: best && best.id,
    plans: assessed.map(({ id, title, plan, detection, smallest, bias, isEnough, source }) => ({
      id, title, sites: plan.count, power: detection, smallestDetectable: smallest, meanBias: bias * need.size, enough: isEnough, source,
    })),
    source: POWER_SOURCE,
  }
} // prettier-ignore

/** A pattern larger than the value itself is none. */
function smallestWords(smallest: number): string {
  return smallest <= 1 ? formatSignificant(100 * smallest, 3) : 'not at all'
}

function planWords(assessed: readonly Assessed[], best: Assessed | null, { effect, size, repeatability, power, alpha }: Need): string {
  const percent = (share: number): string => formatSignificant(100 * share, 3)
  const { title, size: words } = EFFECTS[effect]
  const rows = assessed.map((entry) => [
    `${entry === best ? '> ' : '  '}${entry.title}`, String(entry.plan.count), formatFixed(100 * entry.detection, 1),
    smallestWords(entry.smallest), percent(entry.bias * size),
  ])
  return [
    `A ${title} of ${percent(size)} % (${words}), sites that spread by ${percent(repeatability)} %, ${formatFixed(100 * power, 0)} % sure at ${formatFixed(100 * alpha, 0)} % false alarms, by a test of this one shape in its worst direction or place:`,
    best ? `${best.title} (${best.plan.count} sites) sees it.` : 'no plan here sees it so surely.',
    '',
    ...alignedNumbers([['  plan', 'sites', 'power %', 'smallest %', 'mean off by %'], ...rows]),
    '',
  ].join('\n')
} // prettier-ignore

function planOf(given: Given): SitePlan {
  const [plan, second] = PLANS.filter((name) => given[name] !== undefined)
  if (plan === undefined)
    refuse('sites', `name one plan: --circles K, --rows N, --diameter-sites N, --equal-area K or --dies N`)
  if (second !== undefined) refuse(`--${second}`, `--${plan} is given already; one plan at a time`)
  if (given.start !== undefined && plan !== 'circles' && plan !== 'equal-area')
    refuse('--start', 'only circles have a start')
  if (given['angle-deg'] !== undefined && plan !== 'diameter-sites') {
    refuse('--angle-deg', 'only the line of --diameter-sites has a direction')
  }
  if (given['spot-mm'] !== undefined && (plan === 'dies' || plan === 'equal-area')) {
    refuse('--spot-mm', `--${plan} has no outermost circle that a spot could touch`)
  }
  for (const name of ['pitch-mm', 'offset-mm'] as const) {
    if (given[name] !== undefined && plan !== 'dies') refuse(`--${name}`, 'only --dies has a grid of dies')
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
    case 'equal-area':
      return equalAreaPlan({ circles: count, usableRadius_mm: usableRadius(given), startAngle_deg: startOf(given) })
    case 'dies':
      return dieCentres(given, count)
  }
}

function dieCentres(given: Given, count: number): SitePlan {
  const dies = usableDies({ outline: outlineOf(given), edgeExclusion_mm: exclusionOf(given) }, gridOf(given))
  if (count > dies.count) refuse('--dies', `${dies.count} dies lie whole in the usable area, not ${count}`)
  return diePlan(dies, count)
}

function gridOf(given: Given): DieGrid {
  const pair = (name: 'pitch-mm' | 'offset-mm', text: string): readonly [number, number] => {
    const [x, y, more] = text.split(/[,;]/).map((part) => numberOf(name, part.trim()))
    return y === undefined || more !== undefined ? refuse(`--${name}`, 'it is two numbers, such as 10,8') : [x, y]
  }
  const [pitchX_mm, pitchY_mm] = pair('pitch-mm', given['pitch-mm'] ?? refuse('--pitch-mm', 'give width and height of a die, such as 10,8'))
  const [offsetX_mm, offsetY_mm] = pair('offset-mm', given['offset-mm'] ?? '0,0')
  if (!(pitchX_mm > 0 && pitchY_mm > 0)) refuse('--pitch-mm', 'both lie above 0')
  return { pitchX_mm, pitchY_mm, offsetX_mm, offsetY_mm }
} // prettier-ignore

function outlineOf(given: Given): Outline {
  const diameter_mm = numberOf('diameter-mm', given['diameter-mm'] ?? refuse('--diameter-mm', 'give the diameter of the wafer'))
  const flat = given['flat-mm']
  if (flat !== undefined && !(numberOf('flat-mm', flat) < diameter_mm)) {
    refuse('--flat-mm', `a flat is shorter than the wafer is wide, ${diameter_mm} mm`)
  }
  return { shape: 'disc', diameter_mm, ...(flat === undefined ? { fiducial: 'notch' } : { fiducial: 'flat', flatLength_mm: numberOf('flat-mm', flat) }) }
} // prettier-ignore

function exclusionOf(given: Given): number {
  const what = 'the width of the ring along the edge that is left out, 0 for none'
  return numberOf('edge-exclusion-mm', given['edge-exclusion-mm'] ?? refuse('--edge-exclusion-mm', `give ${what}`))
}

function usableRadius(given: Given): number {
  return outerRadius_mm({
    diameter_mm: numberOf(
      'diameter-mm',
      given['diameter-mm'] ?? refuse('--diameter-mm', 'give the diameter of the wafer'),
    ),
    edgeExclusion_mm: exclusionOf(given),
  })
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
