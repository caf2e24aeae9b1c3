/** Procedures made blindly from the schema's own shape: whatever the schema passes, sense or none. */
import fc from 'fast-check'
import { optionsOf, procedureShape, type KeyShape } from '../../core/procedure/key-shape'
import { decades, soundProcedures, type Json } from './sound-procedures'

/** Any value that the shape allows: at the borders of its ranges as often as between them. */
export function valuesOf(shape: KeyShape): fc.Arbitrary<Json> {
  const options = optionsOf(shape)
  if (options) return fc.oneof(...options.map(valuesOf))
  if (shape.const !== undefined) return fc.constant(shape.const as Json)
  if (shape.enum) return fc.constantFrom(...(shape.enum as Json[]))
  switch (shape.type) {
    case 'number':
    case 'integer':
      return numbersOf(shape)
    case 'string':
      return fc.string({ minLength: shape.minLength ?? 0, maxLength: Math.min(shape.maxLength ?? 20, 20) })
    case 'array':
      return listsOf(shape)
    case 'object':
      return objectsOf(shape)
    default:
      return fc.constant(null)
  }
}

function numbersOf({ type, minimum, exclusiveMinimum, maximum }: KeyShape): fc.Arbitrary<number> {
  const min = minimum ?? exclusiveMinimum ?? -1e300
  const max = maximum ?? 1e300
  if (type === 'integer') return fc.integer({ min: Math.max(min, -(2 ** 31)), max: Math.min(max, 2 ** 31 - 1) })
  const least = exclusiveMinimum === undefined ? min : Math.max(Number.MIN_VALUE, exclusiveMinimum)
  const spread = max > 0 ? [decades(Math.max(least, 1e-9, max * 1e-12), max)] : []
  return fc.oneof(fc.constantFrom(least, max), fc.double({ min: least, max, noNaN: true }), ...spread)
}

function listsOf({ prefixItems, items }: KeyShape): fc.Arbitrary<Json> {
  if (prefixItems) return fc.tuple(...prefixItems.map(valuesOf))
  return fc.array(items ? valuesOf(items) : fc.constant(null), { maxLength: 6 })
}

function objectsOf({ properties, propertyNames, additionalProperties, required = [] }: KeyShape): fc.Arbitrary<Json> {
  if (properties) {
    const entries = Object.entries(properties).map(([key, shape]) => [key, valuesOf(shape)] as const)
    return fc.record(Object.fromEntries(entries), { requiredKeys: [...required] }) as fc.Arbitrary<Json>
  }
  const keys = fc.constantFrom(...(propertyNames?.enum ?? ['x']).map(String))
  return fc.dictionary(keys, additionalProperties ? valuesOf(additionalProperties) : fc.constant(null), { maxKeys: 3 })
}

export const shapedProcedures: fc.Arbitrary<Json> = valuesOf(procedureShape)

/** A sound procedure with one section that only the schema has looked at. */
export const halfShapedProcedures: fc.Arbitrary<Json> = fc
  .tuple(
    soundProcedures,
    fc.constantFrom('wafer', 'probe', 'layer', 'temperature', 'limits', 'dieGrid', 'uncertainty', 'reported'),
  )
  .chain(([sound, section]) =>
    valuesOf(procedureShape.properties![section]).map((value) => ({
      ...(sound as { [key: string]: Json }),
      [section]: value,
    })),
  )
