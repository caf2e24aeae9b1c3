/** The decision rule in words, the limits it makes, and what it risks. */
import { ACCEPTANCE_RULES, acceptanceWords, type Acceptance } from '../../conformity/acceptance'
import { limitsText } from '../../conformity/reasons'
import type { LotRisks } from '../../analysis/lot-analysis'
import { RISK_SOURCE } from '../../analysis/lot-risks'
import { formatQuantity, formatSignificant } from '../../units/format'
import type { Block, TableRow } from '../document'
import { riskCurve, riskPoints } from '../figures/risk-curve'
import type { ReportContext } from '../report-context'

export const RULE_TITLES = { simple: 'simple', stringent: 'stringent', relaxed: 'relaxed', risk: 'by risk' } as const

export function riskSection({ analysis, width_pt }: ReportContext): Block[] {
  const { risks, procedure } = analysis
  const { acceptance } = procedure
  return [
    { kind: 'heading', level: 1, text: 'Decision rule and risks' },
    { kind: 'paragraph', text: acceptanceWords(acceptance) },
    ...(risks
      ? [...riskBlocks(risks, analysis.quantity.unit, acceptance.rule), riskFigure(risks, acceptance, width_pt)]
      : []),
    { kind: 'paragraph', text: `Uniformity is judged simply under every rule. Source: ${RISK_SOURCE}.`, quiet: true },
  ]
}

function riskBlocks(risks: LotRisks, unit: string, rule: keyof LotRisks['byRule']): Block[] {
  const { process: production, isGiven, u, limits, acceptanceLimits } = risks
  return [
    {
      kind: 'key-values',
      columns: 1,
      entries: [
        { key: 'Limits of a site', value: limitsText(limits, unit) },
        { key: 'A typical site is accepted', value: acceptedText(acceptanceLimits, unit), note: `u ${formatQuantity(u, unit)}` },
        {
          key: 'Process',
          value: `${formatQuantity(production.mean, unit)}, s ${formatQuantity(production.standardDeviation, unit)}`,
          note: isGiven ? 'as the procedure gives it' : "this lot's own, less the error of measurement; taken for normal",
        },
      ],
    },
    {
      kind: 'table',
      summary: 'Risks of every decision rule on lots such as this one',
      columns: [
        { title: 'Rule', align: 'left', share: 1.4 },
        { title: 'False acceptance', unit: '% of all sites', align: 'decimal', share: 1.4 },
        { title: 'False rejection', unit: '% of all sites', align: 'decimal', share: 1.4 },
        { title: 'Accepted', unit: '%', align: 'decimal', share: 1 },
      ],
      rows: ACCEPTANCE_RULES.map((id): TableRow => ({
        cells: [RULE_TITLES[id], ...[risks.byRule[id].consumer, risks.byRule[id].producer, risks.byRule[id].accepted].map(percent)],
        ...(id === rule && { emphasis: 'strong' as const }),
      })),
    },
  ]
} // prettier-ignore

function riskFigure(
  { limits, u, process: production }: LotRisks,
  { rule, guardFactor }: Acceptance,
  width_pt: number,
): Block {
  const here = rule === 'stringent' ? guardFactor : rule === 'relaxed' ? -guardFactor : 0
  const points = riskPoints(limits, u, production)
  return {
    kind: 'figures',
    figures: [riskCurve({ points, guardFactor: here, width_pt: 0.75 * width_pt, height_pt: 150 })],
  }
}

export function acceptedText(limits: LotRisks['acceptanceLimits'], unit: string): string {
  const { lower = -Infinity, upper = Infinity } = limits
  if (lower > upper) return 'nowhere: the uncertainty is too large'
  const short = (limit: number | undefined) => (limit === undefined ? undefined : Number(limit.toPrecision(5)))
  return `inside ${limitsText({ lower: short(limits.lower), upper: short(limits.upper) }, unit)}`
}

/** Two digits, and "less than" where there is hardly any. */
export function percent(share: number): string {
  return share < 5e-7 ? '< 0.0001' : formatSignificant(100 * share, share > 0.1 ? 3 : 2)
}
