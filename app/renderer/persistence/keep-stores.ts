/** Ties the stores to the session keeper: what was open comes back, and every change is kept. */
import { ref, watch } from 'vue'
import type { Ref } from 'vue'
import type { Host } from '../../contract/host'
import { useChoicesStore, type Choices } from '../stores/choices'
import { sessionKeeper, type Keeping } from './session-keeper'

export interface KeptSession {
  /** Whether everything is on the disk, for a word at the edge of the window. */
  readonly keeping: Ref<Keeping>
  /** What came back, and from which generation; null where there was nothing. */
  readonly restored: 'last' | 'previous' | null
}

/** Of the view: plain JSON, and put back by whoever knows what it means. */
export interface KeptView {
  read(): Readonly<Record<string, unknown>>
  restore(view: Readonly<Record<string, unknown>>): void
}

/**
 * Restores, then keeps from here on. Call once, before the files of the command line are opened: they come on top.
 *
 * @param refuse  is told what could not be brought back
 */
export async function keepStores(
  host: Host,
  view: KeptView,
  refuse: (problem: Exclude<Keeping, string>['problem']) => void,
): Promise<KeptSession> {
  const choices = useChoicesStore()
  const keeping = ref<Keeping>('kept')
  const keeper = sessionKeeper(host, (now) => (keeping.value = now))
  const reply = await keeper.restore()
  if (!reply.ok) refuse(reply.problem)
  const found = reply.ok ? reply.value : null
  if (found) {
    const { readings, procedure, excluded, decision } = found
    choices.restore({ ...choices.now, readings, procedure, excluded, decision } satisfies Choices)
    view.restore(found.view)
  }
  const keep = (): void => keeper.keep({ ...choices.now, view: view.read() })
  watch(() => [choices.now, view.read()], keep)
  // The last moment that a page surely has.
  document.addEventListener('visibilitychange', () => void keeper.flush())
  window.addEventListener('pagehide', () => void keeper.flush())
  return { keeping, restored: found?.generation ?? null }
}
