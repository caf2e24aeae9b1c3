/** Every look at the readings, one line each: the report, the window and the result read them from here. */
import { configurationRatio } from './configuration-ratio'
import { currentLevel } from './current-level'
import { drift } from './drift'
import { everyNth } from './every-nth'
import { exchangedColumns } from './exchanged-columns'
import { SEVERITIES, type HealthCheck, type HealthFinding, type HealthInput } from './finding'
import { leftOut } from './left-out'
import { polarity } from './polarity'
import { standingOut } from './standing-out'
import { stuckReadings } from './stuck-readings'
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
  leftOut,
]

/** Worst first. They change no number and no verdict; a person is told. */
export function lookAtReadings(input: HealthInput): readonly HealthFinding[] {
  const found = HEALTH_CHECKS.flatMap((check) => check.look(input))
  return found.sort((a, b) => SEVERITIES.indexOf(a.severity) - SEVERITIES.indexOf(b.severity))
}
