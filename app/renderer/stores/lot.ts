import { defineStore } from 'pinia'
import { computed, ref, shallowRef } from 'vue'
import { CoreError } from '../../../core/problems/problem'
import type { Problem } from '../../../core/problems/problem'
import type { OpenedFile, Reply } from '../../contract/host'
import { analyzeFiles } from '../analysis'
import type { RunResult } from '../../../core/analysis/run'

export type LotState = 'empty' | 'needs-procedure' | 'needs-readings' | 'reading' | 'analysed' | 'failed'

/** The one lot that the window holds: its files, and what core made of them. */
export const useLotStore = defineStore('lot', () => {
  const readings = shallowRef<readonly OpenedFile[]>([])
  const procedure = shallowRef<OpenedFile | null>(null)
  const outcome = shallowRef<RunResult | null>(null)
  const refusal = shallowRef<Problem | null>(null)
  const busy = ref(false)
  let latest = 0

  const analysis = computed(() => outcome.value?.analysis ?? null)
  const problems = computed(() => [...(refusal.value ? [refusal.value] : []), ...(outcome.value?.problems ?? [])])
  const state = computed<LotState>(() => {
    if (busy.value) return 'reading'
    if (analysis.value) return 'analysed'
    if (problems.value.length > 0) return 'failed'
    if (readings.value.length > 0) return 'needs-procedure'
    return procedure.value ? 'needs-readings' : 'empty'
  })

  /** Takes what was chosen or dropped: JSON is the procedure, everything else readings in place of the last. */
  async function take(reply: Reply<readonly OpenedFile[]>): Promise<void> {
    refusal.value = reply.ok ? null : reply.problem
    if (!reply.ok || reply.value.length === 0) return
    const procedures = reply.value.filter(isProcedure)
    const others = reply.value.filter((file) => !isProcedure(file))
    if (procedures.length > 0) procedure.value = procedures[procedures.length - 1]
    if (others.length > 0) readings.value = others
    await analyse()
  }

  async function analyse(): Promise<void> {
    const turn = ++latest
    outcome.value = null
    if (readings.value.length === 0 || !procedure.value) return
    busy.value = true
    const found = await settled(analyzeFiles(readings.value, procedure.value))
    // Files that were dropped meanwhile have the word.
    if (turn !== latest) return
    outcome.value = found
    busy.value = false
  }

  return { readings, procedure, analysis, problems, state, take }
})

function isProcedure({ name }: OpenedFile): boolean {
  return name.toLowerCase().endsWith('.json')
}

async function settled(running: Promise<RunResult>): Promise<RunResult> {
  try {
    return await running
  } catch (error) {
    const problem: Problem =
      error instanceof CoreError
        ? error.problem
        : { kind: 'not-applicable', what: 'the analysis', why: `internal error: ${String(error)}` }
    return { analysis: null, problems: [problem] }
  }
}
