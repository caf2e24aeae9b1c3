/** What the same lot would say under every mobility model: how much of a concentration is the model's choice. */
import { explain } from '../problems/explain'
import { CoreError } from '../problems/problem'
import type { Procedure } from '../procedure/schema'
import type { MobilityModel } from '../silicon/mobility-model'
import { mobilityModels, type MobilityId } from '../silicon/mobility/registry'
import { concentration_cm3 } from '../silicon/resistivity'
import { CELSIUS_ZERO_K } from '../units/constants'
import { emptyLayerColumns } from './layer-results'
import type { LotAnalysis } from './lot-analysis'
import { layerMobility, prepareLayer } from './prepare-layer'
import { countingSites } from './wafers'

export interface ComparedModel {
  readonly id: MobilityId
  readonly title: string
  /** Whether it is the one that the procedure takes. */
  readonly isProcedures: boolean
  /** Whether its concentration lies in the range that it was fitted over. */
  readonly isInRange: boolean
  /** NaN where it gives none. */
  readonly concentration_cm3: number
  readonly dose_cm2: number
  /** Over the procedure's model, less 1. */
  readonly relativeConcentration: number
  readonly relativeDose: number
  /** Why it gives nothing; empty where it does. */
  readonly why: string
}

export interface MobilityComparison {
  /** What is inverted: the mean over the wafers of each wafer's mean. */
  readonly basis: 'mean-sheet-resistance' | 'mean-resistivity'
  /** In Ω/sq or Ω·cm. */
  readonly value: number
  /** In the order of the register. */
  readonly models: readonly ComparedModel[]
  /** Largest over smallest less 1, over the models in their range; NaN of fewer than two. */
  readonly concentrationSpread: number
  readonly doseSpread: number
}

/**
 * The lot's one typical value inverted under each mobility model: of bulk silicon the mean resistivity, of the other
 * layers the mean sheet resistance, each the mean of the wafer means over the sites that count. One inversion a model,
 * so that it costs nothing beside the analysis. Null for layers without silicon.
 */
export function mobilityComparison(analysis: LotAnalysis): MobilityComparison | null {
  const { layer } = analysis.procedure
  if (!('dopant' in layer)) return null
  const isBulk = layer.kind === 'bulk'
  const { resistivity_ohm_cm, sheetResistance_ohm_sq } = analysis.sites
  const value = meanOfWaferMeans(analysis, isBulk ? resistivity_ohm_cm : sheetResistance_ohm_sq)
  const found = mobilityModels.map((model) => ({ model, ...underModel(analysis, model.id, value) }))
  const own = found.find(({ model }) => model.id === layer.mobility)
  const models = found.map(({ model, why, concentration_cm3: n, dose_cm2: dose }): ComparedModel => ({
    id: model.id,
    title: model.title,
    isProcedures: model.id === layer.mobility,
    isInRange: n >= model.range_cm3.min && n <= model.range_cm3.max,
    concentration_cm3: n,
    dose_cm2: dose,
    relativeConcentration: n / (own?.concentration_cm3 ?? NaN) - 1,
    relativeDose: dose / (own?.dose_cm2 ?? NaN) - 1,
    why,
  }))
  const valid = models.filter(({ isInRange }) => isInRange)
  return {
    basis: isBulk ? 'mean-resistivity' : 'mean-sheet-resistance',
    value,
    models,
    concentrationSpread: spreadOf(valid.map((model) => model.concentration_cm3)),
    doseSpread: spreadOf(valid.map((model) => model.dose_cm2)),
  }
}

function spreadOf(values: readonly number[]): number {
  return values.length < 2 ? NaN : Math.max(...values) / Math.min(...values) - 1
}

function meanOfWaferMeans({ wafers, sites }: LotAnalysis, column: Float64Array): number {
  const means = wafers.map((wafer) => {
    const counting = countingSites(wafer.sites, sites.flags).filter((i) => column[i] > 0)
    return counting.reduce((sum, i) => sum + column[i], 0) / counting.length
  })
  const known = means.filter((mean) => !Number.isNaN(mean))
  return known.reduce((sum, mean) => sum + mean, 0) / known.length
}

interface UnderModel {
  readonly concentration_cm3: number
  readonly dose_cm2: number
  readonly why: string
}

/** A model that has no numbers, doesn't know the dopant or doesn't reach the value says so in its place. */
function underModel(analysis: LotAnalysis, id: MobilityId, value: number): UnderModel {
  const nothing = (why: string): UnderModel => ({ concentration_cm3: NaN, dose_cm2: NaN, why })
  if (Number.isNaN(value)) return nothing('The lot has no value to compare by.')
  const procedure = withMobility(analysis.procedure, id)
  try {
    const { layer } = procedure
    const mobility = layerMobility(layer)
    const found =
      layer.kind === 'bulk' && mobility ? bulkAt(procedure, mobility, value) : layerAt(procedure, analysis, value)
    if (!Number.isNaN(found.concentration_cm3)) return { ...found, why: '' }
    return nothing('The value lies outside what the layer covers with this model.')
  } catch (error) {
    if (!(error instanceof CoreError)) throw error
    return nothing(explain(error.problem))
  }
}

/** The two numbers of the model "constant" go with it alone. */
function withMobility(procedure: Procedure, mobility: MobilityId): Procedure {
  const { layer } = procedure
  if (!('dopant' in layer)) return procedure
  const { constantMobility, ...rest } = layer
  const kept = mobility === 'constant' && constantMobility ? { constantMobility } : {}
  return { ...procedure, layer: { ...rest, mobility, ...kept } }
}

function bulkAt({ layer, temperature }: Procedure, mobility: MobilityModel, resistivity_ohm_cm: number) {
  const dopant = 'dopant' in layer ? layer.dopant : 'boron'
  const temperature_K = temperature.referenceC + CELSIUS_ZERO_K
  return {
    concentration_cm3: concentration_cm3({ dopant, mobility, temperature_K, resistivity_ohm_cm }),
    dose_cm2: NaN,
  }
}

function layerAt(procedure: Procedure, { profile }: LotAnalysis, sheetResistance_ohm_sq: number) {
  const columns = emptyLayerColumns(1)
  prepareLayer(procedure, profile)?.invert(Float64Array.of(sheetResistance_ohm_sq), columns)
  return { concentration_cm3: columns.concentration_cm3[0], dose_cm2: columns.dose_cm2[0] }
}
