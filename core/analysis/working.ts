import type { ExpandedUncertainty } from './uncertainty-budget'

/** The chain from V and I to the reported value at one site, as a person would write it out by hand. */
export interface Working {
  readonly wafer: string
  readonly site: string
  readonly x_mm: number
  readonly y_mm: number
  readonly steps: readonly WorkingStep[]
  /** What the uncertainty of the judged quantity is made of, largest first; empty for an exact procedure. */
  readonly budget: readonly BudgetLine[]
  /** Of the judged quantity. */
  readonly expanded: ExpandedUncertainty
}

export interface BudgetLine {
  readonly component: string
  readonly title: string
  readonly shared: boolean
  /** Standard uncertainty of the component itself, in `unit`. */
  readonly u: number
  readonly unit: string
  /** Infinite where it is known well. */
  readonly degreesOfFreedom: number
  readonly evaluation: 'A' | 'B'
  /** What a unit of the component does to the judged quantity, relative [1/unit]. */
  readonly sensitivity: number
  /** Relative effect on the judged quantity: derivative times standard uncertainty, over the value [-]. */
  readonly relative: number
  /** Of the sum of squares [-]. */
  readonly share: number
}

export interface WorkingStep {
  /** As set in print: "V/I", "C", "F(w/S)". */
  readonly symbol: string
  readonly title: string
  readonly value: number
  readonly unit: string
  /** Standard uncertainty, same unit; NaN where none applies. */
  readonly u: number
  /** With numbers filled in: "4.5321 × 20.312 Ω". */
  readonly formula: string
  readonly source: string
}
