/** From V/I to corrected sheet resistance: every factor of every site, and how each component would move the result. */
import { dualEdgeErrors } from '../geometry/dual-edge'
import { DUAL_QUADRATIC_RATIO, dualSheetResistances } from '../geometry/dual'
import { dualThicknessFactor } from '../geometry/dual-thickness'
import { criticalEdgeDistance_mm } from '../geometry/edge-and-thickness'
import { unequalThicknessFactor, type ThicknessFactor } from '../geometry/thickness'
import type { Readings } from '../ingest/readings'
import type { Procedure } from '../procedure/schema'
import { SITE_FLAGS } from './flags'
import type { MeasuringSetUp } from './measuring-set-up'
import { takeReported, type ReportedValues } from './reported-values'
import { sheetGeometry, type GeometrySlopes, type SheetGeometry, type ThicknessSpacingSlopes } from './sheet-geometry'
import type { SitePositions } from './site-positions'
import { temperatureCorrection, type TemperatureCorrection } from './temperature-correction'
import type { VOverI } from './v-over-i'

export interface Corrections {
  readonly vOverI: VOverI
  /** Rs/(V/I) of the thin sheet, of configuration A under dual; NaN where nothing was corrected. */
  readonly geometryFactor: Float64Array
  /** The same for all sites. */
  readonly thickness: ThicknessFactor
  readonly temperature: TemperatureCorrection
  readonly reported: ReportedValues | null
  readonly sheetResistance_ohm_sq: Float64Array
  /** d ln F / d ln w: what a relative error of thickness does to sheet resistance. */
  readonly thicknessSlope: number
  readonly slopes: Slopes
}

/** How ln Rs moves a unit of each component, a column each. */
export interface Slopes extends GeometrySlopes {
  readonly voltage: Float64Array
  readonly temperature_per_C: Float64Array
}

/** Beyond this a product of factors, or the dual relation near an edge, is flagged. */
const DOMAIN_TOLERANCE = 1e-3
const UM_IN_CM = 1e-4
const NO_THICKNESS: ThicknessFactor = { value: 1, dLnRatio: 0, source: 'isolated layer: no factor' }

export function correct(
  readings: Readings,
  procedure: Procedure,
  setUp: MeasuringSetUp,
  positions: SitePositions | null,
  vOverI: VOverI,
  flags: Uint32Array,
): Corrections {
  const thicknessSlopes = thicknessSpacingSlopes(setUp, procedure)
  const values = correctedValues(readings, procedure, setUp, positions, vOverI, flags, thicknessSlopes)
  const { geometry, thickness, dual, temperature, reported, sheetResistance_ohm_sq } = values
  flagDomains(geometry, setUp, positions, procedure, flags)
  return {
    vOverI,
    geometryFactor: geometry.factor,
    thickness,
    temperature,
    reported,
    sheetResistance_ohm_sq,
    thicknessSlope: thickness.dLnRatio,
    slopes: {
      ...(dual ? dualSlopes(dual, thicknessSlopes) : { ...geometry.slopes, voltage: constant(readings.count, 1) }),
      temperature_per_C: temperature.slope_per_C,
    },
  }
}

export interface CorrectedValues {
  readonly geometry: SheetGeometry
  readonly thickness: ThicknessFactor
  readonly dual: DualColumns | null
  readonly temperature: TemperatureCorrection
  readonly reported: ReportedValues | null
  readonly sheetResistance_ohm_sq: Float64Array
}

/** The values alone, without where they hold and how each component moves them. */
export function correctedValues(
  readings: Readings,
  procedure: Procedure,
  setUp: MeasuringSetUp,
  positions: SitePositions | null,
  vOverI: VOverI,
  flags: Uint32Array,
  thicknessSlopes: ThicknessSpacingSlopes = [0, 0, 0],
): CorrectedValues {
  const reported = takeReported(readings, procedure, vOverI.a_ohm, flags)
  const withAngle = procedure.uncertainty.orientationDeg > 0
  const geometry = sheetGeometry(readings.count, setUp, positions, withAngle, thicknessSlopes)
  const thickness = thicknessOf(setUp, procedure)
  const dual = setUp.isDual && vOverI.b_ohm ? dualColumns(vOverI, flags) : null
  const sheet = thinSheetResistance(vOverI, geometry, dual)
  for (let i = 0; i < sheet.length; i++) sheet[i] *= thickness.value
  const { conductingThickness_um } = setUp
  const asMeasured = conductingThickness_um ? sheet.map((rs) => rs * conductingThickness_um * UM_IN_CM) : null
  const temperature = temperatureCorrection(readings, procedure, asMeasured, flags)
  for (let i = 0; i < sheet.length; i++) {
    sheet[i] =
      flags[i] & SITE_FLAGS.reported.bit ? reported!.sheetResistance_ohm_sq[i] : sheet[i] * temperature.factor[i]
  }
  return { geometry, thickness, dual, temperature, reported, sheetResistance_ohm_sq: sheet }
}

