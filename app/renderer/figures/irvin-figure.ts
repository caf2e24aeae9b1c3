/** Sheet resistance against concentration for the lot's layer, with its wafers on the curve. */
import type { LotAnalysis, WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { prepareLayer } from '../../../core/analysis/prepare-layer'
import type { PreparedLayer } from '../../../core/layer/layer-kind'
import { CoreError } from '../../../core/problems/problem'
import { concentrationTitle, layerWords } from '../../../core/report/sections/layer-words'
import { formatConcentration, formatQuantity } from '../../../core/units/format'
import { waferName } from '../formats/words'
import { decades, type CurveFigure } from './curves'
import type { LotPictures } from './lot-pictures'

const POINTS = 140
const DECADES_ASIDE = 1

/** Null for layers that have no concentration, or a lot without any. */
export function irvinFigure({ analysis, wafers }: LotPictures, chosen: string | null): CurveFigure | null {
  const layer = prepareLayer(analysis.procedure, analysis.profile)
  const placed = wafers.filter(({ means }) => means.concentration_cm3 > 0)
  if (!layer || placed.length === 0 || analysis.procedure.layer.kind === 'film') return null
  const axis = yAxisOf(analysis)
  const ends = placed.map(({ means }) => means.concentration_cm3)
  const aside = 10 ** DECADES_ASIDE
  const curve = decades(Math.min(...ends) / aside, Math.max(...ends) * aside, POINTS).flatMap((n) => point(layer, n))
  const series = (list: readonly WaferAnalysis[]) => ({
    x: list.map(({ means }) => means.concentration_cm3),
    y: list.map(({ means }) => (point(layer, means.concentration_cm3)[0]?.sheet ?? NaN) * axis.factor),
    labels: list.map(({ id, means, statistics }) => `${waferName(id)}: ${formatConcentration(means.concentration_cm3)}, ${formatQuantity(statistics.mean, analysis.quantity.unit)}`),
  }) // prettier-ignore
  return {
    title: `${axis.name} against ${concentrationTitle(analysis.procedure.layer).toLowerCase()}`,
    description: `The curve of this layer (${layerWords(analysis.procedure.layer)}) with the mean of each of ${placed.length} wafers on it.`,
    x: { title: `${concentrationTitle(analysis.procedure.layer)} / cm⁻³`, isLogarithmic: true },
    y: { title: `${axis.name} / ${axis.unit}`, isLogarithmic: true },
    series: [
      { name: 'layer', x: curve.map(({ n }) => n), y: curve.map(({ sheet }) => sheet * axis.factor), look: 'line' },
      { name: 'wafers', look: 'points', ...series(placed) },
      { name: 'selected', look: 'chosen', ...series(placed.filter(({ id }) => id === chosen)) },
    ],
    rules: [],
  }
}

/** For a doped layer of given depth sheet resistance times depth, which is one curve for every depth. */
function yAxisOf({ procedure }: LotAnalysis): { readonly name: string; readonly unit: string; readonly factor: number } {
  const { layer } = procedure
  if (layer.kind === 'doped-layer' && layer.depthUm !== undefined) return { name: 'Sheet resistance × depth', unit: 'Ω·µm', factor: layer.depthUm }
  return { name: 'Sheet resistance', unit: 'Ω/sq', factor: 1 }
} // prettier-ignore

/** Nothing where the layer doesn't reach. */
function point(layer: PreparedLayer, n: number): { readonly n: number; readonly sheet: number }[] {
  try {
    return [{ n, sheet: layer.forward(n) }]
  } catch (error) {
    if (error instanceof CoreError) return []
    throw error
  }
}
