/**
 * The procedure: everything decided before the measurement, as a JSON file. This schema is the one place its keys,
 * ranges and safe defaults are written; what a person reads of a wrong key is made in `parse-procedure.ts`.
 */
import { z } from 'zod'
import { ACCEPTANCE_RULES } from '../conformity/acceptance'
import { COLUMN_IDS } from '../ingest/readings'
import { DOPANTS } from '../silicon/dopants'
import { mobilityIds } from '../silicon/mobility/registry'
import { nonuniformityIds } from '../statistics/nonuniformity'

// No parsers made from text at run time: a page whose security policy forbids `eval` must read procedures too.
z.config({ jitless: true })

export const PROCEDURE_FORMAT = 'persquare-procedure/1'

const positive = (max: number) => z.number().gt(0).max(max)
const limits = z.strictObject({ target: z.number().gt(0), lower: z.number().gt(0), upper: z.number().gt(0) }).partial()

const wafer = z.strictObject({
  shape: z.enum(['disc', 'rectangle']).default('disc'),
  /** Absent: the edges are unknown and geometry is that of the infinite sheet. */
  diameterMm: positive(1000).optional(),
  widthMm: positive(1000).optional(),
  heightMm: positive(1000).optional(),
  thicknessUm: positive(20000).optional(),
  fiducial: z.enum(['notch', 'flat', 'none']).default('notch'),
  flatLengthMm: positive(300).optional(),
  edgeExclusionMm: z.number().min(0).max(100).default(0),
  /** What the wafer lies on, for layers that conduct through the wafer. */
  back: z.enum(['insulating', 'conducting']).default('insulating'),
})

const probe = z.strictObject({
  spacingMm: positive(50).optional(),
  pinSpacingsMm: z.tuple([positive(50), positive(50), positive(50)]).optional(),
  orientation: z
    .union([z.strictObject({ angleDeg: z.number().min(-360).max(360) }), z.enum(['radial', 'tangential'])])
    .default({ angleDeg: 0 }),
  technique: z.enum(['single', 'dual']).default('single'),
})

const silicon = {
  dopant: z.enum(DOPANTS),
  mobility: z.enum(mobilityIds).default('masetti'),
  /** Only with mobility "constant" [cm^2/(V s)]. */
  constantMobility: z.strictObject({ electronsCm2Vs: positive(1e5), holesCm2Vs: positive(1e5) }).optional(),
}
const background = z.strictObject({ dopant: z.enum(DOPANTS), concentrationCm3: z.number().min(1e10).max(1e20) })

/** A file beside the procedure: no folder, the one it lies in included, and no way out of it. */
export const BARE_FILE_NAME = /^(?!\.$)(?!.*\.\.)[^\p{Cc}/\\:]+$/u

const layer = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('sheet') }),
  z.strictObject({ kind: z.literal('bulk'), ...silicon }),
  z.strictObject({
    kind: z.literal('doped-layer'),
    ...silicon,
    profile: z.enum(['uniform', 'gaussian', 'erfc', 'exponential', 'tabulated']),
    /** Junction depth: where the profile has come down to the background. A named profile takes it or the next. */
    depthUm: positive(1000).optional(),
    /** sqrt(D t) of a gaussian or erfc profile, the decay length of an exponential one; the depth follows. */
    diffusionLengthUm: positive(1000).optional(),
    /** Only with profile "tabulated": depths and concentrations as CSV. */
    profileFile: z.string().max(200).regex(BARE_FILE_NAME).optional(),
    background,
  }),
  z.strictObject({
    kind: z.literal('implant'),
    ...silicon,
    rangeUm: positive(100),
    straggleUm: positive(100),
    background: background.optional(),
  }),
  z.strictObject({
    kind: z.literal('film'),
    resistivityOhmCm: z.number().min(1e-12).max(1e12).optional(),
    /** No film is thinner than a tenth of an atom. */
    thicknessUm: z.number().min(1e-5).max(1e4).optional(),
  }),
])

