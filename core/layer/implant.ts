import { erfc } from '../numeric/erfc'
import { requireRange } from '../problems/problem'
import { formatConcentration, formatQuantity, formatSignificant } from '../units/format'
import { curveInverse, requireDensity } from './curve-layer'
import type { CurveInverse } from './curve-layer'
import { LARGEST_DENSITY_CM3, joins_cm3, leastDensity_cm3, requireDopedSilicon, requireJunction } from './doped-silicon'
import type { DopedSilicon } from './doped-silicon'
import { implantDose_cm2, implantSheetResistance_ohm_sq } from './implant-integral'
import type { LayerCurve, LayerPoint } from './layer-curve'
import type { Background, LayerKind, LayerStep, PreparedLayer } from './layer-kind'

export interface ImplantSettings extends DopedSilicon {
  /** Projected range: depth of the peak [um]. */
  readonly range_um: number
  readonly straggle_um: number
  /** Of the other type, where there is one; it bounds the layer. */
  readonly background?: Background | undefined
}

const RANGE_SOURCE = 'Gaussian range distribution: J. Lindhard, M. Scharff, H. E. Schiøtt (1963)'

/**
 * An implant as a buried Gaussian of given range and straggle: from sheet resistance its dose and peak concentration.
 *
 * The dose is that of the whole Gaussian, Q = sqrt(2 pi) ΔR_p N_p, as the implanter counts it. Of it the fraction
 * 1 - erfc(R_p / (sqrt(2) ΔR_p)) / 2 lies in the silicon (97.7 % at R_p = 2 ΔR_p), and only that part conducts.
 * With a background the layer is where N > N_B. Covers peaks from 1.01 N_B (or the mobility model's lower end) to 1e21
 * cm^-3; outside, dose and concentration are NaN. The integral and its assumptions stand in `implant-integral.ts`.
 * Accuracy: 1e-9 relative for the model taken.
 * @throws CoreError from prepare: background of the layer's own type, unknown dopant, quantities out of range
 */
export const implant = {
  id: 'implant',
  title: 'Implant (buried Gaussian)',
  gives: ['concentration', 'dose'],
  concentrationMeans: 'peak concentration',
  formula:
    'N(x) = N_p exp(−(x − R_p)²/(2 ΔR_p²)), 1/R_s = ∫ q μ(N + N_B) (N − N_B) dx where N > N_B, x ≥ 0, solved for the peak N_p; dose √(2π) ΔR_p N_p',
  sources: [RANGE_SOURCE, 'J. C. Irvin, Bell Syst. Tech. J. 41 (1962) 387'],
  conductsThroughWafer: false,
  prepare: prepareImplant,
} as const satisfies LayerKind<ImplantSettings>

function prepareImplant(settings: ImplantSettings): PreparedLayer {
  requireDopedSilicon(settings)
  if (settings.background !== undefined) requireJunction(settings.dopant, settings.background)
  requireRange('projected range', settings.range_um, 'um', 1e-4, 100)
  requireRange('straggle', settings.straggle_um, 'um', 1e-4, 100)
  const background_cm3 = settings.background?.concentration_cm3 ?? 0
  const least = leastDensity_cm3(settings.mobility, background_cm3)
  const sheetOf = (peak_cm3: number): number =>
    implantSheetResistance_ohm_sq({ ...settings, silicon: settings, peak_cm3, background_cm3 })
  const inverse = curveInverse(implantCurve(settings, background_cm3, least, sheetOf))
  return {
    range_ohm_sq: inverse.range_ohm_sq,
    invert(sheets, into) {
      inverse.fill(sheets, into)
      into.resistivity_ohm_cm.fill(NaN)
      into.resistivitySensitivity.fill(NaN)
      into.thickness_um.fill(NaN)
    },
    forward(peak_cm3) {
      requireDensity('peak concentration', peak_cm3, least, LARGEST_DENSITY_CM3)
      return sheetOf(peak_cm3)
    },
    explain: (sheet) => explainImplant(settings, inverse, sheet),
  }
}

