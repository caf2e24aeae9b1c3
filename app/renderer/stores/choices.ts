import { defineStore } from 'pinia'
import { computed, shallowRef } from 'vue'
import type { Exclusion } from '../../../core/analysis/exclusions'
import type { Decision } from '../../../core/report/decision'
import type { OpenedFile } from '../../contract/host'

/** A decision in the making. */
export interface DecisionDraft {
  readonly decision: Decision['decision'] | null
  readonly name: string
  readonly comment: string
  /** ISO 8601, when it was made; null until then. */
  readonly date: string | null
}

/** Everything that a person brought in or decided; replaced whole, never changed in place. */
export interface Choices {
  readonly readings: readonly OpenedFile[]
  readonly procedure: OpenedFile | null
  readonly excluded: readonly Exclusion[]
  readonly decision: DecisionDraft
}

export const NO_DECISION: DecisionDraft = { decision: null, name: '', comment: '', date: null }
export const NO_CHOICES: Choices = { readings: [], procedure: null, excluded: [], decision: NO_DECISION }
const MOST_STEPS = 200

interface Step {
  readonly label: string
  readonly before: Choices
  readonly after: Choices
}

/** The one place that what a person chose is kept, with every step to go back. */
export const useChoicesStore = defineStore('choices', () => {
  const now = shallowRef<Choices>(NO_CHOICES)
  const past = shallowRef<readonly Step[]>([])
  const future = shallowRef<readonly Step[]>([])
  /** What was last handed over: saved as a report or a result. */
  const handedOver = shallowRef<Choices>(NO_CHOICES)

  const undoLabel = computed(() => past.value.at(-1)?.label ?? null)
  const redoLabel = computed(() => future.value.at(-1)?.label ?? null)
  /** Whether there is work of a person that stands in no file yet. */
  const isUnsaved = computed(() => {
    const { excluded, decision } = now.value
    return now.value !== handedOver.value && (excluded.length > 0 || decision.decision !== null)
  })

  /** Typing into the same field again goes on with the last step instead of adding one a letter. */
  function change(label: string, part: Partial<Choices>, goesOn = false): void {
    const after = { ...now.value, ...part }
    const last = past.value.at(-1)
    const joined = goesOn && last?.label === label && last.after === now.value
    const step: Step = { label, before: joined ? last.before : now.value, after }
    past.value = [...(joined ? past.value.slice(0, -1) : past.value), step].slice(-MOST_STEPS)
    future.value = []
    now.value = after
  }
  function undo(): void {
    const step = past.value.at(-1)
    if (!step) return
    past.value = past.value.slice(0, -1)
    future.value = [...future.value, step]
    now.value = step.before
  }
  function redo(): void {
    const step = future.value.at(-1)
    if (!step) return
    future.value = future.value.slice(0, -1)
    past.value = [...past.value, step]
    now.value = step.after
  }
  /** Puts back what an earlier run of the program had; there is nothing to undo from then. */
  function restore(choices: Choices): void {
    now.value = choices
    past.value = []
    future.value = []
  }
  function markHandedOver(): void {
    handedOver.value = now.value
  }

  return { now, undoLabel, redoLabel, isUnsaved, change, undo, redo, restore, markHandedOver }
})
