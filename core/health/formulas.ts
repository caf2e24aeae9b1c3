/** The looks at the readings that rest on a formula; the others compare with thresholds that stand beside their code. */
import type { Formula } from '../units/formula'
import { DRIFT_AMONG_SOURCE, DRIFT_WITHIN_SOURCE } from './drift'

export const DRIFT_WITHIN = {
  title: 'Drift within the wafers',
  formula:
    'b = Σ r o/Σ o², r the readings and o their order, both less the surface to degree 4 that fits them; strays drawn in to 4 robust deviations',
  where: 'told where the median over the wafers stands out of its standard error',
  source: DRIFT_WITHIN_SOURCE,
} satisfies Formula

export const DRIFT_AMONG = {
  title: 'Drift from wafer to wafer',
  formula:
    'z = S/√(n (n − 1)(2n + 5)/18), S the rising less the falling pairs of the wafers’ medians in the order measured',
  source: DRIFT_AMONG_SOURCE,
} satisfies Formula
