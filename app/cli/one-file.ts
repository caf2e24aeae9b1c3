/** Arguments of a command that reads one file and prints what it found: the file's path and the named options. */
import { parseArgs } from 'node:util'
import { CoreError } from '../../core/problems/problem'
import { refuse, refuseAsNode, type OptionKinds } from './convert-arguments'

type Values<Kinds extends OptionKinds> = {
  readonly [Name in keyof Kinds]?: Kinds[Name]['type'] extends 'boolean' ? boolean : string
}

/** @throws CoreError bad-argument */
export function oneFile<const Kinds extends OptionKinds>(
  args: readonly string[],
  options: Kinds,
  what: string,
): { readonly path: string; readonly given: Values<Kinds> } {
  try {
    const { values, positionals } = parseArgs({ args: [...args], allowPositionals: true, options })
    if (positionals.length === 0) refuse('FILE', `name ${what}`)
    if (positionals.length > 1) refuse(positionals[1], 'one file is read at a time')
    return { path: positionals[0], given: values as Values<Kinds> }
  } catch (error) {
    if (error instanceof CoreError) throw error
    return refuseAsNode(error, args)
  }
}
