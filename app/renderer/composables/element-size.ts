import { onBeforeUnmount, ref, watch } from 'vue'
import type { Ref } from 'vue'

/** Width and height of an element in CSS pixels, kept up to date. */
export function useElementSize(element: Ref<HTMLElement | null>): { width: Ref<number>; height: Ref<number> } {
  const width = ref(0)
  const height = ref(0)
  const observer = new ResizeObserver(([entry]) => {
    if (!entry) return
    width.value = Math.round(entry.contentRect.width)
    height.value = Math.round(entry.contentRect.height)
  })
  watch(
    element,
    (now, before) => {
      if (before) observer.unobserve(before)
      if (now) observer.observe(now)
    },
    { immediate: true },
  )
  onBeforeUnmount(() => observer.disconnect())
  return { width, height }
}
