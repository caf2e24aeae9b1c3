import { computed, onBeforeUnmount, shallowRef, watch, type ComputedRef } from 'vue'
import type { Outline } from '../../../core/wafer/outline'
import { painted, type MapModel } from '../figures/map-model'
import { createTaskRunner } from '../tasks/run-task'

/** A map whose sites are too many to be joined here shows them alone until a worker has joined them. */
export function useJoinedMap(model: () => MapModel | null, outline: () => Outline): ComputedRef<MapModel | null> {
  const runner = createTaskRunner()
  const joined = shallowRef<{ readonly of: MapModel; readonly model: MapModel } | null>(null)

  async function join(bare: MapModel | null): Promise<void> {
    if (!bare?.toJoin) return
    const { scale, toJoin: sites, places } = bare
    const order = { outline: outline(), scale, sites, detail: 'large' } as const
    // Without a surface, whatever the reason, the sites alone stay.
    const surface = await runner.run('wafer-surface', order).result.catch(() => null)
    if (model() !== bare) return
    joined.value = {
      of: bare,
      model: { ...bare, ...painted(surface, scale, places.value.length, 'large'), toJoin: null },
    }
  }
  watch(model, (bare) => void join(bare), { immediate: true })
  onBeforeUnmount(runner.close)

  return computed(() => (joined.value?.of === model() ? joined.value.model : model()))
}
