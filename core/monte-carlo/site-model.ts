/**
 * One site's result as a function of everything that is uncertain in it, through the same functions as the pipeline and
 * without any derivative: what a Monte Carlo calculation draws from.
 */
import { correctedValues } from '../analysis/corrections'
import type { LotAnalysis } from '../analysis/lot-analysis'
import { emptyLayerColumns } from '../analysis/layer-results'
import { measuringSetUp, type MeasuringSetUp } from '../analysis/measuring-set-up'
import { oneSite } from '../analysis/one-site'
import { prepareLayer } from '../analysis/prepare-layer'
import { sitePositions, type SitePositions } from '../analysis/site-positions'
import type { ComponentId, Contribution } from '../analysis/contributions'
import { ratios } from '../analysis/v-over-i'
import { CoreError } from '../problems/problem'
import type { Procedure } from '../procedure/schema'
import type { Outline } from '../wafer/outline'
import type { Readings } from '../ingest/readings'

export interface SiteModel {
  /** Components that are drawn, several draws for some: three spacings, two coordinates, the two polarities. */
  readonly draws: readonly ComponentId[]
  /**
   * The judged quantity with each draw, in units of its component's standard uncertainty; NaN where the pins would stand
   * off the wafer or no layer has such a sheet resistance.
   */
  evaluate(z: Float64Array): number
}

/** How many draws a component takes. */
const DRAWS: Partial<Record<ComponentId, number>> = {
  spacingMm: 3,
  spacingWanderMm: 3,
  positionMm: 2,
  thermalEmfUV: 2,
  voltageRel: 2,
}

/** @throws CoreError not-applicable where the site's value is reported ready made: there is no model of it */
export function siteModel(analysis: LotAnalysis, site: number, parts: readonly Contribution[]): SiteModel {
  const { readings, procedure, quantity } = analysis
  const one = oneSite(readings, site)
  const vOverI = ratios(one, new Uint32Array(1))
  if (Number.isNaN(vOverI.a_ohm[0])) {
    const why = 'its value is taken as the file reports it'
    throw new CoreError({ kind: 'not-applicable', what: 'the model of this site', why })
  }
  const draws = parts.flatMap(({ component }) => Array<ComponentId>(DRAWS[component] ?? 1).fill(component))
  const at = new Map(parts.map(({ component }) => [component, draws.indexOf(component)]))
  const uOf = new Map(parts.map(({ component, u }) => [component, u]))
  const setUp = measuringSetUp(procedure, { hasConfigurationB: vOverI.b_ohm !== null })
  const base: Base = { one, procedure, setUp, positions: sitePositions(one, procedure) }
  const resistivity = quantity.id === 'resistivity' ? resistivityThrough(analysis) : null

  function evaluate(z: Float64Array): number {
    const draw: Draw = (component, k = 0) => {
      const first = at.get(component)
      return first === undefined ? 0 : z[first + k] * uOf.get(component)!
    }
    const sheet = sheetResistance(base, draw)
    return resistivity ? resistivity(sheet, draw) : sheet
  }
  return { draws, evaluate }
} // prettier-ignore

type Draw = (component: ComponentId, k?: number) => number

interface Base {
  readonly one: Readings
  readonly procedure: Procedure
  readonly setUp: MeasuringSetUp
  readonly positions: SitePositions | null
}

/** Multiplies what the components multiply, and moves what they move. */
function sheetResistance(base: Base, draw: Draw): number {
  const { one, procedure, setUp, positions } = base
  const readings = movedReadings(one, draw)
  const moved = movedProcedure(procedure, setUp, positions, draw)
  const flags = new Uint32Array(1)
  const vOverI = ratios(readings, flags)
  const places = positions && {
    ...positions,
    x_mm: Float64Array.of(positions.x_mm[0] + draw('positionMm', 0)),
    y_mm: Float64Array.of(positions.y_mm[0] + draw('positionMm', 1)),
  }
  const { sheetResistance_ohm_sq } = correctedValues(readings, moved.procedure, moved.setUp, places, vOverI, flags)
  const scales = ['repeatabilityRel', 'gaugeRepeatability', 'gaugeDay', 'gaugeRun', 'gaugeBias'] as const
  const value = scales.reduce((product, component) => product * (1 + draw(component)), sheetResistance_ohm_sq[0])
  return value * publishedCoefficient(base, draw)
}

/** A published coefficient is a function of resistivity, not a number to be moved: what it errs by multiplies. */
function publishedCoefficient({ one, procedure: { temperature, layer } }: Base, draw: Draw): number {
  if (temperature.coefficientPercentPerC !== undefined || layer.kind !== 'bulk') return 1
  const read = one.temperature_C ? one.temperature_C[0] : NaN
  const measured = Number.isNaN(read) ? (temperature.measuredC ?? NaN) : read
  if (Number.isNaN(measured)) return 1
  return 1 + (draw('temperatureCoefficientPercentPerC') / 100) * (temperature.referenceC - measured)
}

