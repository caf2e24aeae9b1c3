/** The working of one site, from V and I to its verdict. */
import type { LayerStep } from '../layer/layer-kind'
import { outlineGeometry } from '../geometry/registry'
import { DUAL_SOURCE } from '../geometry/dual'
import { TEMPERATURE_SOURCE } from '../silicon/temperature'
import { STANDARD_TEMPERATURE_C } from '../units/constants'
import { formatQuantity, formatSignificant } from '../units/format'
import { correct, type Corrections } from './corrections'
import { layerResults } from './layer-results'
import { POLARITIES } from './formulas'
import type { LotAnalysis } from './lot-analysis'
import { measuringSetUp, type MeasuringSetUp } from './measuring-set-up'
import { oneSite } from './one-site'
import { prepareLayer } from './prepare-layer'
import { limitsOn } from './quantity'
import { sitePositions } from './site-positions'
import { contributions, type Contribution } from './contributions'
import { onResistivity } from './uncertainty'
import { expandedUncertainty, type BudgetLine } from './uncertainty-budget'
import { ratios } from './v-over-i'
import { CONFORMANCE_PROBABILITY } from '../conformity/formulas'
import { VERDICTS } from '../conformity/verdict'
import type { Working, WorkingStep } from './working'

/** One site taken through the same functions as the lot, with what each step used. */
export function siteWorking(analysis: LotAnalysis, site: number): Working {
  const { readings, procedure, profile } = analysis
  const one = oneSite(readings, site)
  const flags = new Uint32Array(1)
  const vOverI = ratios(one, flags)
  const setUp = measuringSetUp(procedure, { hasConfigurationB: vOverI.b_ohm !== null })
  const positions = sitePositions(one, procedure)
  const corrections = correct(one, procedure, setUp, positions, vOverI, flags)
  const { repeatability, gauge } = analysis
  const parts = contributions({ procedure, profile, corrections, readings: one, flags, repeatability, gauge })
  const x_mm = positions ? positions.x_mm[0] : NaN
  const y_mm = positions ? positions.y_mm[0] : NaN
  const input = { analysis, site, corrections, setUp, parts, x_mm, y_mm }
  const budget = budgetOf(input)
  return {
    wafer: readings.wafers[readings.wafer[site]].id,
    site: readings.siteNames[readings.site[site]],
    x_mm,
    y_mm,
    steps: [...sheetSteps(input), ...layerSteps(input), ...judgementSteps(input)],
    budget,
    expanded: expandedUncertainty(budget, procedure.statistics.confidence),
  }
}

interface WorkingInput {
  readonly analysis: LotAnalysis
  readonly site: number
  readonly corrections: Corrections
  readonly setUp: MeasuringSetUp
  readonly parts: readonly Contribution[]
  readonly x_mm: number
  readonly y_mm: number
}

function sheetSteps(input: WorkingInput): WorkingStep[] {
  const { analysis, site, corrections } = input
  const rs = analysis.sites.sheetResistance_ohm_sq[site]
  const u = analysis.sites.uSheetResistance_ohm_sq[site]
  const symbol = 'R_s'
  if (corrections.reported) {
    const asReported = { symbol, value: rs, u, unit: 'Ω/sq', source: 'the readings file' }
    return Number.isNaN(rs) ? [] : [{ ...asReported, title: 'Sheet resistance, as reported', formula: 'as reported' }]
  }
  const factors = [ratioStep(input), ...(input.setUp.isDual ? dualSteps(input) : [geometryStep(input)])]
  const corrected = [...factors, ...thicknessSteps(input), ...temperatureSteps(input)]
  const chain = corrected.filter(({ symbol: s }) => s !== 'V/I B').map(({ symbol: s }) => s)
  return [
    ...corrected,
    {
      symbol,
      title: 'Sheet resistance',
      value: rs,
      u,
      unit: 'Ω/sq',
      formula: chain.join(' × '),
      source: 'product of the factors',
    },
  ]
}

/** Root sum of squares of the components named, as a fraction of the sheet resistance. */
function relative(parts: readonly Contribution[], ...components: readonly Contribution['component'][]): number {
  return Math.hypot(
    ...parts.filter(({ component }) => components.includes(component)).map((part) => part.sheetResistance(0)),
  )
}

