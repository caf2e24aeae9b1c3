/** Every profile a doped layer may have; menus, help, footnotes and the procedure read this list. */
import { CoreError } from '../../problems/problem'
import type { ProfileId } from '../layer-kind'
import { erfc } from './erfc'
import { exponential } from './exponential'
import { gaussian } from './gaussian'
import type { LayerProfile } from './profile'
import { uniform } from './uniform'

export const layerProfiles = [uniform, gaussian, erfc, exponential] as const satisfies readonly LayerProfile[]

/** @throws CoreError unknown-id */
export function layerProfile(id: ProfileId): LayerProfile {
  const profile = layerProfiles.find((entry) => entry.id === id)
  if (profile === undefined) {
    throw new CoreError({ kind: 'unknown-id', family: 'profile', id, known: layerProfiles.map((entry) => entry.id) })
  }
  return profile
}