/** Errors of the current divide, so that a current too large reads low; the sign is of no matter to a symmetric draw. */
function movedReadings(one: Readings, draw: Draw): Readings {
  const emf_V = 1e-6
  const voltage = (column: Float64Array | null, k: number, scale: number): Float64Array | null =>
    column && Float64Array.of(column[0] * (1 + draw('voltageRel', scale)) + emf_V * draw('thermalEmfUV', k))
  const temperature = draw('temperatureC')
  const currentScale = 1 + draw('currentRel')
  const scaled = (column: Float64Array | null) => column && Float64Array.of(column[0] * currentScale)
  const ratio = (column: Float64Array | null, k: number) =>
    column && Float64Array.of((column[0] * (1 + draw('voltageRel', k))) / currentScale)
  return {
    ...one,
    voltage_V: voltage(one.voltage_V, 0, 0),
    voltageReverse_V: voltage(one.voltageReverse_V, 1, 0),
    voltageB_V: voltage(one.voltageB_V, 0, 1),
    voltageReverseB_V: voltage(one.voltageReverseB_V, 1, 1),
    current_A: scaled(one.current_A),
    currentReverse_A: scaled(one.currentReverse_A),
    currentB_A: scaled(one.currentB_A),
    currentReverseB_A: scaled(one.currentReverseB_A),
    vOverI_ohm: ratio(one.vOverI_ohm, 0),
    vOverIB_ohm: ratio(one.vOverIB_ohm, 1),
    temperature_C: one.temperature_C && Float64Array.of(one.temperature_C[0] + temperature),
  }
}

function movedProcedure(procedure: Procedure, setUp: MeasuringSetUp, positions: SitePositions | null, draw: Draw) {
  const { temperature } = procedure
  const coefficient = temperature.coefficientPercentPerC
  const spacing = (k: 0 | 1 | 2): number => setUp.spacings_mm[k] + draw('spacingMm', k) + draw('spacingWanderMm', k)
  const spacings_mm = [spacing(0), spacing(1), spacing(2)] as const
  const moved: MeasuringSetUp = {
    ...setUp,
    spacings_mm,
    meanSpacing_mm: (spacings_mm[0] + spacings_mm[1] + spacings_mm[2]) / 3,
    outline: resized(setUp.outline, draw('diameterMm')),
    orientation: turned(setUp.orientation, positions, draw('orientationDeg')),
    conductingThickness_um: setUp.conductingThickness_um === null ? null : setUp.conductingThickness_um + draw('thicknessUm'),
  }
  return {
    setUp: moved,
    procedure: {
      ...procedure,
      temperature: {
        ...temperature,
        ...(temperature.measuredC === undefined ? {} : { measuredC: temperature.measuredC + draw('temperatureC') }),
        ...(coefficient === undefined ? {} : { coefficientPercentPerC: coefficient + draw('temperatureCoefficientPercentPerC') }),
      },
    },
  }
} // prettier-ignore

function resized(outline: Outline, by_mm: number): Outline {
  if (by_mm === 0 || outline.shape === 'infinite') return outline
  if (outline.shape === 'disc') return { ...outline, diameter_mm: outline.diameter_mm + by_mm }
  const grown = 1 + by_mm / outline.width_mm
  return { ...outline, width_mm: outline.width_mm * grown, height_mm: outline.height_mm * grown }
}

function turned(orientation: MeasuringSetUp['orientation'], positions: SitePositions | null, by_deg: number) {
  if (by_deg === 0) return orientation
  if (typeof orientation === 'object') return { angleDeg: orientation.angleDeg + by_deg }
  const radial = positions ? (Math.atan2(positions.y_mm[0], positions.x_mm[0]) * 180) / Math.PI : 0
  return { angleDeg: radial + (orientation === 'tangential' ? 90 : 0) + by_deg }
}

/**
 * Resistivity goes with thickness or depth as Rs does: at a given shape everything along the depth grows with it, so that
 * the layer is asked at Rs times the growth.
 */
function resistivityThrough({ procedure, profile }: LotAnalysis): (sheet_ohm_sq: number, draw: Draw) => number {
  const layer = prepareLayer(procedure, profile)
  const columns = emptyLayerColumns(1)
  return (sheet_ohm_sq, draw) => {
    if (!layer) return NaN
    layer.invert(Float64Array.of(sheet_ohm_sq * growthOf(procedure, draw)), columns)
    return columns.resistivity_ohm_cm[0]
  }
}

function growthOf({ layer, wafer }: Procedure, draw: Draw): number {
  if (layer.kind === 'bulk') return wafer.thicknessUm ? 1 + draw('thicknessUm') / wafer.thicknessUm : 1
  if (layer.kind !== 'doped-layer') return 1
  const depth = layer.depthUm ?? layer.diffusionLengthUm
  return depth === undefined ? 1 : 1 + draw('depthUm') / depth
}
