/** Sites that stand out of their wafer's surface: one by one, or the same site on wafer after wafer. */
import { formatFixed } from '../units/format'
import {
  COMMON_PRACTICE,
  medianOf,
  robustDeviation,
  type HealthCheck,
  type HealthFinding,
  type HealthInput,
} from './finding'
import { relativeStep } from './resolution'
import { surfaceResiduals, type WaferResiduals } from './surface-residuals'

/** Robust standard deviations of the wafer's residuals. */
const FAR = 8
/** Of the value. */
const LEAST = 0.01
/** Of the display. */
const STEPS = 3
const LEAST_WAFERS = 6
const LONE = ' No other site is as far from the centre, so a steep pattern around the centre looks the same.'
/** Of the lot's noise, and of the standard error over the wafers. */
const REPEATED = 3
const SURE = 8

export const standingOut: HealthCheck = { id: 'neighbours', title: 'Sites that their neighbours contradict', look }

function look(input: HealthInput): readonly HealthFinding[] {
  const residuals = surfaceResiduals(input)
  const repeated = repeatedSites(input, residuals)
  const { site, siteNames } = input.readings
  const told = new Set(repeated.map((finding) => siteNames[site[finding.site!]]))
  return [...repeated, ...strays(input, residuals, told)]
}

/** `told`: names of sites that repeat. */
function strays(input: HealthInput, residuals: readonly WaferResiduals[], told: ReadonlySet<string>): readonly HealthFinding[] {
  const { value, readings } = input
  // On a coarse display most residuals are nearly nothing and the next step looks far.
  const least = Math.max(LEAST, STEPS * relativeStep(input))
  const found = residuals.flatMap(({ wafer, residual, kept }) => {
    const deviation = robustDeviation(residual, 0)
    if (!(deviation > 0)) return []
    return [...wafer.rows].flatMap((row, k) => {
      const z = residual[k] / (deviation * kept[k])
      // What a stray site misses by, had the surface not bent towards it.
      const miss = residual[k] / kept[k] ** 2
      return Math.abs(z) > FAR && Math.abs(miss) > least * value[row] && !told.has(readings.siteNames[readings.site[row]]) ? [{ wafer: wafer.id, row, z, miss: miss / value[row] }] : []
    })
  })
  // Many on one wafer are no strays: its pattern is steeper than the surface that was tried.
  const few = found.filter(({ wafer }) => found.filter((other) => other.wafer === wafer).length <= 3)
  return few.sort((a, b) => Math.abs(b.z) - Math.abs(a.z)).slice(0, 5).map(({ wafer, row, z, miss }): HealthFinding => ({
    check: 'neighbours',
    severity: hasPeers(input, row) ? 'look' : 'note',
    sentence: `Site ${readings.siteNames[readings.site[row]]} of wafer ${wafer} reads ${formatFixed(100 * Math.abs(miss), 1)} % ${miss > 0 ? 'above' : 'below'} what its neighbours say.${hasPeers(input, row) ? '' : LONE}`,
    nextStep: 'Measure it again, a millimetre beside; if it stays, it is on the wafer (a particle, a scratch, a spot), else exclude it with that reason.',
    wafers: [wafer],
    site: row,
    evidence: { robustDeviations: z, relativeMiss: miss },
    source: COMMON_PRACTICE,
  }))
} // prettier-ignore

/**
 * The same site off in the same way on most wafers, more than the noise lets expect, and more than the other sites are:
 * where the surface is too smooth for the pattern that all wafers share, many sites miss it a little on all of them.
 */
function repeatedSites(input: HealthInput, residuals: readonly WaferResiduals[]): readonly HealthFinding[] {
  const { readings, value } = input
  const byName = new Map<string, { row: number; share: number }[]>()
  const noise: number[] = []
  for (const { wafer, residual, kept } of residuals) {
    const level = medianOf([...wafer.rows].map((i) => value[i]))
    noise.push(robustDeviation(residual, 0) / level)
    wafer.rows.forEach((row, k) => {
      const name = readings.siteNames[readings.site[row]]
      const entry = { row, share: residual[k] / kept[k] ** 2 / level }
      const list = byName.get(name)
      if (list) list.push(entry)
      else byName.set(name, [entry])
    })
  }
  const typical = medianOf(noise)
  const misfit = robustDeviation(
    [...byName.values()].map((entries) => medianOf(entries.map(({ share }) => share))),
    0,
  )
  return [...byName].flatMap(([name, entries]): HealthFinding[] => {
    if (entries.length < LEAST_WAFERS) return []
    const shares = entries.map(({ share }) => share)
    const median = medianOf(shares)
    const error = (1.2533 * robustDeviation(shares, median)) / Math.sqrt(shares.length)
    const least = Math.max(REPEATED * typical, 0.5 * LEAST, SURE * error, FAR * misfit)
    if (!(Math.abs(median) > least)) return []
    const isAlone = !hasPeers(input, entries[0].row)
    return [
      {
        check: 'repeated-site',
        severity: isAlone ? 'note' : 'look',
        sentence: `Site ${name} reads ${formatFixed(100 * Math.abs(median), 1)} % ${median > 0 ? 'high' : 'low'} on ${entries.length} wafers, against its neighbours: what repeats so is of the prober or the chuck, or of the process at just that place.${isAlone ? LONE : ''}`,
        nextStep: 'Turn a wafer by 90° and measure again: if the place stays with the chuck, clean it and the probe.',
        wafers: [],
        site: entries[0].row,
        evidence: { relativeMedian: median, standardError: error, wafers: entries.length },
        source: COMMON_PRACTICE,
      },
    ]
  })
}

/** In parts of the wafer's outermost site. */
const SAME_RING = 0.05

/** Whether another site of the wafer lies as far from the centre: else nothing tells the site from a pattern around the centre. */
function hasPeers({ x_mm, y_mm, wafers }: HealthInput, row: number): boolean {
  const rows = wafers.find((wafer) => wafer.rows.includes(row))?.rows
  if (!x_mm || !y_mm || !rows) return false
  const radii = Array.from(rows, (i) => Math.hypot(x_mm[i], y_mm[i]))
  const own = Math.hypot(x_mm[row], y_mm[row])
  const near = SAME_RING * Math.max(...radii)
  return radii.filter((radius) => Math.abs(radius - own) < near).length > 1
}
