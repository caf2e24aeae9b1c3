/**
 * The report as a document model: what stands on the paper, in order, as plain data. Whoever sets it in type decides on
 * lines and pages alone.
 */
import type { Drawing } from './drawing'
import type { MarkKind } from './figures/marks'

export type PaperSize = 'A4' | 'Letter'

export interface ReportDocument {
  readonly title: string
  readonly subject: string
  readonly language: string
  /** Name and version of what made it. */
  readonly program: string
  /** ISO 8601 with zone; the only time that enters the file. */
  readonly date: string
  readonly paper: PaperSize
  /** At the foot of every page, left of the page number. */
  readonly footer: string
  readonly blocks: readonly Block[]
}

export type Block =
  | HeadingBlock
  | VerdictBlock
  | ParagraphBlock
  | ListBlock
  | KeyValuesBlock
  | ColumnsBlock
  | TableBlock
  | FiguresBlock
  | SignatureBlock
  | { readonly kind: 'page-break' }

export interface HeadingBlock {
  readonly kind: 'heading'
  /** 1 begins a part of the report and stands in its outline; 2 and 3 divide it. */
  readonly level: 1 | 2 | 3
  readonly text: string
  /** At the right end of the line, quiet. */
  readonly aside?: string
  /** In the outline, where it differs from the text. */
  readonly bookmark?: string
}

/** The verdict told by word and shape, and the sentence that goes with it. */
export interface VerdictBlock {
  readonly kind: 'verdict'
  readonly word: string
  /** No mark is calm. */
  readonly mark: MarkKind | null
  readonly sentence: string
}

export interface ParagraphBlock {
  readonly kind: 'paragraph'
  readonly text: string
  readonly quiet?: boolean
}

export interface ListBlock {
  readonly kind: 'list'
  readonly numbered: boolean
  readonly entries: readonly string[]
}

export interface KeyValuesBlock {
  readonly kind: 'key-values'
  /** How many pairs stand side by side. */
  readonly columns: 1 | 2
  readonly entries: readonly KeyValue[]
}

export interface KeyValue {
  readonly key: string
  readonly value: string
  /** Quiet, after the value: a formula, a definition. */
  readonly note?: string
}

/** Stacks side by side; they never break over a page, so they hold little. */
export interface ColumnsBlock {
  readonly kind: 'columns'
  readonly columns: readonly (readonly Block[])[]
  /** Of the width, one a stack; absent: all as wide. */
  readonly shares?: readonly number[]
}

export interface TableBlock {
  readonly kind: 'table'
  /** What the table holds; read out, not printed. */
  readonly summary: string
  readonly columns: readonly TableColumn[]
  readonly rows: readonly TableRow[]
  /** Set in the typewriter face's size and spacing: for a calculation. */
  readonly calculation?: boolean
}

export interface TableColumn {
  readonly title: string
  /** In lighter ink under the title. */
  readonly unit?: string
  /** `decimal` lines up the decimal points. */
  readonly align: 'left' | 'right' | 'decimal'
  /** Share of the width. */
  readonly share: number
  readonly mono?: boolean
  /** Lighter ink throughout. */
  readonly quiet?: boolean
}

export interface TableRow {
  readonly cells: readonly string[]
  readonly emphasis?: 'strong' | 'result'
  /** Drawn before the text of the first cell or of `markColumn`. */
  readonly mark?: MarkKind
  readonly markColumn?: number
}

/** Figures side by side, each at its own size. */
export interface FiguresBlock {
  readonly kind: 'figures'
  readonly figures: readonly Drawing[]
}

/** Lines to be filled in by hand. */
export interface SignatureBlock {
  readonly kind: 'signature'
  readonly statement: string
  /** Boxes to tick. */
  readonly choices: readonly string[]
  readonly fields: readonly string[]
}

/** Width of each stack of a columns block that itself is so wide. */
export function columnWidths_pt({ columns, shares }: ColumnsBlock, width_pt: number): number[] {
  const given = columns.map((_, i) => shares?.[i] ?? 1)
  const whole = given.reduce((sum, share) => sum + share, 0)
  const room = width_pt - (columns.length - 1) * COLUMN_GAP_PT
  return given.map((share) => (room * share) / whole)
}

export const COLUMN_GAP_PT = 18

/** Width that text and figures have between the margins. */
export function contentWidth_pt(paper: PaperSize): number {
  return PAPER_SIZES_PT[paper].width - 2 * MARGIN_PT
}

/** Height that a page's content has between the top margin and the footer. */
export function contentHeight_pt(paper: PaperSize): number {
  return PAPER_SIZES_PT[paper].height - 2 * MARGIN_PT - FOOT_PT
}

export const PAPER_SIZES_PT = {
  A4: { width: 595.28, height: 841.89 },
  Letter: { width: 612, height: 792 },
} as const satisfies Record<PaperSize, { width: number; height: number }>

export const MARGIN_PT = 50

/** Kept free at the foot for the footer. */
export const FOOT_PT = 26
