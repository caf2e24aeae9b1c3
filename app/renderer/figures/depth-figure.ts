/** The concentration against depth that a wafer's mean sheet resistance implies. */
import type { LotAnalysis, WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { profileEnd, profileLines } from '../../../core/layer/depth-table'
import type { DepthTable } from '../../../core/layer/layer-kind'
import { layerProfile } from '../../../core/layer/profiles/registry'
import { waferTitle } from '../../../core/report/report-context'
import { formatConcentration, formatSignificant } from '../../../core/units/format'
import type { CurveFigure, CurveRule } from './curves'
import type { LotPictures } from './lot-pictures'

const POINTS = 160
/** Standard deviations beyond the peak of an implant that are drawn. */
const STRAGGLES = 4.5

interface Course {
  readonly depth_um: readonly number[]
  readonly concentration_cm3: readonly number[]
  readonly rules: readonly CurveRule[]
  readonly words: string
}

/** Null for layers without a profile in depth. */
export function depthFigure({ analysis }: LotPictures, wafer: WaferAnalysis): CurveFigure | null {
  const peak_cm3 = wafer.means.concentration_cm3
  const course = peak_cm3 > 0 ? courseOf(analysis, peak_cm3) : null
  if (!course) return null
  return {
    title: `Concentration in depth, ${waferTitle(wafer.id).toLowerCase()}`,
    description: `${course.words}, ${formatConcentration(peak_cm3)} from the mean of the wafer.`,
    x: { title: 'Depth / µm', isLogarithmic: false },
    y: { title: 'Concentration / cm⁻³', isLogarithmic: true },
    series: [{ name: 'dopant', x: course.depth_um, y: course.concentration_cm3, look: 'line' }],
    rules: course.rules,
  }
}

type Layer = LotPictures['analysis']['procedure']['layer']

function courseOf({ procedure, profile }: LotAnalysis, peak_cm3: number): Course | null {
  const { layer } = procedure
  if (layer.kind === 'doped-layer' && layer.profile === 'tabulated')
    return profile && tabulatedCourse(layer, profile, peak_cm3)
  if (layer.kind === 'doped-layer') return dopedCourse(layer, peak_cm3)
  if (layer.kind === 'implant') return implantCourse(layer, peak_cm3)
  return null
}

function dopedCourse(layer: Extract<Layer, { kind: 'doped-layer' }>, surface_cm3: number): Course {
  const profile = layerProfile(layer.profile as Parameters<typeof layerProfile>[0])
  const ratio = layer.background.concentrationCm3 / surface_cm3
  const shape = profile.shape(ratio)
  const depth_um = layer.depthUm ?? profile.depthInLengths(ratio) * (layer.diffusionLengthUm ?? NaN)
  const eta = evenly(0, 1)
  return {
    depth_um: eta.map((part) => part * depth_um),
    concentration_cm3: eta.map((part) => surface_cm3 * shape(part)),
    rules: [
      { name: 'junction', axis: 'x', at: depth_um },
      { name: `background, ${layer.background.dopant}`, axis: 'y', at: layer.background.concentrationCm3 },
    ],
    words: `${profile.title}: ${profile.formula}; surface concentration`,
  }
}

/** The file's points, all by one factor; it ends where it last comes down to the background. */
function tabulatedCourse(layer: Extract<Layer, { kind: 'doped-layer' }>, table: DepthTable, peak_cm3: number): Course {
  const lines = profileLines(table)
  const factor = peak_cm3 / lines.peak_cm3
  const background_cm3 = layer.background.concentrationCm3
  const end = profileEnd(lines, Math.log(background_cm3 / peak_cm3))
  return {
    depth_um: Array.from(table.depth_um),
    concentration_cm3: Array.from(table.concentration_cm3, (n) => n * factor),
    rules: [
      ...(end.isTableEnd ? [] : [{ name: 'junction', axis: 'x', at: end.depth_um } as const]),
      { name: `background, ${layer.background.dopant}`, axis: 'y', at: background_cm3 },
    ],
    words: `${layer.profileFile ?? 'The profile file'} times ${formatSignificant(factor, 4)}; peak concentration`,
  }
}

function implantCourse(layer: Extract<Layer, { kind: 'implant' }>, peak_cm3: number): Course {
  const reach = layer.rangeUm + STRAGGLES * layer.straggleUm
  const depth_um = evenly(0, reach)
  return {
    depth_um,
    concentration_cm3: depth_um.map((x) => peak_cm3 * Math.exp(-((x - layer.rangeUm) ** 2) / (2 * layer.straggleUm ** 2))),
    rules: [
      { name: 'range', axis: 'x', at: layer.rangeUm },
      ...(layer.background ? [{ name: `background, ${layer.background.dopant}`, axis: 'y', at: layer.background.concentrationCm3 } as const] : []),
    ],
    words: 'Gaussian about the projected range; peak concentration',
  } // prettier-ignore
}

function evenly(from: number, to: number): number[] {
  return Array.from({ length: POINTS }, (_, i) => from + ((to - from) * i) / (POINTS - 1))
}
