/** Where the millimetre axes of a map have their ticks. */
import { niceTicks } from '../../../core/report/figures/ticks'
import { formatFixed } from '../../../core/units/format'
import type { ScreenPlane } from './plane'

export interface AxisTick {
  readonly at: number
  readonly label: string
}

const PIXELS_A_TICK = 90
const AXIS_SPACE = { left: 40, bottom: 26 }

export function axisTicks(plane: ScreenPlane): { readonly x: readonly AxisTick[]; readonly y: readonly AxisTick[] } {
  const { left_mm, right_mm, bottom_mm, top_mm } = plane.window
  const across = niceTicks(left_mm, right_mm, plane.width / PIXELS_A_TICK)
  const up = niceTicks(bottom_mm, top_mm, plane.height / PIXELS_A_TICK)
  return {
    x: across.values
      .map((value) => ({ at: plane.x(value), label: formatFixed(value, across.decimals) }))
      .filter(({ at }) => at > AXIS_SPACE.left + 10 && at < plane.width - 74),
    y: up.values
      .map((value) => ({ at: plane.y(value), label: formatFixed(value, up.decimals) }))
      .filter(({ at }) => at > 12 && at < plane.height - AXIS_SPACE.bottom - 8),
  }
}
