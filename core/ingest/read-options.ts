import type { ColumnId } from './readings'

/** How to read, where the file alone can't or shouldn't decide: `readings` of a procedure. */
export interface ReadOptions {
  /** Our column to the file's header. */
  readonly columns?:
    | {
        readonly [column in ColumnId]?:
          string | { readonly header: string; readonly unit?: string | undefined } | undefined
      }
    | undefined
  readonly delimiter?: ',' | ';' | '\t' | undefined
  readonly decimalMark?: '.' | ',' | undefined
}
