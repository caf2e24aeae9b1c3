import { Ajv2020 } from 'ajv/dist/2020'
import { readFileSync, readdirSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { format } from 'prettier'
import { describe, expect, it } from 'vitest'
import { procedureJsonSchema } from '../../../core/procedure/json-schema'
import { parseProcedure } from '../../../core/procedure/parse-procedure'

const SAMPLES = join(import.meta.dirname, '../../../sample-data')
const PUBLISHED = 'persquare-procedure-1.schema.json'
const sample = (name: string): unknown => JSON.parse(readFileSync(join(SAMPLES, name), 'utf8'))

const edition = 'persquare-procedure/1'
const validate = new Ajv2020({ strict: true, allErrors: true }).compile(procedureJsonSchema())
const placesOf = (written: unknown): readonly string[] =>
  validate(written) ? [] : validate.errors!.map(({ instancePath }) => instancePath)

describe('the published schema', () => {
  it('is the one that the program makes of its own', async () => {
    const made = await format(JSON.stringify(procedureJsonSchema()), { parser: 'json', printWidth: 120 })
    const path = join(SAMPLES, PUBLISHED)
    if (process.env['PERSQUARE_WRITE'] === '1') writeFileSync(path, made)
    expect(readFileSync(path, 'utf8'), 'run this test with PERSQUARE_WRITE=1 to write it anew').toBe(made)
  })

  it('is a schema of draft 2020-12 by a validator of its own kind', () => {
    expect(procedureJsonSchema()).toHaveProperty('$schema', 'https://json-schema.org/draft/2020-12/schema')
    expect(new Ajv2020().validateSchema(procedureJsonSchema())).toBe(true)
  })

  it('describes every key', () => {
    const bare: string[] = []
    const walk = (shape: unknown, path: string): void => {
      if (typeof shape !== 'object' || shape === null) return
      for (const [name, child] of Object.entries(shape)) {
        if (name === 'properties') {
          for (const [key, of] of Object.entries(child as object)) {
            if (!(of as { description?: string }).description) bare.push(`${path}.${key}`)
          }
        }
        walk(child, `${path}.${name}`)
      }
    }
    walk(procedureJsonSchema(), '')
    expect(bare).toEqual([])
  })

  it('says units', () => {
    const { properties } = procedureJsonSchema() as { properties: Record<string, { properties: Record<string, unknown> }> }
    expect(properties['wafer']!.properties['thicknessUm']).toMatchObject({ description: 'Wafer thickness [µm]' })
    expect(properties['uncertainty']!.properties['currentRel']).toMatchObject({
      description: 'Standard uncertainty of the current, relative [a fraction: 0.01 is 1 %]',
    })
  }) // prettier-ignore
})

describe('what a validator makes of procedures', () => {
  const procedures = readdirSync(SAMPLES).filter((name) => name.endsWith('.procedure.json'))

  it.each(procedures)('%s is sound and names the schema', (name) => {
    const written = sample(name) as Record<string, unknown>
    expect(placesOf(written)).toEqual([])
    expect(written['$schema']).toBe(`./${PUBLISHED}`)
  })

  it('the least procedure is sound', () => expect(placesOf({ format: edition })).toEqual([]))

  it.each([
    [{}, ''],
    [{ format: 'persquare-procedure/2' }, '/format'],
    [{ format: edition, wafr: {} }, ''],
    [{ format: edition, wafer: { diametreMm: 200 } }, '/wafer'],
    [{ format: edition, wafer: { diameterMm: 0 } }, '/wafer/diameterMm'],
    [{ format: edition, wafer: { diameterMm: '200' } }, '/wafer/diameterMm'],
    [{ format: edition, probe: { pinSpacingsMm: [1, 1] } }, '/probe/pinSpacingsMm'],
    [{ format: edition, probe: { pinSpacingsMm: [1, 1, 1, 1] } }, '/probe/pinSpacingsMm'],
    [{ format: edition, probe: { orientation: 'up' } }, '/probe/orientation'],
    [{ format: edition, layer: { kind: 'epi' } }, '/layer'],
    [{ format: edition, layer: { kind: 'bulk' } }, '/layer'],
    [{ format: edition, limits: { allowedSitesOut: 1.5 } }, '/limits/allowedSitesOut'],
    [{ format: edition, uncertainty: { shared: ['luck'] } }, '/uncertainty/shared/0'],
    [{ format: edition, readings: { columns: { volts: 'U' } } }, '/readings/columns'],
    [{ format: edition, $schema: 7 }, '/$schema'],
  ])('%j is refused at %j, by the program too', (written, place) => {
    expect(placesOf(written)).toContain(place)
    expect(parseProcedure(JSON.stringify(written), 'p.json').procedure).toBeNull()
  })
})

describe('the key $schema', () => {
  it('changes nothing and is no default', () => {
    const written = { format: edition, wafer: { diameterMm: 200 } }
    const plain = parseProcedure(JSON.stringify(written), 'p.json')
    expect(parseProcedure(JSON.stringify({ $schema: './s.json', ...written }), 'p.json')).toEqual(plain)
    expect(plain.procedure).not.toBeNull()
    expect(plain.defaults.map(({ key }) => key)).not.toContain('$schema')
  })
})
