/** Arguments turned into numbers, for commands whose options are quantities. */
import { parseArgs } from 'node:util'
import { CoreError } from '../../core/problems/problem'

export type OptionKinds = Readonly<Record<string, { readonly type: 'string' | 'boolean' }>>

type Values<Kinds extends OptionKinds> = {
  readonly [Name in keyof Kinds]?: Kinds[Name]['type'] extends 'boolean' ? boolean : string
}

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i

/**
 * The options by name. `--x-mm -60` is understood as well as `--x-mm=-60`; an option given twice is refused.
 * @throws CoreError bad-argument
 */
export function namedOptions<const Kinds extends OptionKinds>(args: readonly string[], options: Kinds): Values<Kinds> {
  try {
    const { values, tokens } = parseArgs({ args: withNegatives(args), options, tokens: true })
    const names = tokens.flatMap((token) => (token.kind === 'option' ? [token.name] : []))
    const doubled = names.find((name, at) => names.indexOf(name) !== at)
    if (doubled !== undefined) refuse(`--${doubled}`, 'it is given twice')
    return values as Values<Kinds>
  } catch (error) {
    if (error instanceof CoreError) throw error
    return refuseAsNode(error, args)
  }
}

/** What Node says of an argument it can't read, in our words. */
export function refuseAsNode(error: unknown, args: readonly string[]): never {
  const message = error instanceof Error ? (error.message.split('\n')[0] ?? '') : String(error)
  const name = /'(--?[\w-]+)/.exec(message)?.[1] ?? args.join(' ')
  const isValueMissing = /argument (missing|is ambiguous)/.test(message)
  if (isValueMissing) refuse(name, 'it needs a value after it')
  if (message.startsWith('Unknown option')) refuse(name, 'there is no such option; --help after the command lists them')
  const stray = /^Unexpected argument '(.*)'/.exec(message)?.[1]
  if (stray !== undefined) refuse(stray, 'the command takes options alone; --help after it lists them')
  return refuse(name, message)
}

/** A value that begins with a minus sign would be taken for an option; joined to its name it is not. Ours have long names alone. */
function withNegatives(args: readonly string[]): string[] {
  const joined: string[] = []
  for (const arg of args) {
    const before = joined.at(-1)
    const isValue = /^-[^-]/.test(arg) && before !== undefined && /^--[^=]+$/.test(before)
    if (isValue) joined[joined.length - 1] = `${before}=${arg}`
    else joined.push(arg)
  }
  return joined
}

/** @throws CoreError bad-argument unless it is a finite number in the usual writing */
export function numberOf(name: string, text: string): number {
  const value = NUMBER.test(text) ? Number(text) : NaN
  return Number.isFinite(value) ? value : refuse(`--${name}`, `"${text}" is not a number, such as 92.4 or 1e16`)
}

export function refuse(argument: string, why: string): never {
  throw new CoreError({ kind: 'bad-argument', argument, why })
}
