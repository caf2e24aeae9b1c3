import { fourTerminalSum, TERMINALS } from './four-terminal'
import type { Configuration } from './four-terminal'
import { pinOffsets_mm } from './pin-line'
import type { PinSpacings } from './pin-line'
import { slabTerm, thinShare } from './slab'
import type { Back } from './slab'

/** T of the four pins (see `four-terminal.ts`): for w -> 0, for this thickness per rho/w, and dT/d ln w of the latter. */
export interface SlabLine {
  readonly thin: number
  readonly slab: number
  readonly slope: number
}

/** An in-line probe far from every edge of a slab; any spacings, thickness in their unit. */
export function slabLine(spacings: PinSpacings, thickness: number, back: Back, configuration: Configuration): SlabLine {
  const offsets = pinOffsets_mm(spacings)
  const terminals = TERMINALS[configuration]
  const distance = (i: number, j: number) => Math.abs(offsets[i] - offsets[j])
  const thin = fourTerminalSum(terminals, (i, j) => Math.log(distance(i, j)))
  const excess = fourTerminalSum(terminals, (i, j) => slabTerm(distance(i, j) / thickness, back).value)
  const slope = -fourTerminalSum(terminals, (i, j) => slabTerm(distance(i, j) / thickness, back).slope)
  return { thin, slab: thinShare(back) * thin + excess, slope }
}