function ratioStep({ analysis, site, corrections, parts }: WorkingInput): WorkingStep {
  const { readings } = analysis
  const value = corrections.vOverI.a_ohm[0]
  const ratio = (voltage: Float64Array | null, current: Float64Array | null): string | null =>
    voltage && current && !Number.isNaN(voltage[site] / current[site])
      ? `${formatQuantity(voltage[site] * 1e3, 'mV')} / ${formatQuantity(current[site] * 1e3, 'mA')}`
      : null
  const forward = ratio(readings.voltage_V, readings.current_A)
  const reverse = ratio(readings.voltageReverse_V, readings.currentReverse_A)
  const formula = forward && reverse ? `(${forward} + ${reverse}) / 2` : (forward ?? reverse ?? 'as the file gives it')
  return {
    symbol: 'V/I',
    title: forward && reverse ? 'Mean of forward and reverse' : 'Voltage over current',
    value,
    u: value * relative(parts, 'currentRel', 'voltageRel', 'thermalEmfUV'),
    unit: 'Ω',
    formula,
    source: POLARITIES.source,
  }
}

function geometryStep({ analysis, corrections, parts, setUp, x_mm, y_mm }: WorkingInput): WorkingStep {
  const { orientation, spacings_mm, outline } = setUp
  const line = typeof orientation === 'string' ? orientation : `${orientation.angleDeg}°`
  const place = Number.isNaN(x_mm)
    ? 'far from every edge'
    : `x ${formatSignificant(x_mm, 5)} mm, y ${formatSignificant(y_mm, 5)} mm`
  const value = corrections.geometryFactor[0]
  const source = outlineGeometry(Number.isNaN(x_mm) ? { shape: 'infinite' } : analysis.outline).source
  return {
    symbol: 'C',
    title: outline.shape === 'infinite' ? 'Geometry factor, infinite sheet' : `Geometry factor, ${outline.shape}`,
    value,
    u: value * relative(parts, 'spacingMm', 'spacingWanderMm', 'orientationDeg', 'diameterMm', 'positionMm'),
    unit: '',
    formula: `${place}; pin line ${line}; pins ${spacings_mm.join(', ')} mm`,
    source,
  }
}

function dualSteps({ corrections, analysis, site }: WorkingInput): WorkingStep[] {
  const a = corrections.vOverI.a_ohm[0]
  const b = corrections.vOverI.b_ohm ? corrections.vOverI.b_ohm[0] : NaN
  const temperature = corrections.temperature.factor[0]
  const value = analysis.sites.sheetResistance_ohm_sq[site] / (a * corrections.thickness.value * temperature)
  const unit = 'Ω'
  return [
    {
      symbol: 'V/I B',
      title: 'Configuration B',
      value: b,
      u: NaN,
      unit,
      formula: `A/B = ${formatSignificant(a / b, 6)}`,
      source: DUAL_SOURCE,
    },
    {
      symbol: 'K',
      title: 'Dual factor',
      value,
      u: NaN,
      unit: '',
      formula: 'exp(2π R_A/R_s) − exp(2π R_B/R_s) = 1',
      source: DUAL_SOURCE,
    },
  ]
}

function thicknessSteps({ corrections: { thickness }, setUp, parts }: WorkingInput): WorkingStep[] {
  const { conductingThickness_um, meanSpacing_mm } = setUp
  if (conductingThickness_um === null) return []
  const ratio = formatSignificant(conductingThickness_um / 1000 / meanSpacing_mm, 4)
  const { value, source } = thickness
  const u = value * relative(parts, 'thicknessUm')
  return [{ symbol: 'F', title: 'Thickness factor', value, u, unit: '', formula: `w/S = ${ratio}`, source }]
}

