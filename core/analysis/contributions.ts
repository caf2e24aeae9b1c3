/** The components of uncertainty that a procedure and a gauge study name, each with how it acts on a site. */
import type { DepthTable } from '../layer/layer-kind'
import type { GaugeStudy } from '../gauge/gauge-study'
import type { Readings } from '../ingest/readings'
import { UNCERTAINTY_COMPONENTS, type Procedure, type UncertaintyComponent } from '../procedure/schema'
import type { Corrections } from './corrections'
import { SITE_FLAGS } from './flags'
import type { Repeatability } from './repeatability'

/** What a gauge study adds, beside the procedure's own components. */
export const GAUGE_COMPONENTS = ['gaugeRepeatability', 'gaugeDay', 'gaugeRun', 'gaugeBias'] as const
export type ComponentId = UncertaintyComponent | (typeof GAUGE_COMPONENTS)[number]

/** One component's relative effect on the results of a site: derivative times standard uncertainty, with its sign. */
export interface Contribution {
  readonly component: ComponentId
  readonly title: string
  readonly shared: boolean
  /** Standard uncertainty of the component itself, in its own unit. */
  readonly u: number
  /** For people: "mm"; empty for a fraction. */
  readonly unit: string
  /** Infinite where it is known well. */
  readonly degreesOfFreedom: number
  /** JCGM 100:2008, 4.2 and 4.3: from repeated observations, or from what is known otherwise. */
  readonly evaluation: 'A' | 'B'
  sheetResistance(site: number): number
  /**
   * What the component does by itself, in units of a relative change of sheet resistance: resistivity and concentration
   * follow from sheet resistance times a thickness, depth or diffusion length.
   */
  readonly resistivityExtra: number
  /** What it does to the concentration by itself, in units of a relative change of resistivity (mobility). */
  readonly concentrationExtra: number
}

const COMPONENTS: Readonly<Record<ComponentId, { readonly title: string; readonly unit: string }>> = {
  currentRel: { title: 'current', unit: '' },
  voltageRel: { title: 'voltage', unit: '' },
  thermalEmfUV: { title: 'stray voltages', unit: 'µV' },
  spacingMm: { title: 'each pin spacing', unit: 'mm' },
  spacingWanderMm: { title: 'wander of the pins', unit: 'mm' },
  orientationDeg: { title: 'direction of the pin line', unit: '°' },
  thicknessUm: { title: 'wafer thickness', unit: 'µm' },
  temperatureC: { title: 'temperature', unit: '°C' },
  temperatureCoefficientPercentPerC: { title: 'temperature coefficient', unit: '%/°C' },
  diameterMm: { title: 'size of the wafer', unit: 'mm' },
  positionMm: { title: 'place of the probe', unit: 'mm' },
  repeatabilityRel: { title: 'repeatability', unit: '' },
  depthUm: { title: 'junction depth', unit: 'µm' },
  mobilityRel: { title: 'mobility model', unit: '' },
  reportedRel: { title: 'reported value', unit: '' },
  gaugeRepeatability: { title: 'gauge study: repeatability', unit: '' },
  gaugeDay: { title: 'gauge study: day to day', unit: '' },
  gaugeRun: { title: 'gauge study: run to run', unit: '' },
  gaugeBias: { title: 'gauge study: bias, not corrected', unit: '' },
}

export interface UncertaintyInput {
  readonly procedure: Procedure
  readonly profile: DepthTable | null
  readonly corrections: Corrections
  readonly readings: Readings
  readonly flags: Uint32Array
  /** Of the whole lot, where the procedure takes it from the readings. */
  readonly repeatability: Repeatability | null
  readonly gauge: GaugeStudy | null
}

