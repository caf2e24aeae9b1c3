/** What the window keeps of an open lot, as the text that `saveState` takes; the files lie beside it under their tokens. */
import * as z from 'zod/mini'
import type { Exclusion } from '../../core/analysis/exclusions'
import { DECISIONS, type Decision } from '../../core/report/decision'
import { exclusion, fileName, keysOf, list, text, token } from './messages'

export const SESSION_FORMAT = 'persquare-session/1'

export interface KeptFile {
  readonly name: string
  readonly token: string
}

/** A decision in the making: what is not decided yet is null. */
export interface KeptDecision {
  readonly decision: Decision['decision'] | null
  readonly name: string
  readonly comment: string
  readonly date: string | null
}

export interface Session {
  readonly readings: readonly KeptFile[]
  readonly procedure: KeptFile | null
  readonly excluded: readonly Exclusion[]
  readonly decision: KeptDecision
  /** How things are looked at, for whoever draws them; a value that is not understood is left aside. */
  readonly view: Readonly<Record<string, unknown>>
}

const keptFile = z.object({ name: fileName, token })

const session = z.object({
  format: z.literal(SESSION_FORMAT),
  readings: list(keptFile, 1000),
  procedure: z.nullable(keptFile),
  excluded: list(exclusion, 5000),
  decision: z.object({
    decision: z.nullable(keysOf(DECISIONS)),
    name: text(200),
    comment: text(5000),
    date: z.nullable(text(100)),
  }),
  view: z.record(z.string(), z.unknown()),
})

export function sessionText(open: Session): string {
  return JSON.stringify({ format: SESSION_FORMAT, ...open })
}

/** null where it is no session of this edition: another edition of the program may have left it. */
export function parseSession(written: string): Session | null {
  try {
    const parsed = session.safeParse(JSON.parse(written))
    return parsed.success ? parsed.data : null
  } catch {
    return null
  }
}
