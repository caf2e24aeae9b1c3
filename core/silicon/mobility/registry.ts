/** Every mobility model; menus, help, footnotes and the procedure's schema read this list. */
import { CoreError } from '../../problems/problem'
import type { MobilityModel } from '../mobility-model'
import { arora } from './arora'
import { caugheyThomas } from './caughey-thomas'
import { constant, constantMobility } from './constant'
import type { ConstantMobilities } from './constant'
import { klaassen } from './klaassen'
import { masetti } from './masetti'
import { mf723 } from './mf723'

export const mobilityModels = [
  masetti,
  arora,
  caugheyThomas,
  klaassen,
  constant,
  mf723,
] as const satisfies readonly MobilityModel[]

export type MobilityId = (typeof mobilityModels)[number]['id']

type IdsOf<Models extends readonly { readonly id: string }[]> = { readonly [K in keyof Models]: Models[K]['id'] }

/** The ids in menu order, as literals. */
export const mobilityIds = mobilityModels.map((model) => model.id) as unknown as IdsOf<typeof mobilityModels>

/**
 * The model of an id. `constants` is for the model `constant` alone, which can't do without.
 *
 * @throws CoreError unknown-id; not-applicable when `constant` has no numbers; out-of-range when they are not positive
 */
export function mobilityModel(id: MobilityId, constants?: ConstantMobilities): MobilityModel {
  const model: MobilityModel | undefined = mobilityModels.find((entry) => entry.id === id)
  if (model === undefined) throw new CoreError({ kind: 'unknown-id', family: 'mobility model', id, known: mobilityIds })
  if (model !== constant) return model
  if (constants === undefined) {
    throw new CoreError({
      kind: 'not-applicable',
      what: 'constant mobility',
      why: 'it needs two numbers: the mobility of electrons and the mobility of holes, in cm^2/(V s)',
    })
  }
  return constantMobility(constants)
}
