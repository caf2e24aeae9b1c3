/**
 * Everything that can be wrong, as data. Sentences are made from it in one place, `explain.ts`.
 *
 * Two ways out of core: a single calculation with a broken precondition throws a `CoreError`; work over many
 * rows or sites collects problems and goes on with what is good.
 */
export type Problem =
  | PhysicsProblem
  | FileProblem
  | RowProblem
  | ProfileProblem
  | TableProblem
  | ProcedureProblem
  | AnalysisProblem
  | OutputProblem

/** A broken precondition of one calculation. */
export type PhysicsProblem =
  | {
      readonly kind: 'out-of-range'
      readonly quantity: string
      readonly value: number
      readonly unit: string
      readonly min: number
      readonly max: number
    }
  | {
      readonly kind: 'unknown-id'
      readonly family: string
      readonly id: string
      readonly known: readonly string[]
    }
  | { readonly kind: 'not-applicable'; readonly what: string; readonly why: string }
  /** Another window keeps its open lot where this one kept its own. */
  | { readonly kind: 'kept-elsewhere' }

/** A whole file that can't be read as readings. */
export type FileProblem =
  | { readonly kind: 'cannot-read'; readonly file: string; readonly why: string }
  | { readonly kind: 'empty-file'; readonly file: string }
  | { readonly kind: 'not-text'; readonly file: string; readonly looksLike: string }
  | { readonly kind: 'no-header'; readonly file: string; readonly firstLine: string }
  | { readonly kind: 'no-readings'; readonly file: string; readonly rows: number; readonly rejected: number }
  | {
      readonly kind: 'missing-column'
      readonly file: string
      readonly wanted: string
      readonly headers: readonly string[]
    }
  | {
      readonly kind: 'ambiguous-column'
      readonly file: string
      readonly column: string
      readonly candidates: readonly string[]
    }
  | {
      readonly kind: 'unknown-unit'
      readonly file: string
      readonly header: string
      readonly unit: string
      readonly known: readonly string[]
    }
  | {
      readonly kind: 'line-too-long'
      readonly file: string
      readonly line: number
      readonly length: number
      readonly max: number
    }
  | {
      readonly kind: 'mixed-files'
      readonly file: string
      readonly what: string
      readonly first: string
      readonly found: string
    }

/** One row, or one cell of it. The row is left out of the analysis and listed. */
export type RowProblem =
  | {
      /** `why` follows the text found: "is empty", "is not a number". */
      readonly kind: 'bad-cell'
      readonly file: string
      readonly line: number
      readonly column: string
      readonly found: string
      readonly why: string
    }
  | {
      readonly kind: 'bad-row'
      readonly file: string
      readonly line: number
      readonly column: string
      readonly found: string
      readonly why: string
    }
  | {
      readonly kind: 'doubled-site'
      readonly file: string
      readonly line: number
      readonly wafer: string
      readonly site: string
      readonly firstLine: number
    }

/** A depth profile that the procedure names: the whole file, or one line of it. */
export interface ProfileProblem {
  readonly kind: 'bad-profile'
  readonly file: string
  readonly line?: number
  readonly why: string
}

/** A gauge study or a check wafer's history: the whole file, or one line of it. */
export interface TableProblem {
  readonly kind: 'bad-table'
  readonly file: string
  readonly line?: number
  readonly why: string
}

/** The procedure file. `key` is the dotted path, e.g. `limits.waferMeanOhmSq.lower`. */
export type ProcedureProblem =
  | { readonly kind: 'not-json'; readonly file: string; readonly why: string }
  | {
      readonly kind: 'unknown-key'
      readonly file: string
      readonly key: string
      readonly nearest: string | null
      readonly known: readonly string[]
    }
  | {
      readonly kind: 'bad-value'
      readonly file: string
      readonly key: string
      readonly found: string
      readonly allowed: string
    }
  | { readonly kind: 'missing-key'; readonly file: string; readonly key: string; readonly why: string }
  | {
      /** A file that the key names and that did not come with the procedure. */
      readonly kind: 'missing-file'
      readonly file: string
      readonly key: string
      readonly name: string
    }
  | {
      readonly kind: 'limits-reversed'
      readonly file: string
      readonly key: string
      readonly lower: number
      readonly upper: number
    }

/** What the reader must know before trusting a lot that was analysed. */
export type AnalysisProblem =
  | {
      readonly kind: 'site-off-wafer'
      readonly file: string
      readonly line: number
      readonly wafer: string
      readonly site: string
      readonly radius_mm: number
      readonly edge_mm: number
    }
  | {
      readonly kind: 'pin-off-wafer'
      readonly file: string
      readonly line: number
      readonly wafer: string
      readonly site: string
    }
  | {
      readonly kind: 'no-sheet-resistance'
      readonly file: string
      readonly line: number
      readonly wafer: string
      readonly site: string
      readonly why: string
    }
  | {
      readonly kind: 'swapped-columns'
      readonly file: string
      readonly asRead: number
      readonly swapped: number
      readonly unit: string
    }
  | {
      readonly kind: 'flagged-sites'
      readonly flag: string
      readonly count: number
      readonly wafers: readonly string[]
      readonly sentence: string
    }
  /** An exclusion that names no site of these readings. */
  | { readonly kind: 'no-such-site'; readonly wafer: string; readonly site: string }
  /** The readings themselves look suspicious; `wafer` and `site` where one shows it. */
  | {
      readonly kind: 'suspicious-readings'
      readonly check: string
      readonly severity: 'stops' | 'look'
      readonly sentence: string
      readonly nextStep: string
      readonly wafer?: string
      readonly site?: string
    }
  /** The check wafer was out of control when the lot was measured. */
  | { readonly kind: 'check-wafer-alarm'; readonly sentence: string }
  | { readonly kind: 'nothing-assessed'; readonly why: string }

export type OutputProblem =
  | { readonly kind: 'cannot-write'; readonly path: string; readonly why: string }
  | { readonly kind: 'bad-argument'; readonly argument: string; readonly why: string }

export type ProblemKind = Problem['kind']

/** The only error class that core throws on purpose; anything else is a bug. */
export class CoreError extends Error {
  readonly problem: Problem
  constructor(problem: Problem) {
    super(problem.kind)
    this.name = 'CoreError'
    this.problem = problem
  }
}

/** Throws unless min <= value <= max. NaN is out of every range. */
export function requireRange(quantity: string, value: number, unit: string, min: number, max: number): void {
  if (!(value >= min && value <= max)) {
    throw new CoreError({ kind: 'out-of-range', quantity, value, unit, min, max })
  }
}
