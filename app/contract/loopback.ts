/** How the page asks the loopback host, under the secret's path. */
export const LOOPBACK_PATHS = {
  /** GET lists the files that wait, `files/0` is the first; POST `files/taken` says that they were all read. */
  files: 'files',
  taken: 'files/taken',
  /** GET lists the bundled lot, `demo/0` is its first file. */
  demo: 'demo',
  /**
   * GET the last state and its generation; POST a frame of its text and, as JSON, the tokens of the files it speaks of and
   * the count of the state that it takes the place of. Both answer with the count of the one that is there.
   */
  state: 'state',
  /** POST bytes for a token; GET `kept/<token>` gives them back. */
  kept: 'kept',
  /** POST a frame: what is asked for as JSON (`ReportHead`), the procedure, the readings one after another. */
  report: 'report',
} as const

export interface NamedFile {
  readonly name: string
}

/** A page of another site can't set this header without asking first, and is refused when it asks. */
export const OWN_HEADER = 'x-persquare'

/** The number of a state among those saved: of two pages that keep theirs, the first to save goes on. */
export const COUNT_HEADER = 'x-persquare-state'
