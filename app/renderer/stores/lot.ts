import { defineStore } from 'pinia'
import { computed, ref, shallowRef, watch } from 'vue'
import type { Progress } from '../../../core/analysis/progress'
import type { RunResult } from '../../../core/analysis/run'
import type { Problem } from '../../../core/problems/problem'
import { isProcedureName } from '../../contract/file-kinds'
import type { OpenedFile, Reply } from '../../contract/host'
import { analyzeInWorker, lotAnalyzer } from '../analysis'
import { listFindings } from '../figures/findings'
import { lotPictures } from '../figures/lot-pictures'
import type { Keeping } from '../persistence/session-keeper'
import { useChoicesStore } from './choices'

export type LotState = 'empty' | 'needs-procedure' | 'needs-readings' | 'reading' | 'analysed' | 'failed'

/** The one lot that the window holds: what core made of the files that were chosen. */
export const useLotStore = defineStore('lot', () => {
  const choices = useChoicesStore()
  const outcome = shallowRef<RunResult | null>(null)
  const refusal = shallowRef<Problem | null>(null)
  const progress = shallowRef<Progress | null>(null)
  const busy = ref(false)
  const wasCancelled = ref(false)
  /** Whether the session would outlive a crash; told by whoever keeps it. */
  const keeping = shallowRef<Keeping>('kept')
  let latest = 0

  const analysis = computed(() => outcome.value?.analysis ?? null)
  const pictures = computed(() => (analysis.value ? lotPictures(analysis.value) : null))
  const problems = computed(() => [...(refusal.value ? [refusal.value] : []), ...(outcome.value?.problems ?? [])])
  const findings = computed(() => listFindings(analysis.value, problems.value, choices.now.procedure?.name ?? ''))
  const state = computed<LotState>(() => {
    if (analysis.value) return 'analysed'
    if (busy.value) return 'reading'
    if (problems.value.length > 0) return 'failed'
    if (choices.now.readings.length > 0) return choices.now.procedure ? 'failed' : 'needs-procedure'
    return choices.now.procedure ? 'needs-readings' : 'empty'
  })

  /** Takes what was chosen or dropped: JSON is the procedure, everything else readings in place of the last. */
  function take(reply: Reply<readonly OpenedFile[]>): void {
    refusal.value = reply.ok ? null : reply.problem
    if (!reply.ok || reply.value.length === 0) return
    const procedure = reply.value.filter(({ name }) => isProcedureName(name)).at(-1)
    const readings = reply.value.filter(({ name }) => !isProcedureName(name))
    const label = readings.length > 0 ? 'opening the readings' : 'choosing the procedure'
    choices.change(label, { ...(procedure && { procedure }), ...(readings.length > 0 && { readings, excluded: [] }) })
  }

  async function analyse(): Promise<void> {
    const turn = ++latest
    const { readings, procedure, excluded } = choices.now
    if (readings.length === 0 || !procedure) {
      lotAnalyzer.close()
      outcome.value = null
      busy.value = false
      return
    }
    busy.value = true
    progress.value = null
    wasCancelled.value = false
    const running = analyzeInWorker(readings, procedure, { excluded })
    running.progress((told) => (progress.value = told))
    const found = await running.result
    // What was chosen meanwhile has the word.
    if (turn !== latest) return
    performance.mark('persquare:analysed')
    busy.value = false
    if (found) outcome.value = found
    else wasCancelled.value = true
  }
  function cancel(): void {
    lotAnalyzer.close()
  }
  /** Says what the host could not do. */
  function refuse(problem: Problem): void {
    refusal.value = problem
  }
  watch(
    () => [choices.now.readings, choices.now.procedure, choices.now.excluded] as const,
    () => void analyse(),
  )

  return {
    analysis,
    pictures,
    problems,
    findings,
    refusal,
    state,
    busy,
    progress,
    wasCancelled,
    keeping,
    take,
    cancel,
    analyse,
    refuse,
  }
})
