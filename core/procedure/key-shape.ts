/** The procedure's keys as a tree to walk, made from the schema, so that no key is listed a second time. */
import { z } from 'zod'
import { procedureSchema } from './schema'

/** The part of JSON Schema that the procedure's schema comes out as. */
export interface KeyShape {
  readonly type?: string
  readonly const?: unknown
  readonly enum?: readonly unknown[]
  readonly default?: unknown
  readonly properties?: Readonly<Record<string, KeyShape>>
  readonly required?: readonly string[]
  readonly additionalProperties?: KeyShape | false
  readonly propertyNames?: KeyShape
  readonly anyOf?: readonly KeyShape[]
  readonly oneOf?: readonly KeyShape[]
  readonly items?: KeyShape | false
  readonly prefixItems?: readonly KeyShape[]
  readonly minimum?: number
  readonly exclusiveMinimum?: number
  readonly maximum?: number
  readonly minLength?: number
  readonly maxLength?: number
  readonly pattern?: string
}

export type KeyPath = readonly (string | number)[]

export const procedureShape = z.toJSONSchema(procedureSchema, { io: 'input' }) as KeyShape

/** `probe.pinSpacingsMm[1]` */
export function dotted(path: KeyPath): string {
  return path.reduce<string>(
    (text, part) => (typeof part === 'number' ? `${text}[${part}]` : text === '' ? part : `${text}.${part}`),
    '',
  )
}

export function optionsOf(shape: KeyShape): readonly KeyShape[] | null {
  return shape.anyOf ?? shape.oneOf ?? null
}

/** What tells the shapes of a union apart, where it is their `kind`. */
export function kindsOf(shape: KeyShape): readonly unknown[] {
  return (optionsOf(shape) ?? []).flatMap((option) => option.properties?.['kind']?.const ?? [])
}

/** The keys an object of this shape may hold. */
export function knownKeys(shape: KeyShape): readonly string[] {
  if (shape.properties) return Object.keys(shape.properties)
  return (shape.propertyNames?.enum ?? []).map(String)
}

/** Of several shapes, the one that the value was meant as. */
export function meantShape(shape: KeyShape, value: unknown): KeyShape {
  const options = optionsOf(shape)
  if (options === null || !isObject(value)) return shape
  const objects = options.filter((option) => option.type === 'object')
  return objects.find((option) => option.properties?.['kind']?.const === value['kind']) ?? objects[0] ?? shape
}

/** The shape at a path; `value` is the whole procedure as written and settles which layer kind is meant. */
export function shapeAt(path: KeyPath, value: unknown): KeyShape {
  let shape = procedureShape
  let here = value
  for (const part of path) {
    const kinds = part === 'kind' ? kindsOf(shape) : []
    if (kinds.length > 0) return { enum: kinds }
    const meant = meantShape(shape, here)
    const next = typeof part === 'number' ? (meant.prefixItems?.[part] ?? meant.items) : childShape(meant, part)
    shape = next === undefined || next === false ? {} : next
    here = valueUnder(here, part)
  }
  return shape
}

function childShape(shape: KeyShape, key: string): KeyShape | false | undefined {
  const properties = shape.properties ?? {}
  return Object.hasOwn(properties, key) ? properties[key] : shape.additionalProperties
}

export function valueAt(path: KeyPath, value: unknown): unknown {
  return path.reduce(valueUnder, value)
}

function valueUnder(value: unknown, part: string | number): unknown {
  return typeof value === 'object' && value !== null && Object.hasOwn(value, part)
    ? (value as Record<string | number, unknown>)[part]
    : undefined
}

export function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}
