import fc from 'fast-check'
import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { readProfile } from '../../../core/ingest/read-profile'
import { explain } from '../../../core/problems/explain'
import { textFile } from './read'

const read = (text: string) => readProfile(textFile(text, 'profile.csv'))
const profileOf = (text: string) => {
  const { profile, problems } = read(text)
  if (!profile) throw new Error(problems.map(explain).join('\n'))
  return profile
}
const refusal = (text: string): string => read(text).problems.map(explain).join('\n')
const four = '0,4e18\n0.1,3e18\n0.2,2e17\n0.3,1e15\n'

describe('a depth profile', () => {
  it('of the fixture: nanometres, decimal commas, a comment, a column too many', () => {
    const path = new URL('../../fixtures/layer/tb-0417-boron-profile.csv', import.meta.url)
    const bytes = new Uint8Array(readFileSync(path))
    const { profile, problems } = readProfile({ name: 'tb-0417-boron-profile.csv', bytes, sha256: 'ab' })
    expect(problems).toEqual([])
    expect(profile).toMatchObject({ file: 'tb-0417-boron-profile.csv', bytes: bytes.length, sha256: 'ab' })
    expect(profile!.headers).toEqual({ depth: 'Depth (nm)', concentration: 'Boron [cm^-3]' })
    expect(profile!.depth_um).toHaveLength(26)
    expect([...profile!.depth_um.slice(0, 3)]).toEqual([0, 0.0175, 0.035])
    expect(profile!.concentration_cm3[0]).toBe(1e20)
  })

  it.each([
    ['depth_um,concentration_cm3', 1, 1],
    ['depth_nm,concentration_cm3', 1e-3, 1],
    ['Depth [µm],Concentration [cm⁻³]', 1, 1],
    ['x (mm),N (1/cm^3)', 1e3, 1],
    ['x / nm,N / cm-3', 1e-3, 1],
    ['Depth (Å),Conc. (atoms/cm3)', 1e-4, 1],
    ['depth um,net doping m^-3', 1, 1e-6],
    ['Depth_nm,Phosphorus_at/cm3', 1e-3, 1],
  ])('%s', (header, depthScale, densityScale) => {
    const { depth_um, concentration_cm3 } = profileOf(`${header}\n${four}`)
    ;[0, 0.1, 0.2, 0.3].forEach((x, i) => expect(depth_um[i]).toBeCloseTo(x * depthScale, 12))
    ;[4e18, 3e18, 2e17, 1e15].forEach((n, i) => expect(concentration_cm3[i] / n / densityScale).toBeCloseTo(1, 12))
  })

  it('takes columns in either order, among others, under a preamble, in any usual writing', () => {
    const plain = profileOf(`depth_um,concentration_cm3\n${four}`)
    const others = [
      `Sample,TB-0417\n\ntime_s,concentration_cm3,depth_um\n1,4e18,0\n2,3e18,0.1\n3,2e17,0.2\n4,1e15,0.3\n`,
      `depth_um\tconcentration_cm3\r\n% note\r\n${four.replaceAll(',', '\t').replaceAll('\n', '\r\n')}`,
      `"depth_um";"concentration_cm3"\n${four.replaceAll(',', ';').replaceAll('.', ',')}`,
    ]
    for (const text of others) {
      expect(profileOf(text).depth_um).toEqual(plain.depth_um)
      expect(profileOf(text).concentration_cm3).toEqual(plain.concentration_cm3)
    }
  })

  it('reads back what was written', () => {
    const points = fc.array(fc.record({ step: fc.integer({ min: 1, max: 900 }), power: fc.double({ min: 12, max: 21, noNaN: true }) }), { minLength: 4, maxLength: 60 }) // prettier-ignore
    fc.assert(
      fc.property(points, fc.constantFrom(';', '\t', ','), fc.boolean(), (steps, delimiter, isComma) => {
        let nm = 0
        const rows = steps.map(({ step, power }) => [(nm += step), 10 ** power])
        const mark = isComma && delimiter !== ',' ? ',' : '.'
        const text = rows.map((row) => row.map((value) => String(value).replace('.', mark)).join(delimiter))
        const { depth_um, concentration_cm3 } = profileOf([`depth_nm${delimiter}N_cm-3`, ...text].join('\n'))
        expect([...depth_um]).toEqual(rows.map(([x]) => x / 1000))
        expect([...concentration_cm3]).toEqual(rows.map(([, n]) => n))
      }),
      { numRuns: 100 },
    )
  })
})

