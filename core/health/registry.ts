/** Every look at the readings, one line each: the report, the window and the result read them from here. */
import { configurationRatio } from './configuration-ratio'
import { currentLevel } from './current-level'
import { drift } from './drift'
import { everyNth } from './every-nth'
import { exchangedColumns } from './exchanged-columns'
import { COMMON_PRACTICE, SEVERITIES, type HealthCheck, type HealthFinding, type HealthInput } from './finding'
import { polarity } from './polarity'
import { standingOut } from './standing-out'
import { stuckReadings } from './stuck-readings'
import { MOST_SITES } from './surface-residuals'
import { unitSuspicion } from './units'

export const HEALTH_CHECKS: readonly HealthCheck[] = [
  unitSuspicion,
  exchangedColumns,
  configurationRatio,
  polarity,
  currentLevel,
  stuckReadings,
  standingOut,
  everyNth,
  drift,
]

/** Worst first. They change no number and no verdict; a person is told. */
export function lookAtReadings(input: HealthInput): readonly HealthFinding[] {
  const found = [...HEALTH_CHECKS.flatMap((check) => check.look(input)), ...leftOut(input)]
  return found.sort((a, b) => SEVERITIES.indexOf(a.severity) - SEVERITIES.indexOf(b.severity))
}

/** What was not looked at is said, not left to look sound. */
function leftOut({ wafers }: HealthInput): readonly HealthFinding[] {
  const long = wafers.filter(({ rows }) => rows.length > MOST_SITES)
  if (long.length === 0) return []
  const which = long.length === 1 ? `Wafer ${long[0].id} has` : `${long.length} wafers have`
  return [
    {
      check: 'left-out',
      severity: 'note',
      sentence: `${which} more than ${MOST_SITES} sites: not looked at for stray sites, places that repeat and drift within a wafer.`,
      nextStep: 'See the map there.',
      wafers: long.map(({ id }) => id),
      site: null,
      evidence: { wafers: long.length, mostSites: MOST_SITES },
      source: COMMON_PRACTICE,
    },
  ]
}
