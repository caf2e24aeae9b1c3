import { describe, expect, it } from 'vitest'
import { parseProcedure } from '../../../core/procedure/parse-procedure'
import {
  formSections,
  NEW_PROCEDURE,
  readWritten,
  typedValue,
  withColumn,
  withKey,
  writtenText,
  type FormField,
} from '../../../app/renderer/formats/procedure-text'

const field = (key: string, written = NEW_PROCEDURE): FormField =>
  formSections(written).flatMap(({ fields }) => fields).find((entry) => entry.key === key)! // prettier-ignore

describe('a procedure in a form', () => {
  it('begins as one that is right', () => {
    expect(parseProcedure(writtenText(NEW_PROCEDURE), 'new').problems).toEqual([])
  })

  it('sets and takes out keys, and the objects they leave empty', () => {
    const set = withKey(NEW_PROCEDURE, ['wafer', 'diameterMm'], 200)
    expect(set['wafer']).toEqual({ diameterMm: 200 })
    expect(withKey(set, ['wafer', 'diameterMm'], undefined)).toEqual(NEW_PROCEDURE)
    expect(NEW_PROCEDURE).not.toHaveProperty('wafer')
  })

  it('shows the keys of the chosen layer kind alone', () => {
    expect(field('layer.depthUm')).toBeUndefined()
    const doped = withKey(NEW_PROCEDURE, ['layer', 'kind'], 'doped-layer')
    expect(field('layer.depthUm', doped)).toMatchObject({ unit: 'µm', isNumber: true, text: '' })
    expect(field('layer.kind').choices).toContain('implant')
  })

  it('reads what is typed as the value it means', () => {
    expect(typedValue(field('wafer.diameterMm'), ' 200 ')).toBe(200)
    expect(typedValue(field('wafer.diameterMm'), 'wide')).toBe('wide')
    expect(typedValue(field('wafer.diameterMm'), '')).toBeUndefined()
    expect(typedValue(field('wafer.fiducial'), 'flat')).toBe('flat')
    expect(typedValue(field('probe.orientation'), '{"angleDeg": 90}')).toEqual({ angleDeg: 90 })
    expect(typedValue(field('probe.orientation'), 'radial')).toBe('radial')
    expect(typedValue(field('probe.pinSpacingsMm'), '1, 1.01 0.99')).toEqual([1, 1.01, 0.99])
  })

  it('keeps a header for one of our columns only', () => {
    const first = withColumn(NEW_PROCEDURE, 'v_over_i_ohm', 'alpha', null)
    const second = withColumn(first, 'voltage_V', 'alpha', 'mV')
    expect(second['readings']).toEqual({ columns: { voltage_V: { header: 'alpha', unit: 'mV' } } })
  })

  it('is text where it is no JSON object', () => {
    for (const text of ['{ "format": ', '[]', '3']) expect(readWritten(new TextEncoder().encode(text)), text).toBeNull()
  })
})
