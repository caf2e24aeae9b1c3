/** A procedure's file as a form sees it: a field a key, and back to the file's text. The file stays the truth. */
import type { ColumnId } from '../../../core/ingest/readings'
import { isObject, kindsOf, optionsOf, procedureShape, shapeAt, valueAt } from '../../../core/procedure/key-shape'
import type { KeyPath, KeyShape } from '../../../core/procedure/key-shape'
import { meaningOf, procedureKeys } from '../../../core/procedure/keys'
import type { ProcedureKey } from '../../../core/procedure/keys'
import { PROCEDURE_FORMAT } from '../../../core/procedure/schema'
import { textOf } from './files'

export type Written = Readonly<Record<string, unknown>>

export const NEW_PROCEDURE: Written = { format: PROCEDURE_FORMAT, title: '' }
export const NEW_PROCEDURE_NAME = 'new.procedure.json'

/** Null where the text is no JSON object: then it can only be mended as text. */
export function readWritten(bytes: Uint8Array): Written | null {
  try {
    const parsed: unknown = JSON.parse(textOf(bytes).replace(/^\uFEFF/, ''))
    return isObject(parsed) ? parsed : null
  } catch {
    return null
  }
}

export function writtenText(written: Written): string {
  return `${JSON.stringify(written, null, 2)}\n`
}

/** A copy with one key set; undefined takes it out, and with it the objects that it leaves empty. */
export function withKey(written: Written, path: KeyPath, value: unknown): Written {
  const [first, ...rest] = path
  const { [first]: before, ...others } = written as Record<string | number, unknown>
  if (rest.length === 0) return value === undefined ? others : { ...written, [first]: value }
  const inside = withKey(isObject(before) ? before : {}, rest, value)
  return Object.keys(inside).length === 0 ? others : { ...written, [first]: inside }
}

/** A copy that says which of the file's columns is which of ours; a header stands for one column only. */
export function withColumn(written: Written, column: ColumnId, header: string, unit: string | null): Written {
  const columns = valueAt(['readings', 'columns'], written)
  const others = isObject(columns) ? Object.entries(columns).filter(([id, entry]) => id !== column && headerOf(entry) !== header) : []
  const entry = unit === null ? header : { header, unit }
  return withKey(written, ['readings', 'columns'], { ...Object.fromEntries(others), [column]: entry })
} // prettier-ignore

function headerOf(entry: unknown): unknown {
  return isObject(entry) ? entry['header'] : entry
}

export interface FormSection {
  readonly id: string
  readonly meaning: string
  readonly fields: readonly FormField[]
}

export interface FormField extends ProcedureKey {
  readonly path: readonly string[]
  /** What it may be chosen from; null for what is typed. */
  readonly choices: readonly string[] | null
  readonly isNumber: boolean
  /** As the form shows it; empty where the key isn't written. */
  readonly text: string
}

const NOT_IN_FORM = ['format', '$schema', 'readings.columns']

/** The keys that this procedure may hold, by section: those of its own layer kind, and all outside the layer. */
export function formSections(written: Written): readonly FormSection[] {
  const kind = String(valueAt(['layer', 'kind'], written) ?? 'sheet')
  const fields = procedureKeys()
    .filter(({ key, layerKinds }) => !NOT_IN_FORM.includes(key) && (layerKinds.length === 0 || layerKinds.includes(kind)))
    .map((key) => formField(key, written))
  const ids = [...new Set(fields.map(({ path }) => (path.length > 1 ? path[0] : '')))]
  return ids.map((id) => ({
    id,
    meaning: id === '' ? 'what the procedure is for' : meaningOf(id),
    fields: fields.filter(({ path }) => (path.length > 1 ? path[0] : '') === id),
  }))
} // prettier-ignore

function formField(key: ProcedureKey, written: Written): FormField {
  const path = key.key.split('.')
  const shape = key.key === 'layer.kind' ? { enum: kindsOf(procedureShape.properties?.['layer'] ?? {}) } : shapeAt(path, written)
  const value = valueAt(path, written)
  return { ...key, path, choices: choicesOf(shape), isNumber: shape.type === 'number' || shape.type === 'integer', text: shownText(value) }
} // prettier-ignore

function choicesOf(shape: KeyShape): readonly string[] | null {
  return shape.enum && !optionsOf(shape) ? shape.enum.map(String) : null
}

function shownText(value: unknown): string {
  if (value === undefined) return ''
  return typeof value === 'string' || typeof value === 'number' ? String(value) : JSON.stringify(value)
}

/** What a person typed as the value it means; a text that can't be one is left as text, for the check to complain of. */
export function typedValue(field: FormField, text: string): unknown {
  const typed = text.trim()
  if (typed === '') return undefined
  if (field.choices) return typed
  if (field.isNumber) return Number.isNaN(Number(typed)) ? typed : Number(typed)
  if (!/^[[{"]/.test(typed)) return listOrText(field, typed)
  try {
    return JSON.parse(typed) as unknown
  } catch {
    return typed
  }
}

/** "1, 1.01, 0.99" for a key that holds a list. */
function listOrText({ default: usual, allowed }: FormField, typed: string): unknown {
  if (!usual?.startsWith('[') && !/list|numbers/.test(allowed)) return typed
  return typed.split(/[,;]\s*|\s+/).map((part) => (Number.isNaN(Number(part)) ? part : Number(part)))
}
