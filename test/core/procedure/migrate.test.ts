import { describe, expect, it } from 'vitest'
import { explain } from '../../../core/problems/explain'
import { migrate, migrations, type Migration } from '../../../core/procedure/migrate'
import { parseProcedure } from '../../../core/procedure/parse-procedure'
import { PROCEDURE_FORMAT } from '../../../core/procedure/schema'

/** Two invented editions: the first wrote the diameter in inches beside the format, the second moved it into the wafer. */
const invented: readonly Migration[] = [
  {
    from: 'persquare-procedure/inches',
    to: 'persquare-procedure/centimetres',
    migrate: ({ diameterInch, ...rest }) => ({ ...rest, wafer: { diameterCm: Number(diameterInch) * 2.5 } }),
  },
  {
    from: 'persquare-procedure/centimetres',
    to: PROCEDURE_FORMAT,
    migrate: ({ wafer, ...rest }) => ({
      ...rest,
      wafer: { diameterMm: (wafer as { diameterCm: number }).diameterCm * 10 },
    }),
  },
]
const older = { format: 'persquare-procedure/inches', title: 'An old one', diameterInch: 8 }

describe('migrate', () => {
  it('takes an older edition through every step to the current one', () => {
    expect(migrate(older, 'p.json', invented)).toEqual({
      written: { format: PROCEDURE_FORMAT, title: 'An old one', wafer: { diameterMm: 200 } },
      from: 'persquare-procedure/inches',
      problem: null,
    })
    expect(older).toEqual({ format: 'persquare-procedure/inches', title: 'An old one', diameterInch: 8 })
  })

  it('begins where the file stands', () => {
    const second = { format: 'persquare-procedure/centimetres', wafer: { diameterCm: 10 } }
    expect(migrate(second, 'p.json', invented).written).toEqual({
      format: PROCEDURE_FORMAT,
      wafer: { diameterMm: 100 },
    })
  })

  it.each([[{ format: PROCEDURE_FORMAT, title: 7 }], [{}], [{ format: 3 }], [{ format: 'something else' }], [null], [[]]])(
    'leaves %j as it is',
    (written) => {
      const migrated = migrate(written, 'p.json', invented)
      expect(migrated.written).toBe(written)
      expect(migrated).toMatchObject({ from: null, problem: null })
    },
  ) // prettier-ignore

  it('refuses a newer edition and says which are read', () => {
    const { problem } = migrate({ format: 'persquare-procedure/2' }, 'p.json', invented)
    expect(problem).toEqual({
      kind: 'bad-value',
      file: 'p.json',
      key: 'format',
      found: '"persquare-procedure/2"',
      allowed:
        '"persquare-procedure/inches", "persquare-procedure/centimetres" or "persquare-procedure/1": a newer edition needs a newer program',
    })
    expect(explain(problem!)).toBe(
      'p.json, format: Found "persquare-procedure/2"; allowed is "persquare-procedure/inches", "persquare-procedure/centimetres" or "persquare-procedure/1": a newer edition needs a newer program.',
    )
  })

  it('a register that leads nowhere or in a circle is a bug, and ends', () => {
    const circle = [
      { from: 'a', to: 'b', migrate: (written: object) => ({ ...written }) },
      { from: 'b', to: 'a', migrate: (written: object) => ({ ...written }) },
    ]
    expect(() => migrate({ format: 'a' }, 'p.json', circle)).toThrow('no migration leads from a')
    expect(() => migrate({ format: 'a' }, 'p.json', circle.slice(0, 1))).toThrow('no migration leads from a')
  })

  it('every released step leads on', () => {
    for (const { from } of migrations) {
      expect(() => migrate({ format: from }, 'p.json')).not.toThrow()
    }
    expect(new Set(migrations.map(({ from }) => from)).size).toBe(migrations.length)
    expect(migrations.map(({ from }) => from)).not.toContain(PROCEDURE_FORMAT)
  })
})

describe('parseProcedure with older editions', () => {
  it('reads one as the current edition and says where it came from', () => {
    const { procedure, migratedFrom, defaults } = parseProcedure(JSON.stringify(older), 'p.json', invented)
    expect(procedure?.format).toBe(PROCEDURE_FORMAT)
    expect(procedure?.wafer.diameterMm).toBe(200)
    expect(migratedFrom).toBe('persquare-procedure/inches')
    expect(defaults.map(({ key }) => key)).not.toContain('wafer.diameterMm')
    expect(parseProcedure(`{"format":"${PROCEDURE_FORMAT}"}`, 'p.json').migratedFrom).toBeNull()
  })

  it('complains of what a step handed on', () => {
    const { problems } = parseProcedure(JSON.stringify({ ...older, diameterInch: 'eight' }), 'p.json', invented)
    expect(problems).toMatchObject([{ kind: 'bad-value', key: 'wafer.diameterMm' }])
  })

  it('says nothing of the other keys of an edition that it does not know', () => {
    const { problems } = parseProcedure('{"format":"persquare-procedure/2","waver":{}}', 'p.json')
    expect(problems).toMatchObject([{ kind: 'bad-value', key: 'format' }])
  })
})
