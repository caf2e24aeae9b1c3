import { onBeforeUnmount, onMounted } from 'vue'
import type { CommandId } from '../../contract/commands'
import type { FileChoice } from '../../contract/file-kinds'
import { useHost } from '../host-key'
import { useChoicesStore, NO_CHOICES } from '../stores/choices'
import { useLotStore } from '../stores/lot'
import { useSelectionStore } from '../stores/selection'
import { useViewStore } from '../stores/view'

/** What the native menus command, where the host has some. */
export function useCommands(): void {
  const host = useHost()
  const lot = useLotStore()
  const view = useViewStore()
  const selection = useSelectionStore()
  const choices = useChoicesStore()

  async function choose(choice: FileChoice): Promise<void> {
    lot.take(await host.chooseFiles(choice))
  }
  function goOut(way: 1 | -1): void {
    selection.stepOut(way)
    if (selection.site !== null) view.page = 'wafer'
  }
  function handOver(request: typeof view.request): void {
    if (!lot.analysis) return
    view.page = 'hand-over'
    view.request = request
  }
  const actions: Readonly<Record<CommandId, () => void>> = {
    'open-readings': () => void choose('readings'),
    'open-folder': () => void choose('folder'),
    'open-procedure': () => void choose('procedure'),
    'open-demo': () => void host.demoFiles().then(lot.take),
    'save-report': () => handOver('save'),
    'print-report': () => handOver('print'),
    'close-lot': () => choices.change('closing the lot', NO_CHOICES),
    undo: choices.undo,
    redo: choices.redo,
    find: () => (view.dialog = lot.analysis ? 'find' : null),
    'previous-wafer': () => selection.stepWafer(-1),
    'next-wafer': () => selection.stepWafer(1),
    'next-out-of-spec': () => goOut(1),
    'previous-out-of-spec': () => goOut(-1),
    'zoom-in': () => (view.zoomed = { factor: 1.5 }),
    'zoom-out': () => (view.zoomed = { factor: 1 / 1.5 }),
    'zoom-whole': () => (view.zoomed = { factor: 0 }),
    'theme-system': () => (view.theme = 'system'),
    'theme-light': () => (view.theme = 'light'),
    'theme-dark': () => (view.theme = 'dark'),
    'show-keys': () => (view.dialog = 'help'),
  }
  let stop = (): void => undefined
  onMounted(() => (stop = host.onCommand((command) => actions[command]())))
  onBeforeUnmount(() => stop())
}
