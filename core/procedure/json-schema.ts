/** The procedure's format as JSON Schema (draft 2020-12), so that any editor can check and explain a procedure. */
import { unitOf } from './allowed'
import { optionsOf, procedureShape } from './key-shape'
import type { KeyPath, KeyShape } from './key-shape'
import { meaningOf } from './keys'
import { PROCEDURE_FORMAT } from './schema'

/**
 * Made from the schema that procedures are read with, each key with its meaning and unit. What needs more than one key,
 * such as a lower limit above the upper, is checked by the program alone.
 */
export function procedureJsonSchema(): object {
  const { $schema, ...shape } = described(procedureShape, []) as KeyShape & { readonly $schema: string }
  const title = `Persquare procedure (${PROCEDURE_FORMAT})`
  const description = 'Everything that is decided before a sheet resistance measurement'
  return { $schema, title, description, ...shape }
}

function described(shape: KeyShape, path: KeyPath): KeyShape & { readonly description?: string } {
  const options = optionsOf(shape)
  const key = shape.anyOf ? 'anyOf' : 'oneOf'
  const description = descriptionOf(path)
  return {
    ...(description === '' ? {} : { description }),
    ...withChildren(shape, path),
    ...(options && { [key]: options.map((option) => withChildren(option, path)) }),
  }
}

/** Without a description of its own: the options of one key share it. */
function withChildren(shape: KeyShape, path: KeyPath): KeyShape {
  const { properties, additionalProperties } = shape
  return {
    ...shape,
    ...(properties && { properties: propertiesOf(properties, path) }),
    ...(additionalProperties && { additionalProperties: described(additionalProperties, [...path, '*']) }),
  }
}

function propertiesOf(properties: NonNullable<KeyShape['properties']>, path: KeyPath): Record<string, KeyShape> {
  return Object.fromEntries(Object.entries(properties).map(([key, shape]) => [key, described(shape, [...path, key])]))
}

/** "Diameter of the disc; without it the sheet counts as endless [mm]" */
function descriptionOf(path: KeyPath): string {
  const meaning = meaningOf(path.join('.'))
  if (meaning === '') return ''
  const unit = path.some((part) => String(part).endsWith('Rel')) ? 'a fraction: 0.01 is 1 %' : unitOf(path)
  return `${meaning.charAt(0).toUpperCase()}${meaning.slice(1)}${unit === '' ? '' : ` [${unit}]`}`
}
