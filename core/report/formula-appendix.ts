/**
 * Every formula that the program computes by, with its range and source, gathered from where the program itself reads
 * them: the registers, and the formulas that stand beside each room's code.
 */
import { COVERAGE, POLARITIES, PROPAGATION, REPEATABILITY } from '../analysis/formulas'
import { CONTROL_LIMITS, MOVING_AVERAGE, RUNS } from '../check-wafer/formulas'
import { CONFORMANCE_PROBABILITY, DECISION_RULES, GLOBAL_RISKS } from '../conformity/formulas'
import { BAR_RESISTANCE } from '../conversion/formulas'
import { GAUGE_SPREADS, PROBE_BIAS } from '../gauge/formulas'
import { DUAL, DUAL_THICKNESS, EDGE_AND_THICKNESS, FOUR_TERMINALS, THICKNESS } from '../geometry/formulas'
import { outlineGeometries } from '../geometry/registry'
import { DRIFT_AMONG, DRIFT_WITHIN } from '../health/formulas'
import { JUNCTION_DEPTH, TABULATED_PROFILE } from '../layer/formulas'
import { layerProfiles } from '../layer/profiles/registry'
import { layerKinds } from '../layer/registry'
import { GAUSSIAN_PROCESS, OUTLYING_SITE, THIN_PLATE_SPLINE, TREND } from '../map/formulas'
import { MONTE_CARLO } from '../monte-carlo/formulas'
import { PLAN_POWER } from '../plan/formulas'
import { CARRIERS, CONDUCTIVITY, INTRINSIC_DENSITY, TEMPERATURE_COEFFICIENT } from '../silicon/formulas'
import { mobilityModels } from '../silicon/mobility/registry'
import type { MobilityModel } from '../silicon/mobility-model'
import {
  AREA_WEIGHTED, CAPABILITY, INTERVALS, NORMALITY, OUTLIERS, RADIAL_VARIATION, VARIANCE_COMPONENT_INTERVAL, VARIANCE_COMPONENTS,
  QUANTILES,
} from '../statistics/formulas' // prettier-ignore
import { nonuniformities } from '../statistics/nonuniformity'
import { formatScientific } from '../units/format'
import type { Formula } from '../units/formula'
import { EQUAL_AREA_PLAN, STANDARD_PLANS } from '../wafer/formulas'

export interface FormulaChapter {
  readonly title: string
  readonly formulas: readonly Formula[]
}

/** In the order of the work: from V and I to the verdict, then the instrument itself. */
export function formulaAppendix(): readonly FormulaChapter[] {
  return [
    {
      title: 'From V and I to sheet resistance',
      formulas: [POLARITIES, FOUR_TERMINALS, ...outlines(), THICKNESS, EDGE_AND_THICKNESS, DUAL, DUAL_THICKNESS, TEMPERATURE_COEFFICIENT],
    },
    { title: 'Silicon', formulas: [CONDUCTIVITY, CARRIERS, INTRINSIC_DENSITY, ...mobilityModels.map(mobility)] },
    {
      title: 'Layers',
      formulas: [...kinds(), ...layerProfiles, TABULATED_PROFILE, JUNCTION_DEPTH, BAR_RESISTANCE],
    },
    {
      title: 'Uncertainty',
      formulas: [PROPAGATION, COVERAGE, REPEATABILITY, MONTE_CARLO],
    },
    {
      title: 'Statistics of a wafer and a lot',
      formulas: [
        ...nonuniformities,
        INTERVALS,
        AREA_WEIGHTED,
        RADIAL_VARIATION,
        OUTLIERS,
        NORMALITY,
        CAPABILITY,
        VARIANCE_COMPONENTS,
        VARIANCE_COMPONENT_INTERVAL,
        QUANTILES,
      ],
    },
    { title: 'Between the sites', formulas: [THIN_PLATE_SPLINE, GAUSSIAN_PROCESS, TREND, OUTLYING_SITE] },
    { title: 'A look at the readings', formulas: [DRIFT_WITHIN, DRIFT_AMONG] },
    { title: 'Judgement', formulas: [CONFORMANCE_PROBABILITY, DECISION_RULES, GLOBAL_RISKS] },
    { title: 'Gauge study, check wafer, site plans', formulas: [GAUGE_SPREADS, PROBE_BIAS, CONTROL_LIMITS, MOVING_AVERAGE, RUNS, STANDARD_PLANS, EQUAL_AREA_PLAN, PLAN_POWER] },
  ]
} // prettier-ignore

function outlines(): readonly Formula[] {
  return outlineGeometries.map(({ title, formula, domain, source }) => ({ title, formula, range: domain, source }))
}

function kinds(): readonly Formula[] {
  return layerKinds.map(({ title, formula, sources }: { title: string; formula: string; sources: readonly string[] }) => ({
    title,
    formula,
    source: sources.length > 0 ? sources.join('; ') : 'nothing is derived',
  }))
} // prettier-ignore

function mobility({ title, formula, coefficients, range_cm3, temperature_K, source }: MobilityModel): Formula {
  const { min, max } = temperature_K
  const density = `${formatScientific(range_cm3.min, 2)} to ${formatScientific(range_cm3.max, 2)} cm⁻³`
  return {
    title: `Mobility: ${title}`,
    formula,
    ...(coefficients.length > 0 && { where: coefficients.join('; ') }),
    range: `${density}, ${min === max ? `${min} K` : `${min} to ${max} K`}`,
    source,
  }
}

/** As a page of Markdown. */
export function appendixAsMarkdown(chapters: readonly FormulaChapter[]): string {
  const lines = chapters.flatMap(({ title, formulas }) => [`## ${title}`, '', ...formulas.flatMap(entryLines)])
  return [HEAD, ...lines].join('\n').trimEnd() + '\n'
}

const HEAD = `# Formulas and their sources

Written by the program's own registers; don't edit it by hand. A report names those of these that it used. Text is set plainly:
R_s is the sheet resistance, ρ the resistivity, N a density of dopant, q the elementary charge. "From memory" says that the
reference was not at hand when its place was written down.
`

function entryLines({ title, formula, where, range, source }: Formula): readonly string[] {
  return [
    `### ${title}`,
    '',
    '```',
    formula,
    '```',
    '',
    ...(where ? [`- with ${where}`] : []),
    ...(range ? [`- holds for: ${range}`] : []),
    `- source: ${source}`,
    '',
  ]
}