/** The components with an uncertainty, each with how it acts on this lot. */
export function contributions(input: UncertaintyInput): Contribution[] {
  const { procedure, profile, flags } = input
  const given = procedure.uncertainty
  const shared = new Set(given.shared)
  const effects = effectsOnSheet(input)
  const corrected = (site: number): boolean => (flags[site] & SITE_FLAGS.reported.bit) === 0
  const relativeThickness = procedure.wafer.thicknessUm ? given.thicknessUm / procedure.wafer.thicknessUm : 0
  const through = procedure.layer.kind === 'bulk' ? relativeThickness : 0
  const depth = depthOf(procedure.layer, profile)
  const hasSilicon = 'dopant' in procedure.layer
  const own = UNCERTAINTY_COMPONENTS.flatMap((component): Contribution[] => {
    const u = component === 'repeatabilityRel' ? repeatabilityIn(input) : given[component]
    if (!(u > 0)) return []
    const effect = effects[component]
    const isObserved = component === 'repeatabilityRel' && given.repeatabilityRel === 'readings'
    return [
      {
        component,
        title: component === 'depthUm' ? depth.title : COMPONENTS[component].title,
        unit: COMPONENTS[component].unit,
        u,
        shared: shared.has(component),
        degreesOfFreedom: isObserved
          ? (input.repeatability?.degreesOfFreedom ?? Infinity)
          : (given.degreesOfFreedom[component] ?? Infinity),
        evaluation: isObserved || given.degreesOfFreedom[component] !== undefined ? 'A' : 'B',
        sheetResistance:
          component === 'reportedRel'
            ? (site) => (corrected(site) ? 0 : u)
            : (site) => (effect && corrected(site) ? effect(site) : 0),
        resistivityExtra: component === 'thicknessUm' ? through : component === 'depthUm' ? u / depth.value_um : 0,
        concentrationExtra: component === 'mobilityRel' && hasSilicon ? u : 0,
      },
    ]
  })
  return [...own, ...gaugeContributions(input)]
}

function repeatabilityIn({ procedure, repeatability }: UncertaintyInput): number {
  const given = procedure.uncertainty.repeatabilityRel
  return given === 'readings' ? (repeatability?.relative ?? 0) : given
}

type Effects = Partial<Record<UncertaintyComponent, (site: number) => number>>

/** Relative effect on sheet resistance; what is not here has none. */
function effectsOnSheet({ procedure, corrections, readings, repeatability, gauge, flags, profile }: UncertaintyInput): Effects {
  const given = procedure.uncertainty
  const { slopes, thicknessSlope } = corrections
  const relativeThickness = procedure.wafer.thicknessUm ? given.thicknessUm / procedure.wafer.thicknessUm : 0
  const repeats = repeatabilityIn({ procedure, repeatability, corrections, readings, gauge, flags, profile })
  const { orientation_per_deg } = slopes
  return {
    currentRel: () => given.currentRel,
    voltageRel: (site) => given.voltageRel * slopes.voltage[site],
    thermalEmfUV: strayVoltage(readings, slopes.voltage, given.thermalEmfUV),
    spacingMm: (site) => given.spacingMm * slopes.spacing_per_mm[site],
    spacingWanderMm: (site) => given.spacingWanderMm * slopes.spacing_per_mm[site],
    ...(orientation_per_deg && { orientationDeg: (site) => given.orientationDeg * orientation_per_deg[site] }),
    thicknessUm: () => relativeThickness * thicknessSlope,
    temperatureC: (site) => given.temperatureC * slopes.temperature_per_C[site],
    temperatureCoefficientPercentPerC: coefficientEffect(readings, procedure, corrections),
    diameterMm: (site) => given.diameterMm * slopes.diameter_per_mm[site],
    positionMm: (site) => given.positionMm * slopes.position_per_mm[site],
    repeatabilityRel: () => repeats,
  }
} // prettier-ignore

/**
 * A stray voltage adds to V whichever way the current runs, so that the mean of two polarities is left with what changes
 * between them: of two equal uncorrelated ones, 1/root 2. Readings without voltages show nothing of it.
 */
