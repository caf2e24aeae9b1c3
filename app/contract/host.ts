/**
 * All that the window may ask of the machine it runs on: names, text and bytes. No measurement and no physics, so that
 * the same core gives the same numbers under every host.
 */
import type { Problem } from '../../core/problems/problem'

export interface Host {
  readonly kind: 'electron' | 'browser'
  /** Asks the person for files; an empty list when they decide against it. */
  chooseFiles(choice: FileChoice): Promise<Reply<readonly OpenedFile[]>>
  /** The files that the program was started with. */
  startFiles(): Promise<Reply<readonly OpenedFile[]>>
  /** Asks the person where to. */
  saveFile(suggestedName: string, bytes: Uint8Array): Promise<Reply<'saved' | 'cancelled'>>
}

export type FileChoice = 'readings' | 'procedure'

export interface OpenedFile {
  readonly name: string
  readonly bytes: Uint8Array
}

/** Errors cross between processes as data: a thrown one would lose everything but its message. */
export type Reply<Value> =
  { readonly ok: true; readonly value: Value } | { readonly ok: false; readonly problem: Problem }

/** What each choice offers, for the file dialogs of both hosts. */
export const FILE_CHOICES = {
  readings: { title: 'Readings', extensions: ['csv', 'tsv', 'txt', 'dat'] },
  procedure: { title: 'Procedure', extensions: ['json'] },
} as const satisfies Record<FileChoice, { readonly title: string; readonly extensions: readonly string[] }>
