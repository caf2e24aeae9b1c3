import { CoreError } from '../problems/problem'
import { formatConcentration, formatQuantity, formatSignificant } from '../units/format'
import { meanConductivity } from './conductivity-integral'
import { requireDensity } from './curve-layer'
import type { CurveInverse } from './curve-layer'
import { excessIntegral_um, flatLevels, profileEnd, profileLines } from './depth-table'
import type { ProfileEnd, ProfileLines } from './depth-table'
import { LARGEST_DENSITY_CM3, joins_cm3, leastDensity_cm3 } from './doped-silicon'
import type { DopedLayerSettings } from './doped-silicon'
import type { LayerCurve } from './layer-curve'
import type { LayerColumns, LayerStep, PreparedLayer } from './layer-kind'
import { IRVIN } from './profile-integral'
import { solvedInverse } from './solved-inverse'

const UM_IN_CM = 1e-4
export const TABLE_SOURCE = 'the tabulated profile; straight lines of ln N over depth between its points'

/** What the layer's functions share. */
interface TabulatedLayer {
  readonly settings: DopedLayerSettings
  readonly lines: ProfileLines
  readonly background_cm3: number
  readonly least: number
  sheetResistanceAt(peak_cm3: number): number
  dose_cm2(peak_cm3: number): number
  endAt(peak_cm3: number): ProfileEnd
}

/**
 * A doped layer whose profile is a table of depths and concentrations, as a depth profile measurement or a process
 * simulation gives it. The table gives the shape, sheet resistance the scale: N(x) = k N_table(x), with k solved from
 *
 *   R_s = 1 / Integral q mu(N + N_B) (N - N_B) dx over the depths where N > N_B.
 *
 * Concentration is the profile's peak, k times the table's; dose is the net Integral (N - N_B) dx. The layer ends where
 * k N_table last comes down to N_B, or at the end of the table if it does not; mean resistivity is R_s times that depth.
 * Between points ln N runs straight; above the first point the first value holds up to the surface. Where the table is
 * chemical, a k below 1 reads as the active fraction, provided that what is active has the same shape.
 *
 * Conductivity rises with N throughout, so R_s falls with k and has one k. A depth scale that is wrong by a factor
 * enters k with the same sensitivity as one of R_s. Covers peaks from 1.01 N_B (or the model's lower end) to 1e21 cm^-3.
 * Assumes what `profile-integral.ts` does. Accuracy: the integral of the lines to 1e-11, k to 1e-9 relative; the lines
 * themselves are as good as the table is dense (for a Gaussian of 50 points to the background about 0.1 %).
 * @throws CoreError no table, or one that can't be read as a profile; a depth or a length beside it
 */
export function prepareTabulatedLayer(settings: DopedLayerSettings): PreparedLayer {
  const layer = tabulatedLayer(settings)
  const inverse = solvedInverse(tabulatedCurve(layer))
  return {
    range_ohm_sq: inverse.range_ohm_sq,
    invert(sheets, into) {
      inverse.fill(sheets, into)
      fillResistivity(layer, sheets, into)
      into.thickness_um.fill(NaN)
    },
    forward(peak_cm3) {
      requireDensity('peak concentration', peak_cm3, layer.least, LARGEST_DENSITY_CM3)
      return layer.sheetResistanceAt(peak_cm3)
    },
    explain: (sheet) => explainLayer(layer, inverse, sheet),
  }
}

function tabulatedLayer(settings: DopedLayerSettings): TabulatedLayer {
  const { table, depth_um, diffusionLength_um, background } = settings
  if (table === undefined) refuse('a tabulated profile without its table', 'depth and concentration come from there')
  if (depth_um !== undefined || diffusionLength_um !== undefined) {
    refuse('a tabulated profile with a junction depth or a diffusion length', 'the table has its depths')
  }
  const lines = profileLines(table)
  const background_cm3 = background.concentration_cm3
  const mean = meanConductivity(settings, background_cm3)
  const levelOf = (peak_cm3: number): number => Math.log(background_cm3 / peak_cm3)
  return {
    settings,
    lines,
    background_cm3,
    least: leastDensity_cm3(settings.mobility, background_cm3),
    endAt: (peak_cm3) => profileEnd(lines, levelOf(peak_cm3)),
    dose_cm2: (peak_cm3) => background_cm3 * excessIntegral_um(lines, levelOf(peak_cm3)) * UM_IN_CM,
    sheetResistanceAt(peak_cm3) {
      const { count, length_um, shallow, deep } = lines
      const lnPeak = Math.log(peak_cm3)
      let sum = 0
      for (let i = 0; i < count; i++) {
        const upper = Math.max(shallow[i], deep[i])
        const lower = Math.min(shallow[i], deep[i])
        sum += length_um[i] * mean(lnPeak + upper, lnPeak + lower)
      }
      return 1e4 / sum
    },
  }
}

