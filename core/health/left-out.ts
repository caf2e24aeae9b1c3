/** What was not looked at is said, not left to look sound. */
import { COMMON_PRACTICE, type HealthCheck, type HealthFinding, type HealthInput } from './finding'
import { MOST_SITES } from './surface-residuals'

export const leftOut: HealthCheck = { id: 'left-out', title: 'Number of sites', look }

function look({ wafers }: HealthInput): readonly HealthFinding[] {
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
