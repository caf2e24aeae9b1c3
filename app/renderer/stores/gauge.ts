import { defineStore } from 'pinia'
import { computed, ref, shallowRef } from 'vue'
import { checkHistory, type CheckResult } from '../../../core/check-wafer/check'
import { readHistory } from '../../../core/check-wafer/history'
import { gaugeStudy, type GaugeStudy } from '../../../core/gauge/gauge-study'
import { readOccasions } from '../../../core/gauge/occasions'
import type { TableFile } from '../../../core/ingest/named-table'
import { CoreError, type Problem } from '../../../core/problems/problem'
import type { OpenedFile, Reply } from '../../contract/host'
import { sha256 } from '../formats/files'
import { useLotStore } from './lot'
import type { GaugeTab } from './view'

/** What a file came to: its result, and what is wrong with it. */
export interface Worked<Result> {
  readonly result: Result | null
  readonly problems: readonly Problem[]
}

/** The prober's own records, looked at without a lot; what the open lot names stands in for a file that isn't chosen. */
export const useGaugeStore = defineStore('gauge', () => {
  const lot = useLotStore()
  const studyFile = shallowRef<TableFile | null>(null)
  const historyFile = shallowRef<TableFile | null>(null)
  /** '' is all probes pooled. */
  const probe = ref('')
  const tolerance = ref<{ lower: number | null; upper: number | null }>({ lower: null, upper: null })
  const baseline = ref<number | null>(null)
  const accepted = ref<number | null>(null)
  const width = ref<number | null>(2)

  const occasions = computed(() => studyFile.value && readOccasions(studyFile.value))
  const study = computed((): Worked<GaugeStudy> => {
    if (!occasions.value) return { result: lot.analysis?.gauge ?? null, problems: [] }
    const { occasions: read, problems } = occasions.value
    const { lower, upper } = tolerance.value
    const limits = lower !== null && upper !== null ? { lower, upper } : null
    return worked(problems, () => read && gaugeStudy(read, { probe: probe.value || null, tolerance: limits }))
  })

  const readRows = computed(() => historyFile.value && readHistory(historyFile.value))
  const check = computed((): Worked<CheckResult> => {
    if (!readRows.value) return { result: lot.analysis?.check?.result ?? null, problems: [] }
    const { history, problems } = readRows.value
    const options = { baseline: baseline.value, accepted: accepted.value, width: width.value ?? 2 }
    return worked(problems, () => history && checkHistory(history, options))
  })

  /** The last file of those chosen or dropped, in place of the one before. */
  async function take(kind: GaugeTab, reply: Reply<readonly OpenedFile[]>): Promise<void> {
    if (!reply.ok) return lot.refuse(reply.problem)
    const opened = reply.value.at(-1)
    if (!opened) return
    const file = { ...opened, sha256: await sha256(opened.bytes) }
    if (kind === 'study') {
      studyFile.value = file
      probe.value = ''
    } else {
      historyFile.value = file
      baseline.value = null
      accepted.value = null
    }
  }

  return { studyFile, historyFile, probe, tolerance, baseline, accepted, width, study, check, take }
})

function worked<Result>(problems: readonly Problem[], work: () => Result | null): Worked<Result> {
  try {
    return { result: work(), problems }
  } catch (error) {
    if (error instanceof CoreError) return { result: null, problems: [...problems, error.problem] }
    throw error
  }
}
