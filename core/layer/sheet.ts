import { CoreError } from '../problems/problem'
import type { LayerKind } from './layer-kind'

/** Sheet resistance as the result itself: nothing is derived from it. */
export const sheet = {
  id: 'sheet',
  title: 'Sheet resistance only',
  gives: [],
  concentrationMeans: '',
  formula: 'R_s is the result itself',
  sources: [],
  conductsThroughWafer: false,
  prepare: () => ({
    range_ohm_sq: { min: 0, max: Infinity },
    invert(_sheets, into) {
      for (const column of Object.values(into) as Float64Array[]) column.fill(NaN)
    },
    forward() {
      throw new CoreError({
        kind: 'not-applicable',
        what: 'sheet resistance from a layer',
        why: 'the layer kind "sheet" knows nothing of what lies under the sheet resistance',
      })
    },
    explain: () => [],
  }),
} as const satisfies LayerKind<object>
