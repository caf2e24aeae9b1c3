/** What was assumed, taken from where, or left undone, each as a sentence that the report prints. */
import { standingWords } from '../check-wafer/check-words'
import type { GaugeStudy } from '../gauge/gauge-study'
import type { DepthProfile } from '../ingest/read-profile'
import type { Readings } from '../ingest/readings'
import { UNCERTAINTY_COMPONENTS, type Procedure } from '../procedure/schema'
import { layerMobility } from './prepare-layer'
import { CELSIUS_ZERO_K } from '../units/constants'
import { formatSignificant } from '../units/format'
import { isMarked, type CheckOfLot } from './check-of-lot'
import type { Corrections } from './corrections'
import type { Repeatability } from './repeatability'
import type { DieColumns, Quantity, SiteColumns } from './lot-analysis'
import type { MeasuringSetUp } from './measuring-set-up'
import type { SitePositions } from './site-positions'

export interface NotesInput {
  readonly readings: Readings
  readonly procedure: Procedure
  readonly profile: DepthProfile | null
  readonly positions: SitePositions | null
  readonly setUp: MeasuringSetUp
  readonly corrections: Corrections
  readonly sites: SiteColumns
  readonly quantity: Quantity
  readonly dies: DieColumns | null
  readonly gauge: GaugeStudy | null
  readonly check: CheckOfLot | null
  readonly repeatability: Repeatability | null
}

export function analysisNotes(input: NotesInput): string[] {
  return [
    ...valueNotes(input),
    ...placeNotes(input),
    ...(input.corrections.reported && allReported(input) ? [] : [input.corrections.temperature.note]),
    ...modelNotes(input),
    ...profileNotes(input),
    ...uncertaintyNotes(input),
    ...gaugeNotes(input),
  ]
}

function allReported({ corrections }: NotesInput): boolean {
  return corrections.vOverI.a_ohm.every((ratio) => Number.isNaN(ratio))
}

function valueNotes({ readings, procedure, corrections, setUp }: NotesInput): string[] {
  const notes: string[] = []
  const { reported } = procedure
  if (corrections.reported) {
    notes.push(
      'Some values are taken as the file reports them: no correction of ours is in them, and only their own uncertainty.',
    )
  }
  if (reported && (readings.sheetResistance_ohm_sq ?? readings.resistivity_ohm_cm)) {
    notes.push(`V/I was recovered from the reported values with the constant ${reported.factor} and corrected anew.`)
  }
  if (readings.voltage_V && (readings.sheetResistance_ohm_sq || readings.resistivity_ohm_cm)) {
    notes.push('The file reports results of its own beside V and I: they were left aside, and ours made from V and I.')
  }
  const isDual = procedure.probe.technique === 'dual'
  if (isDual && !setUp.isDual) {
    notes.push('The procedure says dual configuration, but the readings have no configuration B: treated as single.')
  }
  if (!isDual && corrections.vOverI.b_ohm) {
    notes.push('The readings have a configuration B that a single-configuration procedure leaves unused.')
  }
  return notes
}

function placeNotes({ positions, setUp, procedure, dies }: NotesInput): string[] {
  const notes: string[] = []
  if (positions?.note) notes.push(positions.note)
  if (!positions)
    notes.push(
      'The readings have no positions: every site is treated as far from the edges, and nothing is left out at the edge.',
    )
  if (setUp.outline.shape === 'infinite')
    notes.push('The procedure gives no wafer size: every site is treated as far from the edges.')
  if (procedure.dieGrid && !dies) notes.push('No dies were assessed: that needs both positions and a wafer size.')
  return notes
}

function modelNotes({ procedure }: NotesInput): string[] {
  const mobility = layerMobility(procedure.layer)
  if (!mobility) return []
  const { min, max } = mobility.temperature_K
  const reference_K = procedure.temperature.referenceC + CELSIUS_ZERO_K
  const notes = [`Concentrations are those of the mobility model "${mobility.id}"; sound models differ by up to 11 %.`]
  if (min === max && Math.abs(min - reference_K) > 1) {
    notes.push(
      `The model "${mobility.id}" holds at ${min} K and was used as it stands for ${procedure.temperature.referenceC} °C: in lightly doped silicon that is about 3 %.`,
    )
  }
  return notes
}

function profileNotes({ profile, procedure, sites }: NotesInput): string[] {
  if (!profile || procedure.layer.kind !== 'doped-layer') return []
  const { file, depth_um, concentration_cm3 } = profile
  const last = depth_um.length - 1
  const background_cm3 = procedure.layer.background.concentrationCm3
  const endOverPeak = concentration_cm3[last] / concentration_cm3.reduce((most, n) => Math.max(most, n), 0)
  const cut = sites.concentration_cm3.reduce((count, peak) => count + (peak * endOverPeak > background_cm3 ? 1 : 0), 0)
  const notes = [
    `The shape of the profile is that of ${file}: ${last + 1} points down to ${depth_um[last]} µm, ln N straight between them; each site's scale is solved from its sheet resistance.`,
  ]
  if (depth_um[0] > 0)
    notes.push(`Above the first point of ${file}, at ${depth_um[0]} µm, its value holds to the surface.`)
  if (cut > 0) {
    notes.push(
      `At ${cut} sites the profile is still above the background where ${file} ends; what lies deeper is left out.`,
    )
  }
  return notes
}

function uncertaintyNotes({ procedure: { uncertainty }, repeatability, gauge }: NotesInput): string[] {
  const { repeatabilityRel } = uncertainty
  if (repeatabilityRel === 'readings') {
    return repeatability
      ? [
          `Repeatability ${formatSignificant(100 * repeatability.relative, 2)} %, from the two polarities of the readings (${repeatability.degreesOfFreedom} degrees of freedom).`,
        ]
      : ['The repeatability was to be taken from the readings, which do not have both polarities: it counts as none.']
  }
  if (gauge || UNCERTAINTY_COMPONENTS.some((component) => Number(uncertainty[component]) > 0)) return []
  return [
    'The procedure gives no uncertainties: every result counts as exact, and probabilities to conform are 0 or 1.',
  ]
}

function gaugeNotes({ gauge, check }: NotesInput): string[] {
  const standing = check && !isMarked(check) ? standingWords(check.result, check.standing) : null
  return [
    ...(gauge
      ? [
          `The prober's own spread is that of the gauge study ${gauge.occasions.file}, as a fraction of what it measured.`,
        ]
      : []),
    ...(standing ? [standing] : []),
  ]
}