function temperatureSteps({ corrections: { temperature }, analysis, site, parts }: WorkingInput): WorkingStep[] {
  if (temperature.basis === null) return []
  const { readings, procedure } = analysis
  const measured =
    readings.temperature_C && !Number.isNaN(readings.temperature_C[site])
      ? readings.temperature_C[site]
      : procedure.temperature.measuredC
  if (measured === undefined) return []
  const { referenceC } = procedure.temperature
  // The slope of ln(1 - C (T - 23)) is -C / (1 - C (T - 23)).
  const slope = temperature.slope_per_C[0]
  const coefficient = formatSignificant((-100 * slope) / (1 - slope * (measured - STANDARD_TEMPERATURE_C)), 3)
  const value = temperature.factor[0]
  const source =
    temperature.basis === 'published'
      ? TEMPERATURE_SOURCE
      : 'coefficient given by the procedure; form of SEMI MF1527 eq. R2-12'
  const formula = `${formatSignificant(measured, 4)} °C to ${referenceC} °C at ${coefficient} %/°C`
  return [
    {
      symbol: 'F_T',
      title: 'Temperature factor',
      value,
      u: value * relative(parts, 'temperatureC', 'temperatureCoefficientPercentPerC'),
      unit: '',
      formula,
      source,
    },
  ]
}

function layerSteps({ analysis, site }: WorkingInput): WorkingStep[] {
  const { sites, procedure, profile } = analysis
  const sheet = sites.sheetResistance_ohm_sq[site]
  if (Number.isNaN(sheet)) return reportedResistivitySteps(analysis, site)
  const uncertaintyOf: Partial<Record<string, number>> = {
    'Ω·cm': sites.uResistivity_ohm_cm[site],
    'cm⁻³': sites.uConcentration_cm3[site],
  }
  const steps: readonly LayerStep[] = prepareLayer(procedure, profile)?.explain(sheet) ?? []
  return steps.map((step) => ({ ...step, u: uncertaintyOf[step.unit] ?? NaN }))
}

function reportedResistivitySteps({ sites }: LotAnalysis, site: number): WorkingStep[] {
  const reported = {
    symbol: 'ρ',
    title: 'Resistivity, as reported',
    value: sites.resistivity_ohm_cm[site],
    unit: 'Ω·cm',
  }
  const found = { symbol: 'N', title: 'Concentration', value: sites.concentration_cm3[site], unit: 'cm⁻³' }
  return [
    { ...reported, u: sites.uResistivity_ohm_cm[site], formula: 'as reported', source: 'the readings file' },
    ...(Number.isNaN(found.value)
      ? []
      : [{ ...found, u: sites.uConcentration_cm3[site], formula: 'inverse of ρ(N)', source: 'the mobility model' }]),
  ]
}

function judgementSteps({ analysis, site }: WorkingInput): WorkingStep[] {
  const { sites, quantity, procedure } = analysis
  const { lower, upper } = limitsOn(quantity, procedure).site ?? {}
  const value = sites.conformanceProbability[site]
  if (Number.isNaN(value)) return []
  const range = [
    lower === undefined ? '' : `${lower} ≤ `,
    quantity.symbol,
    upper === undefined ? '' : ` ≤ ${upper}`,
  ].join('')
  const title = `Probability to conform; verdict: ${VERDICTS[sites.verdict[site]].replace('-', ' ')}`
  return [
    {
      symbol: 'p_c',
      title,
      value,
      u: NaN,
      unit: '',
      formula: `${range} ${quantity.unit}`,
      source: CONFORMANCE_PROBABILITY.source,
    },
  ]
}

function budgetOf({ analysis, corrections, parts }: WorkingInput): BudgetLine[] {
  const { procedure, profile, quantity } = analysis
  const isResistivity = quantity.id === 'resistivity'
  const layer = layerResults(procedure, prepareLayer(procedure, profile), corrections, new Uint32Array(1))
  const sensitivity = layer.resistivitySensitivity[0]
  const lines = parts.map((part) => {
    const onSheet = part.sheetResistance(0)
    const relative = Math.abs(isResistivity ? onResistivity(part, onSheet, sensitivity) : onSheet)
    const { component, title, shared, u, unit, degreesOfFreedom, evaluation } = part
    return { component, title, shared, u, unit, degreesOfFreedom, evaluation, sensitivity: relative / u, relative }
  })
  const sum = lines.reduce((total, { relative: r }) => total + r * r, 0)
  return lines
    .map((line) => ({ ...line, share: sum > 0 ? line.relative ** 2 / sum : 0 }))
    .sort((a, b) => b.relative - a.relative)
}
