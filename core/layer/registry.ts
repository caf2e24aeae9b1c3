/** Every layer kind; menus, help, report footnotes and the procedure read this list. */
import { CoreError } from '../problems/problem'
import { bulk } from './bulk'
import { dopedLayer } from './doped-layer'
import { film } from './film'
import { implant } from './implant'
import type { LayerKind } from './layer-kind'
import { sheet } from './sheet'

export const layerKinds = [sheet, bulk, dopedLayer, implant, film] as const satisfies readonly LayerKind<never>[]

export type LayerKindId = (typeof layerKinds)[number]['id']

type KindOf<Id extends LayerKindId> = Extract<(typeof layerKinds)[number], { readonly id: Id }>

/**
 * The kind of an id, with its own settings type.
 *
 * @throws CoreError unknown-id
 */
export function layerKind<Id extends LayerKindId>(id: Id): KindOf<Id> {
  const kind = layerKinds.find((entry) => entry.id === id)
  if (kind === undefined) {
    throw new CoreError({ kind: 'unknown-id', family: 'layer kind', id, known: layerKinds.map((entry) => entry.id) })
  }
  return kind as KindOf<Id>
}
