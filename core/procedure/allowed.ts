/** What a key may hold, in words: "a number above 0 and up to 20000 µm". */
import { isObject, kindsOf, knownKeys, optionsOf } from './key-shape'
import type { KeyPath, KeyShape } from './key-shape'
import { BARE_FILE_NAME } from './schema'

/** The unit stands at the end of a key's name; the longer ending first. */
const UNIT_ENDINGS: readonly (readonly [ending: string, unit: string])[] = [
  ['PercentPerC', '%/°C'],
  ['Percent', '%'],
  ['OhmSq', 'Ω/sq'],
  ['OhmCm', 'Ω·cm'],
  ['Cm2Vs', 'cm²/(V·s)'],
  ['Cm3', 'cm⁻³'],
  ['Deg', '°'],
  ['Mm', 'mm'],
  ['Um', 'µm'],
  ['UV', 'µV'],
  ['Rel', ''],
  ['C', '°C'],
]

/** Of the key, or of the nearest key above it that names one: `limits.waferMeanOhmSq.lower` is in Ω/sq. */
export function unitOf(path: KeyPath): string {
  if (path.includes('degreesOfFreedom')) return ''
  for (const part of [...path].reverse()) {
    const found = UNIT_ENDINGS.find(([ending]) => typeof part === 'string' && part.endsWith(ending))
    if (found) return found[1]
  }
  return ''
}

export function allowedWords(shape: KeyShape, path: KeyPath): string {
  const options = optionsOf(shape)
  if (options) return unionWords(options, path)
  if (shape.const !== undefined) return JSON.stringify(shape.const)
  if (shape.enum) return orList(shape.enum.map((value) => JSON.stringify(value)))
  switch (shape.type) {
    case 'number':
    case 'integer':
      return numberWords(shape, path)
    case 'string':
      return stringWords(shape)
    case 'array':
      return listWords(shape, path)
    case 'object':
      return `an object in braces with keys from ${knownKeys(shape).join(', ')}`
    default:
      return 'another value'
  }
}

function unionWords(options: readonly KeyShape[], path: KeyPath): string {
  const kinds = kindsOf({ anyOf: options })
  if (kinds.length > 0) {
    return `an object in braces whose "kind" is ${orList(kinds.map((kind) => JSON.stringify(kind)))}`
  }
  return options.map((option) => allowedWords(option, path)).join(', or ')
}

function numberWords(shape: KeyShape, path: KeyPath): string {
  const unit = unitOf(path)
  const noun = shape.type === 'integer' ? 'a whole number' : 'a number'
  const words = `${noun}${rangeWords(shape)}${unit === '' ? '' : ` ${unit}`}`
  const isFraction =
    !path.includes('degreesOfFreedom') && path.some((part) => typeof part === 'string' && part.endsWith('Rel'))
  return isFraction ? `${words} (a fraction: 0.01 is 1 %)` : words
}

function rangeWords({ minimum, exclusiveMinimum, maximum }: KeyShape): string {
  const top = maximum === undefined ? '' : shortNumber(maximum)
  if (exclusiveMinimum !== undefined) {
    return ` above ${shortNumber(exclusiveMinimum)}${top === '' ? '' : ` and up to ${top}`}`
  }
  if (minimum === undefined) return top === '' ? '' : ` up to ${top}`
  return top === '' ? ` of at least ${shortNumber(minimum)}` : ` from ${shortNumber(minimum)} to ${top}`
}

/** As a procedure would write it: 20000, 1e22. */
export function shortNumber(value: number): string {
  return Math.abs(value) >= 1e6 ? value.toExponential().replace('e+', 'e') : String(value)
}

function stringWords({ minLength, maxLength, pattern }: KeyShape): string {
  if (pattern === BARE_FILE_NAME.source) return 'the bare name of a file beside the procedure, without /, \\, : or ..'
  if (maxLength !== undefined) return `a text of at most ${maxLength} characters`
  return minLength === undefined ? 'a text' : 'a text that is not empty'
}

function listWords(shape: KeyShape, path: KeyPath): string {
  const entry = shape.prefixItems?.[0] ?? (isObject(shape.items) ? (shape.items as KeyShape) : {})
  const count = shape.prefixItems ? `${shape.prefixItems.length} values` : 'values'
  return `a list in square brackets of ${count}, each ${allowedWords(entry, path)}`
}

/** `"a", "b" or "c"` */
export function orList(words: readonly string[]): string {
  if (words.length < 2) return words.join('')
  return `${words.slice(0, -1).join(', ')} or ${words[words.length - 1]}`
}
