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
import { surfaceResiduals, type WaferResiduals } from './surface-residuals'

/** Robust standard deviations of the wafer's residuals. */
const FAR = 8
/** Of the value. */
const LEAST = 0.01
const LEAST_WAFERS = 6
/** Of the lot's noise, and of the standard error over the wafers. */
const REPEATED = 3
const SURE = 8

export const standingOut: HealthCheck = { id: 'neighbours', title: 'Sites that their neighbours contradict', look }

function look(input: HealthInput): readonly HealthFinding[] {
  const residuals = surfaceResiduals(input)
  const repeated = repeatedSites(input, residuals)
  return [...repeated, ...strays(input, residuals, new Set(repeated.flatMap(({ site }) => site ?? [])))]
}

function strays({ value, readings }: HealthInput, residuals: readonly WaferResiduals[], told: ReadonlySet<number>): readonly HealthFinding[] {
  const found = residuals.flatMap(({ wafer, residual, kept }) => {
    const deviation = robustDeviation(residual, 0)
    if (!(deviation > 0)) return []
    return [...wafer.rows].flatMap((row, k) => {
      const z = residual[k] / (deviation * kept[k])
      // What a stray site misses by, had the surface not bent towards it.
      const miss = residual[k] / kept[k] ** 2
      return Math.abs(z) > FAR && Math.abs(miss) > LEAST * value[row] && !told.has(row) ? [{ wafer: wafer.id, row, z, miss: miss / value[row] }] : []
    })
  })
  // Many on one wafer are no strays: its pattern is steeper than the surface that was tried.
  const few = found.filter(({ wafer }) => found.filter((other) => other.wafer === wafer).length <= 3)
  return few.sort((a, b) => Math.abs(b.z) - Math.abs(a.z)).slice(0, 5).map(({ wafer, row, z, miss }): HealthFinding => ({
    check: 'neighbours',
    severity: 'look',
    sentence: `Site ${readings.siteNames[readings.site[row]]} of wafer ${wafer} reads ${formatFixed(100 * Math.abs(miss), 1)} % ${miss > 0 ? 'above' : 'below'} what its neighbours say.`,
    nextStep: 'Measure it again, a millimetre beside; if it stays, it is on the wafer (a particle, a scratch, a spot), else exclude it with that reason.',
    wafers: [wafer],
    site: row,
    evidence: { robustDeviations: z, relativeMiss: miss },
    source: COMMON_PRACTICE,
  }))
} // prettier-ignore

/** The same site off in the same way on most wafers, more than the noise lets expect. */
function repeatedSites(
  { readings, value }: HealthInput,
  residuals: readonly WaferResiduals[],
): readonly HealthFinding[] {
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
  return [...byName].flatMap(([name, entries]): HealthFinding[] => {
    if (entries.length < LEAST_WAFERS) return []
    const shares = entries.map(({ share }) => share)
    const median = medianOf(shares)
    const error = (1.2533 * robustDeviation(shares, median)) / Math.sqrt(shares.length)
    if (!(Math.abs(median) > Math.max(REPEATED * typical, 0.5 * LEAST)) || Math.abs(median) < SURE * error) return []
    return [
      {
        check: 'repeated-site',
        severity: 'look',
        sentence: `Site ${name} reads ${formatFixed(100 * Math.abs(median), 1)} % ${median > 0 ? 'high' : 'low'} on ${entries.length} wafers, against its neighbours: what repeats so is of the prober or the chuck, or of the process at just that place.`,
        nextStep: 'Turn a wafer by 90° and measure again: if the place stays with the chuck, clean it and the probe.',
        wafers: [],
        site: entries[0].row,
        evidence: { relativeMedian: median, standardError: error, wafers: entries.length },
        source: COMMON_PRACTICE,
      },
    ]
  })
}