const temperature = z.strictObject({
  referenceC: z.number().min(18).max(28).default(23),
  /** Used where the readings carry no temperature of their own. */
  measuredC: z.number().min(-50).max(100).optional(),
  /** Percent per kelvin at the reference temperature. Bulk silicon has a published one; other layers need this. */
  coefficientPercentPerC: z.number().min(-10).max(10).optional(),
})

const procedureLimits = z.strictObject({
  sheetResistanceOhmSq: limits.optional(),
  waferMeanOhmSq: limits.optional(),
  resistivityOhmCm: limits.optional(),
  waferMeanOhmCm: limits.optional(),
  uniformityPercent: z
    .strictObject({ upper: z.number().gt(0).max(1000), definition: z.enum(nonuniformityIds).default('sup') })
    .optional(),
  /** How many sites of a wafer may lie outside the site limits before the wafer does. */
  allowedSitesOut: z.number().int().min(0).max(1e6).default(0),
})

const statistics = z.strictObject({
  /** Of every interval. */
  confidence: z.number().min(0.5).max(0.9999).default(0.95),
  outliers: z
    .strictObject({
      /** Chance of finding any on a wafer that has none. */
      alpha: z.number().min(1e-6).max(0.5).default(0.05),
      /** Outliers are flagged always; left out of statistics and verdicts only if this says so. */
      leaveOut: z.boolean().default(false),
    })
    .prefault({}),
})

const dieGrid = z.strictObject({
  pitchXMm: positive(500),
  pitchYMm: positive(500),
  offsetXMm: z.number().min(-500).max(500).default(0),
  offsetYMm: z.number().min(-500).max(500).default(0),
})

export const UNCERTAINTY_COMPONENTS = [
  'currentRel', 'voltageRel', 'thermalEmfUV', 'spacingMm', 'spacingWanderMm', 'orientationDeg', 'thicknessUm', 'temperatureC',
  'temperatureCoefficientPercentPerC', 'diameterMm', 'positionMm', 'repeatabilityRel', 'depthUm', 'mobilityRel', 'reportedRel',
] as const // prettier-ignore
export type UncertaintyComponent = (typeof UNCERTAINTY_COMPONENTS)[number]

const fraction = z.number().min(0).max(1).default(0)
/** Standard uncertainties (one sigma). */
const uncertainty = z.strictObject({
  currentRel: fraction,
  voltageRel: fraction,
  /** Of stray voltages in one voltage reading; two polarities leave what changes between them. */
  thermalEmfUV: z.number().min(0).max(1e6).default(0),
  /** Of each pin spacing, as measured. */
  spacingMm: z.number().min(0).max(10).default(0),
  /** Of each pin spacing, new at every touch-down. */
  spacingWanderMm: z.number().min(0).max(10).default(0),
  /** Of the direction of the pin line. */
  orientationDeg: z.number().min(0).max(90).default(0),
  thicknessUm: z.number().min(0).max(1000).default(0),
  temperatureC: z.number().min(0).max(50).default(0),
  /** Of the temperature coefficient, where a correction is made. */
  temperatureCoefficientPercentPerC: z.number().min(0).max(10).default(0),
  diameterMm: z.number().min(0).max(50).default(0),
  /** Of the probe's place on the wafer, in x and in y. */
  positionMm: z.number().min(0).max(50).default(0),
  /** Of a site measured again: a fraction, or "readings" to take it from the two polarities of the lot's own. */
  repeatabilityRel: z.union([z.number().min(0).max(1), z.literal('readings')]).default(0),
  depthUm: z.number().min(0).max(1000).default(0),
  /** Spread of the mobility model about real silicon; enters the concentration alone. */
  mobilityRel: fraction,
  /** Of a sheet resistance or resistivity that the file reports ready made. */
  reportedRel: fraction,
  /** The components that are the same at every site, so that averaging doesn't lessen them. */
  shared: z
    .array(z.enum(UNCERTAINTY_COMPONENTS))
    .default([
      'currentRel', 'spacingMm', 'orientationDeg', 'thicknessUm', 'temperatureC', 'temperatureCoefficientPercentPerC', 'diameterMm',
      'depthUm', 'mobilityRel',
    ]), // prettier-ignore
  /** Of a component, where it is known by so few observations that it matters; absent: known well. */
  degreesOfFreedom: z.partialRecord(z.enum(UNCERTAINTY_COMPONENTS), z.number().min(1).max(1e6)).default({}),
})