/** Along t = ln(N_p / N_B - 1), or ln N_p where there is no background. */
function implantCurve(
  settings: ImplantSettings,
  background_cm3: number,
  least: number,
  sheetOf: (peak_cm3: number) => number,
): LayerCurve {
  const hasBackground = background_cm3 > 0
  const peakAt = (t: number): number => (hasBackground ? background_cm3 * (1 + Math.exp(t)) : Math.exp(t))
  const variableOf = (peak_cm3: number): number =>
    hasBackground ? Math.log(peak_cm3 / background_cm3 - 1) : Math.log(peak_cm3)
  // From this peak on the layer reaches the surface, which cuts it off: the curve bends.
  const surfacing_cm3 = background_cm3 * Math.exp((settings.range_um / settings.straggle_um) ** 2 / 2)
  const bends = joins_cm3(settings).map((join) => variableOf(join - background_cm3))
  if (hasBackground && Number.isFinite(surfacing_cm3)) bends.push(variableOf(surfacing_cm3))
  return {
    from: variableOf(least),
    to: variableOf(LARGEST_DENSITY_CM3),
    bends,
    lnConcentration: (t) => (hasBackground ? Math.log(background_cm3) + Math.log1p(Math.exp(t)) : t),
    lnDose: (t) => Math.log(implantDose_cm2({ peak_cm3: peakAt(t), straggle_um: settings.straggle_um })),
    lnSheetResistance: (t) => Math.log(sheetOf(peakAt(t))),
  }
}

function explainImplant(settings: ImplantSettings, inverse: CurveInverse, sheet: number): readonly LayerStep[] {
  const point = inverse.pointAt(sheet)
  const inside = 1 - erfc(settings.range_um / (Math.SQRT2 * settings.straggle_um)) / 2
  const straggle = formatQuantity(settings.straggle_um, 'µm')
  return [
    peakStep(settings, inverse, sheet, point),
    {
      symbol: 'Q',
      title: 'Dose of the whole Gaussian',
      value: point.dose,
      unit: 'cm⁻²',
      formula: `√(2π) × ${straggle} × 10⁻⁴ cm/µm × ${formatConcentration(point.concentration)}`,
      source: RANGE_SOURCE,
    },
    {
      symbol: 'Φ',
      title: 'Fraction of that dose that lies in the silicon',
      value: inside,
      unit: '',
      formula: `1 − erfc(${formatQuantity(settings.range_um, 'µm')} / (√2 × ${straggle})) / 2`,
      source: RANGE_SOURCE,
    },
    {
      symbol: 'd ln Q / d ln R_s',
      title: 'Sensitivity of dose to sheet resistance',
      value: point.doseSensitivity,
      unit: '',
      formula: 'slope of the same integral',
      source: RANGE_SOURCE,
    },
    {
      symbol: 'd ln R_s / d ln Q',
      title: 'Sensitivity of sheet resistance to dose',
      value: 1 / point.doseSensitivity,
      unit: '',
      formula: doseInWords(1 / point.doseSensitivity),
      source: RANGE_SOURCE,
    },
  ]
}

/** "1 % of dose moves sheet resistance by −0.931 %" */
function doseInWords(response: number): string {
  return Number.isNaN(response)
    ? 'none: the sheet resistance lies outside the layer'
    : `1 % of dose moves sheet resistance by ${formatSignificant(response, 3)} %`
}

function peakStep(settings: ImplantSettings, inverse: CurveInverse, sheet: number, point: LayerPoint): LayerStep {
  const { min, max } = inverse.range_ohm_sq
  const { background } = settings
  const integral =
    background === undefined
      ? '1 / ∫ q µ(N) N dx'
      : `1 / ∫ q µ(N + N_B) (N − N_B) dx, N_B = ${formatConcentration(background.concentration_cm3)} ${background.dopant},`
  const solved =
    `N_p for which ${integral} = ${formatQuantity(sheet, 'Ω/sq')}, N(x) = N_p · exp(−(x − R_p)² / (2 ΔR_p²)), ` +
    `R_p = ${formatQuantity(settings.range_um, 'µm')}, ΔR_p = ${formatQuantity(settings.straggle_um, 'µm')}, ` +
    `mobility ${settings.mobility.title}`
  const outside = `none: the layer covers ${formatSignificant(min, 4)} to ${formatQuantity(max, 'Ω/sq')}`
  return {
    symbol: 'N_p',
    title: 'Peak concentration',
    value: point.concentration,
    unit: 'cm⁻³',
    formula: sheet >= min && sheet <= max ? solved : outside,
    source: `${RANGE_SOURCE}; ${settings.mobility.source}`,
  }
}