function refuse(what: string, why: string): never {
  throw new CoreError({ kind: 'not-applicable', what, why })
}

/** Along t = ln(N_p / N_B - 1), as the named profiles. */
function tabulatedCurve({ settings, lines, background_cm3, least, ...layer }: TabulatedLayer): LayerCurve {
  const excessOf = (peak_cm3: number): number => Math.log(peak_cm3 / background_cm3 - 1)
  const peakAt = (t: number): number => background_cm3 * (1 + Math.exp(t))
  const joins = joins_cm3(settings).map((join) => join - background_cm3)
  return {
    from: excessOf(least),
    to: excessOf(LARGEST_DENSITY_CM3),
    bends: joins.flatMap((join) => flatLevels(lines).map((level) => excessOf(join / Math.exp(level)))),
    slopeStep: 1e-3,
    lnConcentration: (t) => Math.log(background_cm3) + Math.log1p(Math.exp(t)),
    lnDose: (t) => Math.log(layer.dose_cm2(peakAt(t))),
    lnSheetResistance: (t) => Math.log(layer.sheetResistanceAt(peakAt(t))),
  }
}

/** After concentration and its sensitivity. */
function fillResistivity({ endAt }: TabulatedLayer, sheets: Float64Array, into: LayerColumns): void {
  const { resistivity_ohm_cm, resistivitySensitivity, concentration_cm3, concentrationSensitivity } = into
  for (let i = 0; i < sheets.length; i++) {
    const isKnown = !Number.isNaN(concentration_cm3[i])
    const end = isKnown ? endAt(concentration_cm3[i]) : null
    resistivity_ohm_cm[i] = end ? sheets[i] * end.depth_um * UM_IN_CM : NaN
    resistivitySensitivity[i] = end ? 1 + end.response * concentrationSensitivity[i] : NaN
  }
}

function explainLayer(layer: TabulatedLayer, inverse: CurveInverse, sheet: number): readonly LayerStep[] {
  const { lines, endAt } = layer
  const point = inverse.pointAt(sheet)
  const scale = point.concentration / lines.peak_cm3
  const end = Number.isNaN(scale) ? null : endAt(point.concentration)
  const depth_um = end?.depth_um ?? NaN
  const depth = formatQuantity(depth_um, 'µm')
  return [
    scaleStep(layer, inverse, sheet, scale),
    {
      symbol: 'N_p',
      title: 'Peak concentration',
      value: point.concentration,
      unit: 'cm⁻³',
      formula: `${formatSignificant(scale, 5)} × ${formatConcentration(lines.peak_cm3)}, the largest of the table`,
      source: TABLE_SOURCE,
    },
    {
      symbol: 'x_j',
      title: end?.isTableEnd ? 'Depth of the layer: the table ends above the background' : 'Junction depth',
      value: depth_um,
      unit: 'µm',
      formula: end?.isTableEnd
        ? 'end of the table; what lies deeper is left out'
        : 'where k · N_table(x) last comes down to N_B',
      source: TABLE_SOURCE,
    },
    {
      symbol: 'ρ̄',
      title: 'Mean resistivity of the layer',
      value: sheet * depth_um * UM_IN_CM,
      unit: 'Ω·cm',
      formula: `${formatQuantity(sheet, 'Ω/sq')} × ${depth} × 10⁻⁴ cm/µm`,
      source: 'the definition of resistivity',
    },
    {
      symbol: 'Q',
      title: 'Active dose',
      value: point.dose,
      unit: 'cm⁻²',
      formula: `∫ (k · N_table − N_B) dx where positive, from the surface to ${depth}`,
      source: TABLE_SOURCE,
    },
    {
      symbol: 'd ln N_p / d ln R_s',
      title: 'Sensitivity of peak concentration to sheet resistance',
      value: point.concentrationSensitivity,
      unit: '',
      formula: 'slope of the same integral',
      source: IRVIN,
    },
  ]
}

function scaleStep({ settings, least }: TabulatedLayer, inverse: CurveInverse, sheet: number, k: number): LayerStep {
  const { min, max } = inverse.range_ohm_sq
  const { background, mobility } = settings
  const solved =
    `k for which 1 / ∫ q µ(N + N_B) (N − N_B) dx = ${formatQuantity(sheet, 'Ω/sq')}, N(x) = k · N_table(x), ` +
    `N_B = ${formatConcentration(background.concentration_cm3)} ${background.dopant}, mobility ${mobility.title}`
  const outside =
    `none: the layer covers ${formatSignificant(min, 4)} to ${formatQuantity(max, 'Ω/sq')}, that is peaks from ` +
    `${formatConcentration(LARGEST_DENSITY_CM3)} down to ${formatConcentration(least)}`
  return {
    symbol: 'k',
    title: 'Scale of the table',
    value: k,
    unit: '',
    formula: Number.isNaN(k) ? outside : solved,
    source: `${IRVIN}; ${mobility.source}`,
  }
}
