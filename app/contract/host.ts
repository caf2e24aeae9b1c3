/**
 * All that the window may ask of the machine it runs on: names, text and bytes. No measurement and no physics, so that
 * the same core gives the same numbers under every host. No path of a file ever reaches the window: what was opened
 * before is known by an opaque token.
 */
import type { Exclusion } from '../../core/analysis/exclusions'
import type { Problem } from '../../core/problems/problem'
import type { Decision } from '../../core/report/decision'
import type { CommandId } from './commands'
import type { FileChoice, SaveKind } from './file-kinds'

export interface Host {
  readonly kind: 'electron' | 'browser'
  /** What this host does beyond the calls that every host answers; the window hides what it can't have. */
  readonly can: HostAbilities

  /** Asks the person for files; an empty list when they decide against it. A folder gives every readings file in it. */
  chooseFiles(choice: FileChoice): Promise<Reply<readonly OpenedFile[]>>
  /** The files that the program was started with or asked to open since; each is handed out once. */
  startFiles(): Promise<Reply<readonly OpenedFile[]>>
  /** The bundled lot: readings and their procedure. */
  demoFiles(): Promise<Reply<readonly OpenedFile[]>>
  /** Tells the host that the person dropped these files (of the page's own `File` class), for its list of recent ones. */
  rememberDropped(files: readonly object[]): Promise<Reply<'remembered' | 'ignored'>>

  /** Lots and procedures that the person opened before, newest first. Empty unless `can.reopen`. */
  recentFiles(): Promise<Reply<readonly RecentEntry[]>>
  reopen(token: string): Promise<Reply<readonly OpenedFile[]>>
  forgetRecent(): Promise<Reply<'forgotten'>>

  /** Asks the person where to; what is there already is replaced whole or not at all. */
  saveFile(suggestedName: string, bytes: Uint8Array, kind: SaveKind): Promise<Reply<'saved' | 'cancelled'>>

  /** The lot report as PDF: the same inputs and options make the same bytes as the command line's. */
  makeReport(request: ReportRequest): Promise<Reply<Uint8Array>>
  /** Hands a PDF to the system's viewer, to be printed from there. Refused unless `can.print`. */
  printReport(pdf: Uint8Array): Promise<Reply<'opened'>>

  /** What `saveState` kept last; the one before where the last is damaged; null where there is none. */
  loadState(): Promise<Reply<SavedState | null>>
  /**
   * Keeps the window's state through a crash or a power cut. Answers when it is on the disk; the caller limits the rate.
   *
   * @param text   at most MAX_STATE_BYTES of UTF-8; the host doesn't look inside
   * @param kept   tokens from `keepFile` that the state speaks of; files that neither this state nor the one before
   *               names are dropped some time later
   */
  saveState(text: string, kept: readonly string[]): Promise<Reply<'saved'>>
  /** Keeps a file's bytes beside the state, so that a state need not hold them. The same bytes give the same token. */
  keepFile(bytes: Uint8Array): Promise<Reply<string>>
  keptFile(token: string): Promise<Reply<Uint8Array>>

  /** Calls back for every command of the native menu; returns how to stop. Never calls unless `can.menus`. */
  onCommand(listener: (command: CommandId) => void): () => void
  /** Calls back when `startFiles` has something new: a second start of the program, a file dragged onto its icon. */
  onFilesWaiting(listener: () => void): () => void
}

export interface HostAbilities {
  /** Opens recent files again. */
  readonly reopen: boolean
  readonly print: boolean
  /** Has native menus that send commands. */
  readonly menus: boolean
  /** `saveFile` asks for a place; otherwise the browser puts it where it puts downloads. */
  readonly asksWhere: boolean
}

export interface OpenedFile {
  readonly name: string
  readonly bytes: Uint8Array
}

export interface RecentEntry {
  readonly token: string
  readonly kind: 'readings' | 'procedure'
  /** What was opened together. */
  readonly names: readonly string[]
  /** ISO 8601, UTC. */
  readonly opened: string
}

export interface SavedState {
  readonly text: string
  /** `previous`: the last one was damaged, and this is the one before. */
  readonly generation: 'last' | 'previous'
}

export interface ReportRequest {
  /** All that was brought but the procedure; what the procedure names goes with it. */
  readonly readings: readonly OpenedFile[]
  readonly procedure: OpenedFile
  readonly excluded: readonly Exclusion[]
  readonly decision: Decision | null
  /** ISO 8601; null: the time of the latest reading. */
  readonly date: string | null
  readonly paper: 'A4' | 'Letter'
}

/** Errors cross between processes as data: a thrown one would lose everything but its message. */
export type Reply<Value> =
  { readonly ok: true; readonly value: Value } | { readonly ok: false; readonly problem: Problem }

export const MAX_STATE_BYTES = 8 * 2 ** 20
/** Of all files of one call together. */
export const MAX_FILES_BYTES = 256 * 2 ** 20