describe('a file that is no depth profile is refused by line and reason', () => {
  it.each([
    ['', /no line names a depth and a concentration/],
    ['a,b\n1,2\n', /no line names a depth and a concentration/],
    [`depth,concentration_cm3\n${four}`, /header "depth" names no unit; it is nm, um, mm or angstrom/],
    [`depth_um,concentration_ppm\n${four}`, /unit that is not known here, "ppm"; it is cm\^-3 or m\^-3/],
    [`depth_s,concentration_cm3\n${four}`, /unit that is not known here, "s"/],
    ['depth_um,boron_cm3,phosphorus_cm3\n', /several columns could be the concentration: "boron_cm3" and "phosphorus_cm3"/],
    ['depth_um,concentration_cm3\n0,1e18\n1,1e17\n2,1e16\n', /has 3 points, and needs at least 4/],
    [`depth_um,concentration_cm3\n${four}0.4,0\n`, /line 6: .*concentration, 0 cm\^-3, is not above 0/],
    [`depth_um,concentration_cm3\n${four}0.4,-1e15\n`, /line 6: .*not above 0/],
    [`depth_um,concentration_cm3\n${four}0.3,1e14\n`, /line 6: .*0\.3 um, does not lie below the point before it, at 0\.3 um/],
    [`depth_um,concentration_cm3\n${four}0.25,1e14\n`, /line 6: .*does not lie below/],
    [`depth_um,concentration_cm3\n-0.1,1e18\n${four}`, /line 2: .*above the surface/],
    [`depth_um,concentration_cm3\n${four}0.4,n.a.\n`, /line 6: .*"n\.a\." in column "concentration_cm3" is not a number/],
    [`depth_um,concentration_cm3\n${four}0.4\n`, /line 6: .*"" in column "concentration_cm3" is empty/],
    [`depth_um,concentration_cm3\n${four}0.4,1e26\n`, /line 6: .*more than any solid has/],
  ])('%j', (text, message) => expect(refusal(text)).toMatch(message)) // prettier-ignore

  it('lists every bad line, up to twenty', () => {
    const bad = Array.from({ length: 50 }, (_, i) => `${i + 1},x`).join('\n')
    expect(read(`depth_um,concentration_cm3\n0,1e18\n${bad}\n`).problems).toHaveLength(20)
  })

  it('is not text, or too much', () => {
    const png = { name: 'p.csv', bytes: Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10, 0, 0), sha256: '' }
    expect(readProfile(png).problems.map(explain).join()).toMatch(/it is no text/)
    const rows = Array.from({ length: 20_001 }, (_, i) => `${i},1e15`).join('\n')
    expect(refusal(`depth_nm,concentration_cm3\n${rows}\n`)).toMatch(/20001 points, more than 20000/)
    expect(refusal('x'.repeat(5_000_001))).toMatch(/bytes, more than 5000000/)
  })

  it('whatever bytes it has: never by a throw', () => {
    fc.assert(
      fc.property(fc.oneof(fc.uint8Array({ maxLength: 300 }), fc.string().map((text) => new TextEncoder().encode(`depth_um,N_cm3\n${text}`))), (bytes) => {
        const { profile, problems } = readProfile({ name: 'p.csv', bytes, sha256: '' })
        expect(profile === null).toBe(problems.length > 0)
      }),
    )
  }) // prettier-ignore
})
