import { CoreError, type Problem } from '../../core/problems/problem'
import { systemReason } from '../../core/problems/system-reason'
import type { Reply } from '../contract/host'

/** Answers with what the work gives, or with what was wrong; a stack never leaves the host. */
export async function replying<Value>(call: string, work: () => Promise<Value> | Value): Promise<Reply<Value>> {
  try {
    return { ok: true, value: await work() }
  } catch (error) {
    if (error instanceof CoreError) return { ok: false, problem: error.problem }
    return { ok: false, problem: refusal(call, systemReason(error)) }
  }
}

export function refusal(call: string, why: string): Problem {
  return { kind: 'bad-argument', argument: call, why }
}
