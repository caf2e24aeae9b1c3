/** What was wrong with single readings, and what the flags say, as problems. */
import type { AnalysisProblem } from '../problems/problem'
import type { Readings } from '../ingest/readings'
import type { Procedure } from '../procedure/schema'
import { edgeDistance_mm, type Outline } from '../wafer/outline'
import { SITE_FLAGS } from './flags'
import type { Quantity, SiteColumns } from './lot-analysis'
import { limitsOn } from './quantity'
import type { SitePositions } from './site-positions'

export interface FindingsInput {
  readonly readings: Readings
  readonly procedure: Procedure
  readonly positions: SitePositions | null
  readonly outline: Outline
  readonly sites: SiteColumns
  readonly quantity: Quantity
}

export function readingProblems(input: FindingsInput): AnalysisProblem[] {
  return [...swapSuspicion(input), ...sitesWithoutResult(input)]
}

/** Each site that was read and has no result, with the reason nearest to its cause. */
function sitesWithoutResult({ readings, positions, outline, sites }: FindingsInput): AnalysisProblem[] {
  const problems: AnalysisProblem[] = []
  for (let i = 0; i < sites.count; i++) {
    if ((sites.flags[i] & SITE_FLAGS.noReading.bit) === 0) continue
    const where = {
      file: readings.files[readings.file[i]].name,
      line: readings.line[i],
      wafer: readings.wafers[readings.wafer[i]].id,
      site: readings.siteNames[readings.site[i]],
    }
    const margin_mm = positions ? edgeDistance_mm(outline, positions.x_mm[i], positions.y_mm[i]) : Infinity
    if (positions && margin_mm < 0) {
      const radius_mm = Math.hypot(positions.x_mm[i], positions.y_mm[i])
      problems.push({ kind: 'site-off-wafer', ...where, radius_mm, edge_mm: radius_mm + margin_mm })
    } else if (sites.flags[i] & SITE_FLAGS.pinOffWafer.bit) problems.push({ kind: 'pin-off-wafer', ...where })
    else problems.push({ kind: 'no-sheet-resistance', ...where, why: whyNoResult(sites, i) })
  }
  return problems
}

function whyNoResult({ vOverI_ohm, vOverIB_ohm, temperatureFactor }: SiteColumns, i: number): string {
  if (Number.isNaN(vOverI_ohm[i])) return 'it has neither V and I nor V/I, nor a reported value that could be judged'
  if (Number.isNaN(temperatureFactor[i])) return 'its temperature is so far off that no correction can be made'
  if (vOverIB_ohm)
    return 'its configurations A and B give no sheet resistance: A must be larger than B, and both present'
  return 'the corrections give none'
}

/**
 * Whether voltage and current may be swapped: with a target given, most sites would be near it if they were, and none
 * is as read.
 */
function swapSuspicion({ readings, procedure, sites, quantity }: FindingsInput): AnalysisProblem[] {
  const { target, lower, upper } = limitsOn(quantity, procedure).site ?? {}
  const expected = target ?? (lower !== undefined && upper !== undefined ? (lower + upper) / 2 : undefined)
  if (expected === undefined || !readings.voltage_V) return []
  const isNear = (value: number): boolean => value > expected / 3 && value < expected * 3
  let near = 0
  let nearIfSwapped = 0
  let known = 0
  let asRead = NaN
  let swapped = NaN
  for (let i = 0; i < sites.count; i++) {
    const value = sites.value[i]
    const ratio = sites.vOverI_ohm[i]
    if (!(value > 0 && ratio > 0)) continue
    const other = value / (ratio * ratio)
    known++
    if (isNear(value)) near++
    if (!isNear(other)) continue
    nearIfSwapped++
    asRead = value
    swapped = other
  }
  if (near > 0 || nearIfSwapped < known / 2 || known === 0) return []
  return [{ kind: 'swapped-columns', file: readings.files[0].name, asRead, swapped, unit: quantity.unit }]
}

/** Flags that stand as a problem of their own for each site, or as a note. */
const TOLD_ELSEWHERE: ReadonlySet<string> = new Set(['no-reading', 'pin-off-wafer', 'reported'])

/** One problem a flag that any site carries, with how many sites and which wafers. */
export function flagProblems(readings: Readings, flags: Uint32Array): AnalysisProblem[] {
  const present = flags.reduce((bits, site) => bits | site, 0)
  const told = Object.values(SITE_FLAGS).filter(({ id, bit }) => present & bit && !TOLD_ELSEWHERE.has(id))
  return told.map((flag) => {
    let count = 0
    const wafers = new Set<number>()
    for (let i = 0; i < flags.length; i++) {
      if ((flags[i] & flag.bit) === 0) continue
      count++
      wafers.add(readings.wafer[i])
    }
    const ids = [...wafers].map((wafer) => readings.wafers[wafer].id)
    return { kind: 'flagged-sites' as const, flag: flag.id, count, wafers: ids, sentence: flag.sentence }
  })
}
