/** A relation as the program computes it: the report's sources and the appendix of formulas read these. */
export interface Formula {
  readonly title: string
  /** As text, with the field's symbols. */
  readonly formula: string
  /** What the symbols mean, where formula and title leave it open. */
  readonly where?: string
  /** Where it holds, and how well. */
  readonly range?: string
  readonly source: string
}

/** A fitted number as it is typed: 1.305e16, -0.737, every digit that it has. */
export function coefficient(value: number): string {
  const size = Math.abs(value)
  return size !== 0 && (size >= 1e5 || size < 1e-3) ? value.toExponential().replace('e+', 'e') : String(value)
}
