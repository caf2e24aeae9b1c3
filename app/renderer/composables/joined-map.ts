import { computed, onBeforeUnmount, shallowRef, watch, type ComputedRef } from 'vue'
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import { painted, type MapModel } from '../figures/map-model'
import { createTaskRunner } from '../tasks/run-task'

/** A map whose sites are too many to be joined here shows them alone until a worker has joined them. */
export function useJoinedMap(model: () => MapModel | null, analysis: () => LotAnalysis): ComputedRef<MapModel | null> {
  const runner = createTaskRunner()
  const joined = shallowRef<{ readonly of: MapModel; readonly model: MapModel } | null>(null)

  async function join(bare: MapModel | null): Promise<void> {
    if (!bare?.toJoin) return
    const { scale, toJoin: sites, places } = bare
    const { outline, procedure } = analysis()
    const { interpolation } = procedure.map
    const order = { outline, scale, sites, detail: 'large', interpolation } as const
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