/** How a wafer's surface between its sites is made, for maps and for dies without a site. */
const map = z.strictObject({
  interpolation: z.enum(['thin-plate-spline', 'gaussian-process']).default('thin-plate-spline'),
})

/** A study of the prober's own spread; its components enter the uncertainty of every site. */
const gaugeStudy = z.strictObject({
  file: z.string().max(200).regex(BARE_FILE_NAME),
  /** The probe that the lot was measured with; absent: all probes of the study pooled. */
  probe: z.string().min(1).max(100).optional(),
})

/** The history of a check wafer on the prober that the lot was measured with. */
const checkWafer = z.strictObject({
  file: z.string().max(200).regex(BARE_FILE_NAME),
  /** How many occasions, first in time, make the limits; absent: all. */
  baseline: z.number().int().min(4).max(1e6).optional(),
  /** The value that the wafer is held to have; absent: the mean of the baseline. */
  acceptedValue: z.number().gt(0).optional(),
})

/** How far inside its limits a value must lie to be accepted (JCGM 106:2012, 8). */
const acceptance = z.strictObject({
  rule: z.enum(ACCEPTANCE_RULES).default('simple'),
  /** Guard band over U = 2u, of the rules "stringent" and "relaxed". */
  guardFactor: z.number().min(0).max(5).default(1),
  /** Of the rule "risk". */
  maximumFalseAcceptRisk: z.number().min(1e-6).max(0.5).default(0.05),
  /** True values of what is made, for the lot's risks; absent: taken from the lot. */
  process: z.strictObject({ mean: z.number().gt(0), standardDeviation: z.number().gt(0) }).optional(),
})

const columnMapping = z.partialRecord(
  z.enum(COLUMN_IDS),
  z.union([z.string().min(1), z.strictObject({ header: z.string().min(1), unit: z.string().optional() })]),
)

const readings = z.strictObject({
  /** Our column to the file's header, where the matcher can't or shouldn't decide. */
  columns: columnMapping.default({}),
  delimiter: z.enum([',', ';', '\t']).optional(),
  decimalMark: z.enum(['.', ',']).optional(),
})

export const procedureSchema = z.strictObject({
  format: z.literal(PROCEDURE_FORMAT),
  title: z.string().max(200).default(''),
  /** What is judged. Absent: resistivity where limits are on resistivity or the readings give nothing else. */
  quantity: z.enum(['sheet-resistance', 'resistivity']).optional(),
  wafer: wafer.prefault({}),
  probe: probe.prefault({}),
  layer: layer.default({ kind: 'sheet' }),
  temperature: temperature.prefault({}),
  limits: procedureLimits.prefault({}),
  acceptance: acceptance.prefault({}),
  statistics: statistics.prefault({}),
  dieGrid: dieGrid.optional(),
  map: map.prefault({}),
  uncertainty: uncertainty.prefault({}),
  gaugeStudy: gaugeStudy.optional(),
  checkWafer: checkWafer.optional(),
  readings: readings.prefault({}),
  /** With which constant a reported sheet resistance was made, so that V/I can be recovered and corrected anew. */
  reported: z.strictObject({ factor: z.number().min(0.01).max(100) }).optional(),
  /** For editors that check a file as it is written; nothing here reads it. */
  $schema: z.string().max(1000).optional(),
})

/** As written: every defaulted key may be absent. */
export type ProcedureInput = z.input<typeof procedureSchema>
/** As used: every default filled in. */
export type Procedure = Omit<z.output<typeof procedureSchema>, '$schema'>
