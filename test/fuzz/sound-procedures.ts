/** Procedures that are sound, of every kind of layer, wafer, probe and limit. */
import fc from 'fast-check'
import { PROCEDURE_FORMAT, UNCERTAINTY_COMPONENTS } from '../../core/procedure/schema'
import { DOPANTS } from '../../core/silicon/dopants'
import { mobilityIds } from '../../core/silicon/mobility/registry'
import { nonuniformityIds } from '../../core/statistics/nonuniformity'

export type Json = null | boolean | number | string | Json[] | { [key: string]: Json }

const between = (min: number, max: number) => fc.double({ min, max, noNaN: true })
/** Even over the decades. */
export const decades = (min: number, max: number) =>
  between(Math.log10(min), Math.log10(max)).map((power) => Number((10 ** power).toPrecision(6)))
const sometimes = <T>(arbitrary: fc.Arbitrary<T>) => fc.option(arbitrary, { nil: undefined })

const disc = fc.record({
  diameterMm: fc.constantFrom(25, 50.8, 100, 150, 200, 300),
  fiducial: fc.constantFrom('notch', 'flat', 'none'),
  edgeExclusionMm: fc.constantFrom(0, 3, 6),
  thicknessUm: decades(50, 3000),
  back: fc.constantFrom('insulating', 'conducting'),
})
const rectangle = fc.record({
  shape: fc.constant('rectangle'),
  widthMm: between(15, 200),
  heightMm: between(15, 200),
  edgeExclusionMm: fc.constantFrom(0, 2),
  thicknessUm: decades(50, 3000),
})
const waferWithoutEdge = fc.record({ thicknessUm: decades(50, 3000) })

const probe = fc.oneof(
  fc.record({
    spacingMm: fc.constantFrom(0.5, 0.635, 1, 1.016, 1.59),
    orientation: fc.oneof(
      between(-360, 360).map((angleDeg) => ({ angleDeg })),
      fc.constantFrom('radial', 'tangential'),
    ),
    technique: fc.constantFrom('single', 'dual'),
  }),
  fc.tuple(between(0.9, 1.1), between(0.9, 1.1), between(0.9, 1.1)).map((pinSpacingsMm) => ({ pinSpacingsMm })),
)

const silicon = fc
  .record({ dopant: fc.constantFrom(...DOPANTS), mobility: fc.constantFrom(...mobilityIds) })
  .map((given) =>
    given.mobility === 'constant' ? { ...given, constantMobility: { electronsCm2Vs: 1200, holesCm2Vs: 400 } } : given,
  )
const opposite = (dopant: (typeof DOPANTS)[number], concentrationCm3: number) => ({
  dopant: dopant === 'boron' ? ('phosphorus' as const) : ('boron' as const),
  concentrationCm3,
})
const layer = fc.oneof(
  fc.constant({ kind: 'sheet' }),
  silicon.map((given) => ({ kind: 'bulk', ...given })),
  fc
    .tuple(
      silicon,
      fc.constantFrom('uniform', 'gaussian', 'erfc', 'exponential'),
      decades(0.02, 20),
      decades(1e13, 1e17),
    )
    .map(([given, profile, depthUm, concentration]) => ({
      kind: 'doped-layer',
      ...given,
      profile,
      depthUm,
      background: opposite(given.dopant, concentration),
    })),
  fc
    .tuple(silicon, decades(0.02, 3), decades(0.005, 0.5), sometimes(decades(1e13, 1e17)))
    .map(([given, rangeUm, straggleUm, concentration]) => ({
      kind: 'implant',
      ...given,
      rangeUm,
      straggleUm,
      ...(concentration ? { background: opposite(given.dopant, concentration) } : {}),
    })),
  decades(1e-6, 1e-2).map((resistivityOhmCm) => ({ kind: 'film', resistivityOhmCm })),
  decades(0.01, 10).map((thicknessUm) => ({ kind: 'film', thicknessUm })),
)

const bounds = fc
  .tuple(decades(1e-6, 1e6), decades(1.001, 1e4))
  .chain(([lower, spread]) =>
    fc.constantFrom(
      { lower },
      { upper: lower },
      { lower, upper: lower * spread },
      { lower, target: lower, upper: lower * spread },
    ),
  )
const uniformity = fc.record({ upper: between(0.01, 100), definition: fc.constantFrom(...nonuniformityIds) })
const limits = fc.oneof(
  fc.constant({}),
  fc.record(
    { sheetResistanceOhmSq: bounds, waferMeanOhmSq: bounds, uniformityPercent: uniformity },
    { requiredKeys: [] },
  ),
  fc.record(
    {
      resistivityOhmCm: bounds,
      waferMeanOhmCm: bounds,
      uniformityPercent: uniformity,
      allowedSitesOut: fc.nat({ max: 3 }),
    },
    { requiredKeys: [] },
  ),
)
const uncertainty = fc.record(
  {
    currentRel: decades(1e-6, 0.1),
    voltageRel: decades(1e-6, 0.1),
    spacingMm: decades(1e-4, 0.1),
    thicknessUm: decades(1e-2, 10),
    temperatureC: between(0, 2),
    diameterMm: between(0, 1),
    positionMm: between(0, 1),
    depthUm: between(0, 0.1),
    mobilityRel: between(0, 0.1),
    reportedRel: between(0, 0.1),
    shared: fc.subarray([...UNCERTAINTY_COMPONENTS]),
  },
  { requiredKeys: [] },
)

/** Nothing in them contradicts anything else, though readings may ask for more than they give. */
export const soundProcedures: fc.Arbitrary<Json> = fc
  .record(
    {
      wafer: fc.oneof(disc, rectangle, waferWithoutEdge),
      probe,
      layer,
      temperature: fc.record(
        { referenceC: between(18, 28), measuredC: between(15, 35), coefficientPercentPerC: between(-1, 1) },
        { requiredKeys: [] },
      ),
      limits,
      dieGrid: fc.record({
        pitchXMm: between(6, 40),
        pitchYMm: between(6, 40),
        offsetXMm: between(-20, 20),
        offsetYMm: between(-20, 20),
      }),
      uncertainty,
      reported: fc.record({ factor: between(1, 10) }),
      title: fc.string({ maxLength: 30 }),
    },
    { requiredKeys: ['layer'] },
  )
  .map((procedure) => plainJson({ format: PROCEDURE_FORMAT, ...withEdgeForDies(procedure) }))

function withEdgeForDies<T extends { wafer?: object; dieGrid?: object }>(procedure: T): T {
  const hasEdge = procedure.wafer !== undefined && ('diameterMm' in procedure.wafer || 'shape' in procedure.wafer)
  return procedure.dieGrid && !hasEdge ? { ...procedure, wafer: { diameterMm: 100 } } : procedure
}

function plainJson(value: unknown): Json {
  return JSON.parse(JSON.stringify(value)) as Json
}
