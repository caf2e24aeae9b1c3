/** The lot's readings in the terms of health/, and what it finds as problems and notes. */
import type { HealthFinding } from '../health/finding'
import { lookAtReadings } from '../health/registry'
import type { Readings } from '../ingest/readings'
import type { AnalysisProblem } from '../problems/problem'
import type { Procedure } from '../procedure/schema'
import { SITE_FLAGS } from './flags'
import type { Quantity, SiteColumns } from './lot-analysis'
import type { MeasuringSetUp } from './measuring-set-up'
import { limitsOn } from './quantity'
import type { SitePositions } from './site-positions'
import type { WaferMembers } from './wafers'

export interface HealthOf {
  readonly readings: Readings
  readonly procedure: Procedure
  readonly setUp: MeasuringSetUp
  readonly positions: SitePositions | null
  readonly sites: SiteColumns
  readonly quantity: Quantity
  readonly members: readonly WaferMembers[]
}

/** More readings than these are looked at no further: the look would cost more than the analysis. */
const MOST_READINGS = 200_000

export function readingHealth({ readings, procedure, setUp, positions, sites, quantity, members }: HealthOf): readonly HealthFinding[] {
  if (readings.count > MOST_READINGS) return []
  const { target, lower, upper } = limitsOn(quantity, procedure).site ?? {}
  const expected = target ?? (lower !== undefined && upper !== undefined ? (lower + upper) / 2 : NaN)
  return lookAtReadings({
    readings,
    wafers: members.map(({ index, counting }) => ({ id: readings.wafers[index].id, rows: counting })),
    outline: setUp.outline,
    edgeExclusion_mm: procedure.wafer.edgeExclusionMm,
    spacings_mm: setUp.spacings_mm,
    orientation: setUp.orientation,
    isDual: setUp.isDual,
    x_mm: positions?.x_mm ?? null,
    y_mm: positions?.y_mm ?? null,
    vOverIA_ohm: sites.vOverI_ohm,
    vOverIB_ohm: sites.vOverIB_ohm,
    sheetResistance_ohm_sq: sites.sheetResistance_ohm_sq,
    value: sites.value,
    uIndependent: sites.uIndependent,
    expected,
    unit: quantity.unit,
  })
} // prettier-ignore

/** What stops or must be looked at; a stray site that is flagged as an outlier already isn't told a second time. */
export function healthProblems(found: readonly HealthFinding[], readings: Readings, flags: Uint32Array): AnalysisProblem[] {
  return found.flatMap(({ check, severity, sentence, nextStep, site }): AnalysisProblem[] => {
    if (severity === 'note') return []
    if (check === 'neighbours' && site !== null && flags[site] & OUTLIER) return []
    const place = site === null ? {} : { wafer: readings.wafers[readings.wafer[site]].id, site: readings.siteNames[readings.site[site]] }
    return [{ kind: 'suspicious-readings', check, severity, sentence, nextStep, ...place }]
  })
} // prettier-ignore

const OUTLIER = SITE_FLAGS.outlier.bit | SITE_FLAGS.outlierLeftOut.bit

export function healthNotes(found: readonly HealthFinding[], count: number): string[] {
  const notes = found.filter(({ severity }) => severity === 'note').map(({ sentence, nextStep }) => `${sentence} ${nextStep}`)
  return count > MOST_READINGS ? [...notes, `The readings were not looked at for their health: they are more than ${MOST_READINGS}.`] : notes
} // prettier-ignore
