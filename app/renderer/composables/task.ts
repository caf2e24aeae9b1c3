import { onBeforeUnmount, ref, shallowRef, type Ref, type ShallowRef } from 'vue'
import type { TaskInput, TaskName, TaskOutput } from '../tasks/register'
import { createTaskRunner } from '../tasks/run-task'

export interface Task<Name extends TaskName> {
  /** Of the newest call that came to an end; null before, and where it gives nothing. */
  readonly output: ShallowRef<TaskOutput<Name> | null>
  /** Done so far, 0 to 1; null while nothing runs. */
  readonly share: Ref<number | null>
  readonly failure: Ref<string>
  run(input: TaskInput<Name>): Promise<void>
  cancel(): void
  /** Drops what was found, and ends what runs. */
  forget(): void
}

/** A task of the register that one part of the window has done, with what is to be seen of it. */
export function useTask<Name extends TaskName>(name: Name): Task<Name> {
  const runner = createTaskRunner()
  const output = shallowRef<TaskOutput<Name> | null>(null)
  const share = ref<number | null>(null)
  const failure = ref('')
  let turn = 0

  async function run(input: TaskInput<Name>): Promise<void> {
    const mine = ++turn
    share.value = 0
    failure.value = ''
    try {
      const found = await runner.run(name, input, (told) => (share.value = told)).result
      if (mine === turn) output.value = found
    } catch (error) {
      if (mine === turn) failure.value = error instanceof Error ? error.message : String(error)
    }
    if (mine === turn) share.value = null
  }
  function cancel(): void {
    turn++
    share.value = null
    runner.close()
  }
  function forget(): void {
    cancel()
    output.value = null
    failure.value = ''
  }
  onBeforeUnmount(cancel)
  return { output, share, failure, run, cancel, forget }
}