function thicknessOf(setUp: MeasuringSetUp, procedure: Procedure): ThicknessFactor {
  const { conductingThickness_um: thickness_um, meanSpacing_mm: spacing_mm, spacings_mm } = setUp
  if (thickness_um === null) return NO_THICKNESS
  return setUp.isDual
    ? dualThicknessFactor({ thickness_um, spacing_mm })
    : unequalThicknessFactor({ thickness_um, spacings_mm, back: procedure.wafer.back })
}

function dualColumns({ a_ohm, b_ohm }: VOverI, flags: Uint32Array) {
  const columns = dualSheetResistances({ resistanceA_ohm: a_ohm, resistanceB_ohm: b_ohm! })
  for (let i = 0; i < a_ohm.length; i++) {
    const ratio = a_ohm[i] / b_ohm![i]
    if (ratio < DUAL_QUADRATIC_RATIO.min || ratio > DUAL_QUADRATIC_RATIO.max) flags[i] |= SITE_FLAGS.dualRatio.bit
  }
  return columns
}

type DualColumns = ReturnType<typeof dualColumns>

function thinSheetResistance({ a_ohm }: VOverI, { factor }: SheetGeometry, dual: DualColumns | null): Float64Array {
  const sheet = new Float64Array(a_ohm.length)
  for (let i = 0; i < sheet.length; i++) {
    // Off the wafer there is no result, though the dual relation by itself would give one.
    sheet[i] = dual ? (factor[i] > 0 ? dual.sheetResistance_ohm_sq[i] : NaN) : factor[i] * a_ohm[i]
  }
  return sheet
}

function flagDomains(
  { edgeDistance_mm }: SheetGeometry,
  setUp: MeasuringSetUp,
  positions: SitePositions | null,
  procedure: Procedure,
  flags: Uint32Array,
): void {
  const { spacings_mm, orientation, outline, conductingThickness_um: thickness_um, meanSpacing_mm: spacing_mm } = setUp
  const critical_mm =
    thickness_um === null || outline.shape === 'infinite'
      ? 0
      : criticalEdgeDistance_mm({ thickness_um, spacing_mm, tolerance: DOMAIN_TOLERANCE, back: procedure.wafer.back })
  for (let i = 0; i < flags.length; i++) {
    if (flags[i] & SITE_FLAGS.reported.bit) continue
    if (edgeDistance_mm[i] < 0) flags[i] |= SITE_FLAGS.pinOffWafer.bit
    else if (edgeDistance_mm[i] < critical_mm) flags[i] |= SITE_FLAGS.thicknessNearEdge.bit
  }
  if (!setUp.isDual || !positions) return
  const errors = dualEdgeErrors({ outline, spacings_mm, orientation, ...positions })
  for (let i = 0; i < errors.length; i++) {
    if (Math.abs(errors[i]) > DOMAIN_TOLERANCE) flags[i] |= SITE_FLAGS.dualNearEdge.bit
  }
}

/** d ln F / ds of each of the three spacings [1/mm]; what of the spacing comes in through the thickness factor. */
function thicknessSpacingSlopes(setUp: MeasuringSetUp, procedure: Procedure): ThicknessSpacingSlopes {
  const { conductingThickness_um: thickness_um, meanSpacing_mm, spacings_mm } = setUp
  if (thickness_um === null) return [0, 0, 0]
  if (setUp.isDual) {
    const each = -thicknessOf(setUp, procedure).dLnRatio / (3 * meanSpacing_mm)
    return [each, each, each]
  }
  const step_mm = 1e-4 * meanSpacing_mm
  const lnF = (pin: number, change_mm: number): number => {
    const [s1, s2, s3] = spacings_mm.map((spacing, k) => (k === pin ? spacing + change_mm : spacing))
    return Math.log(
      unequalThicknessFactor({ thickness_um, spacings_mm: [s1, s2, s3], back: procedure.wafer.back }).value,
    )
  }
  const slope = (pin: number): number => (lnF(pin, step_mm) - lnF(pin, -step_mm)) / (2 * step_mm)
  return [slope(0), slope(1), slope(2)]
}

/** The two voltages err independently; spacing, place and size of the wafer cancel in the exact relation. */
function dualSlopes(
  { dLnA, dLnB }: DualColumns,
  thicknessSlopes: ThicknessSpacingSlopes,
): Omit<Slopes, 'temperature_per_C'> {
  const none = new Float64Array(dLnA.length)
  return {
    voltage: dLnA.map((slope, site) => Math.hypot(slope, dLnB[site])),
    spacing_per_mm: constant(dLnA.length, Math.hypot(...thicknessSlopes)),
    diameter_per_mm: none,
    position_per_mm: none,
    orientation_per_deg: null,
  }
}

function constant(count: number, value: number): Float64Array {
  return new Float64Array(count).fill(value)
}
