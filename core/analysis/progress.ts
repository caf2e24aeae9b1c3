/** How far a run has come, for whoever watches it. */
export interface Progress {
  readonly stage: Stage
  /** Share of the stage that is done, 0 to 1; only reading tells it in steps. */
  readonly share: number
  /** Rows read so far. */
  readonly rows: number
}

/** In the order they are gone through. */
export const STAGES = ['reading', 'correcting', 'mapping', 'judging'] as const
export type Stage = (typeof STAGES)[number]

export type Watch = (progress: Progress) => void