function strayVoltage(readings: Readings, slope: Float64Array, u_uV: number): (site: number) => number {
  const { voltage_V, voltageReverse_V } = readings
  if (!voltage_V) return () => 0
  return (site) => {
    const isReversed = voltageReverse_V !== null && !Number.isNaN(voltageReverse_V[site])
    const effect = (slope[site] * u_uV * 1e-6) / Math.abs(voltage_V[site]) / (isReversed ? Math.SQRT2 : 1)
    return Number.isFinite(effect) ? effect : 0
  }
}

/** d ln Rs / d(coefficient): how far the measurement was from the reference temperature. */
function coefficientEffect(readings: Readings, { temperature, uncertainty }: Procedure, { temperature: made }: Corrections) {
  const { referenceC, measuredC } = temperature
  const u = uncertainty.temperatureCoefficientPercentPerC / 100
  return (site: number): number => {
    if (made.basis === null) return 0
    const read = readings.temperature_C ? readings.temperature_C[site] : NaN
    const measured = Number.isNaN(read) ? (measuredC ?? NaN) : read
    return Number.isNaN(measured) ? 0 : u * (referenceC - measured)
  }
} // prettier-ignore

/**
 * A gauge study's own components, as fractions of what it measured. A reading is one reading, so that repeatability
 * enters whole; day and run are the same for all of a lot. The known bias of the probe used is not corrected here: it
 * counts as the half width of a rectangle (JCGM 100:2008, 4.3.7), with the uncertainty of its own.
 */
function gaugeContributions({ gauge, flags }: UncertaintyInput): Contribution[] {
  if (!gauge) return []
  const { components, biases, probe, occasions } = gauge
  const level = occasions.mean.reduce((sum, value) => sum + value, 0) / occasions.count
  const bias = biases.find((entry) => entry.probe === probe)
  const spread = (part: (typeof components)['day']): number => (part?.ownStandardDeviation ?? 0) / level
  const parts: readonly (readonly [ComponentId, number, number, boolean])[] = [
    ['gaugeRepeatability', spread(components.repeatability), components.repeatability?.degreesOfFreedom ?? Infinity, false],
    ['gaugeDay', spread(components.day), components.day?.degreesOfFreedom ?? Infinity, true],
    ['gaugeRun', spread(components.run), components.run?.degreesOfFreedom ?? Infinity, true],
    ['gaugeBias', bias ? Math.hypot(bias.bias / Math.sqrt(3), bias.standardUncertainty) / level : 0, Infinity, true],
  ]
  return parts.filter(([, u]) => u > 0).map(([component, u, degreesOfFreedom, shared]): Contribution => ({
    component,
    ...COMPONENTS[component],
    u,
    shared,
    degreesOfFreedom,
    evaluation: component === 'gaugeBias' ? 'B' : 'A',
    sheetResistance: (site) => (flags[site] & SITE_FLAGS.reported.bit ? 0 : u),
    resistivityExtra: 0,
    concentrationExtra: 0,
  }))
} // prettier-ignore

/**
 * The length that a layer's depth scale is known by. At a given shape everything along the depth goes with it, so sheet
 * resistance times this length is a function of the concentration alone. A profile file's depths are taken to be wrong
 * by one factor, as those of a sputtered crater are.
 */
function depthOf(layer: Procedure['layer'], profile: DepthTable | null): { title: string; value_um: number } {
  if (layer.kind !== 'doped-layer') return { title: COMPONENTS.depthUm.title, value_um: Infinity }
  if (layer.depthUm !== undefined) return { title: COMPONENTS.depthUm.title, value_um: layer.depthUm }
  if (layer.diffusionLengthUm !== undefined) return { title: 'diffusion length', value_um: layer.diffusionLengthUm }
  return {
    title: 'depths of the profile file',
    value_um: profile ? profile.depth_um[profile.depth_um.length - 1] : NaN,
  }
}
