/** From the lines of a budget to an expanded uncertainty, of a site or of a mean of sites. */
import { normalQuantile } from '../numeric/normal'
import { studentQuantile } from '../numeric/distributions'
import type { Contribution } from './contributions'

/** What one component does to the judged quantity. */
export interface BudgetLine extends Pick<
  Contribution,
  'title' | 'shared' | 'u' | 'unit' | 'degreesOfFreedom' | 'evaluation'
> {
  readonly component: string
  /** What a unit of the component does to the judged quantity, relative [1/unit]. */
  readonly sensitivity: number
  /** Relative effect on the judged quantity: derivative times standard uncertainty, over the value [-]. */
  readonly relative: number
  /** Of the sum of squares [-]. */
  readonly share: number
}

export interface ExpandedUncertainty {
  /** Relative to the value. */
  readonly standard: number
  /** By Welch-Satterthwaite; infinite where every component is known well. */
  readonly effectiveDegreesOfFreedom: number
  readonly coverageFactor: number
  readonly expanded: number
  /** Coverage probability. */
  readonly level: number
}

/** Below this share of the variance a component is named, not listed. */
const LEAST_SHARE = 1e-6

export function splitByEffect<Line extends Pick<BudgetLine, 'share'>>(
  budget: readonly Line[],
): { readonly listed: readonly Line[]; readonly idle: readonly Line[] } {
  const isListed = ({ share }: Line): boolean => share >= LEAST_SHARE
  return { listed: budget.filter(isListed), idle: budget.filter((line) => !isListed(line)) }
}

/** Beyond, Student's t is the normal distribution to every digit that is shown. */
const MANY = 1e6

/**
 * u_c^2 = sum u_i^2, nu_eff = u_c^4 / sum(u_i^4/nu_i), U = k u_c with k of Student's t at nu_eff, cut to a whole number.
 *
 * @param sites  how many independent sites a mean is made of: what is not shared is averaged down; 1 for one site
 * @param level  0.5 to 0.999999
 *
 * Sources: JCGM 100:2008, 5.1.2 (law of propagation), G.4.1 (Welch-Satterthwaite), G.3.2 (coverage factor).
 */
export function expandedUncertainty(
  lines: readonly Pick<BudgetLine, 'relative' | 'shared' | 'degreesOfFreedom'>[],
  level: number,
  sites = 1,
): ExpandedUncertainty {
  let variance = 0
  let quartic = 0
  for (const { relative, shared, degreesOfFreedom } of lines) {
    const part = (relative * relative) / (shared ? 1 : sites)
    variance += part
    quartic += (part * part) / degreesOfFreedom
  }
  const effectiveDegreesOfFreedom = quartic > 0 ? (variance * variance) / quartic : Infinity
  const coverageFactor = coverageFactorOf(effectiveDegreesOfFreedom, level)
  const standard = Math.sqrt(variance)
  return { standard, effectiveDegreesOfFreedom, coverageFactor, expanded: coverageFactor * standard, level }
}

export function coverageFactorOf(degreesOfFreedom: number, level: number): number {
  const p = (1 + level) / 2
  if (degreesOfFreedom >= MANY) return normalQuantile(p)
  return studentQuantile(p, Math.max(1, Math.floor(degreesOfFreedom)))
}
