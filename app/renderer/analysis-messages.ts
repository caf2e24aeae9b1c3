/** What the window and its analysis worker say to each other. */
import type { Exclusion } from '../../core/analysis/exclusions'
import type { Progress } from '../../core/analysis/progress'
import type { RunResult } from '../../core/analysis/run'
import type { OpenedFile } from '../contract/host'

/** Files are sent once and known by their number afterwards: a change of the procedure needs no second copy. */
export interface Job {
  readonly added: readonly { readonly id: number; readonly bytes: Uint8Array }[]
  /** Files that the worker may forget. */
  readonly dropped: readonly number[]
  readonly readings: readonly FileUse[]
  readonly procedure: FileUse
  readonly excluded: readonly Exclusion[]
}

/** A run ahead of the first lot, so that the pipeline is compiled and its tables are made; its files are not kept. */
export interface Rehearsal {
  /** Lots from small to large: the engine is slow with what it sees first. */
  readonly rehearse: { readonly lots: readonly OpenedFile[]; readonly procedure: OpenedFile }
}

export interface FileUse {
  readonly id: number
  readonly name: string
}

export type Report =
  | { readonly kind: 'progress'; readonly progress: Progress }
  | { readonly kind: 'done'; readonly result: RunResult }
  | { readonly kind: 'rehearsed'; readonly result: RunResult }
  | { readonly kind: 'failed'; readonly why: string }
