import { CoreError } from '../../problems/problem'
import type { LayerProfile } from './profile'

/** The same density down to the junction, where it ends at once. */
export const uniform = {
  id: 'uniform',
  title: 'Uniform (a box)',
  formula: 'N(η) = N_s',
  source: 'the definition of resistivity: R_s · t = 1 / (q µ n)',
  shape: () => () => 1,
  depthOf: () => 1,
  mean: () => 1,
  depthFormula: '',
  lengthSymbol: '',
  depthInLengths: refuseLength,
  depthResponse: refuseLength,
} as const satisfies LayerProfile

function refuseLength(): never {
  throw new CoreError({
    kind: 'not-applicable',
    what: 'junction depth of a uniform layer',
    why: 'no diffusion makes it: its depth is given, not derived',
  })
}
