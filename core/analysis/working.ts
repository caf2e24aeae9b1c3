import type { BudgetLine, ExpandedUncertainty } from './uncertainty-budget'

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
