/** What the lot's own site plan could have seen, and so what its silence means. */
import { EFFECTS, type EffectId } from '../../plan/effects'
import { meanBias, POWER_SOURCE, smallestDetectable } from '../../plan/power'
import { planSight } from '../../analysis/plan-sight'
import { formatFixed, formatSignificant } from '../../units/format'
import type { Block } from '../document'
import type { ReportContext } from '../report-context'

const POWER = 0.9
const ALPHA = 0.05
const SHOWN = ['tilt', 'bowl', 'edge', 'two-fold', 'spot'] as const satisfies readonly EffectId[]

export function planSection({ analysis, detailsOf }: ReportContext): Block[] {
  const sight = planSight(analysis, detailsOf)
  if (!sight) return []
  const { plan, usableRadius_mm, repeatability } = sight
  return [
    { kind: 'heading', level: 2, text: 'What this plan can see' },
    {
      kind: 'paragraph',
      text: `${plan.count} sites a wafer that spread by ${formatSignificant(100 * repeatability, 2)} % about their surface: smallest pattern that is found with ${formatFixed(100 * POWER, 0)} % power at ${formatFixed(100 * ALPHA, 0)} % false alarms, in its worst direction or place, by a test of that one shape. Smaller ones may be there all the same.`,
    },
    {
      kind: 'table',
      summary: 'Smallest pattern that this site plan finds',
      columns: [
        { title: 'Pattern', align: 'left', share: 1.2 },
        { title: 'Smallest', unit: '%', align: 'decimal', share: 0.8 },
        { title: '', align: 'left', share: 3, quiet: true },
        { title: 'Plain mean off by', unit: '% of it', align: 'decimal', share: 1 },
      ],
      rows: SHOWN.map((effect) => {
        const question = { plan, usableRadius_mm, effect, repeatability, alpha: ALPHA }
        const smallest = smallestDetectable(question, POWER)
        return {
          cells: [
            EFFECTS[effect].title,
            smallest <= 1 ? formatSignificant(100 * smallest, 2) : 'not at all',
            EFFECTS[effect].size,
            formatFixed(100 * meanBias(question), 1),
          ],
        }
      }),
    },
    { kind: 'paragraph', text: `Source: ${POWER_SOURCE}.`, quiet: true },
  ]
}
