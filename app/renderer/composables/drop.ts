import { onBeforeUnmount, onMounted, ref } from 'vue'
import type { Ref } from 'vue'
import { droppedFiles, readFiles } from '../dropped-files'
import { useHost } from '../host-key'
import { useGaugeStore } from '../stores/gauge'
import { useLotStore } from '../stores/lot'
import { useViewStore } from '../stores/view'

/** Takes files and folders that are dropped anywhere on the window; true while something is held over it. */
export function useDrop(): Ref<boolean> {
  const host = useHost()
  const lot = useLotStore()
  const view = useViewStore()
  const gauge = useGaugeStore()
  const dragging = ref(false)

  function over(event: DragEvent): void {
    if (!event.dataTransfer?.types.includes('Files')) return
    event.preventDefault()
    dragging.value = true
  }
  function left(event: DragEvent): void {
    if (event.relatedTarget === null) dragging.value = false
  }
  async function dropped(event: DragEvent): Promise<void> {
    event.preventDefault()
    dragging.value = false
    performance.mark('persquare:dropped')
    if (!event.dataTransfer) return
    const files = await droppedFiles(event.dataTransfer)
    const read = await readFiles(files)
    // On the prober's own page a file is a record of the prober.
    if (view.page === 'gauge') return gauge.take(view.gauge, read)
    lot.take(read)
    await host.rememberDropped(files)
  }
  onMounted(() => {
    document.addEventListener('dragover', over)
    document.addEventListener('dragleave', left)
    document.addEventListener('drop', dropped)
  })
  onBeforeUnmount(() => {
    document.removeEventListener('dragover', over)
    document.removeEventListener('dragleave', left)
    document.removeEventListener('drop', dropped)
  })
  return dragging
}
