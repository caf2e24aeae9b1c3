import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { scanJson } from '../../../core/procedure/scan-json'

const accepts = (text: string): boolean => {
  try {
    JSON.parse(text)
    return true
  } catch {
    return false
  }
}

describe('scanJson', () => {
  it.each([
    ['', 1, 1, 'the file is empty'],
    ['{\n  "a": 1,\n}', 3, 1, 'a comma stands before the closing }'],
    ['{\n  "a": 1\n  "b": 2\n}', 3, 3, 'a comma or a closing } is missing'],
    ['{ a: 1 }', 1, 3, 'a key in double quotes is expected here'],
    ['{ "a" 1 }', 1, 7, 'a colon is missing after the key'],
    ['{ "a": \'b\' }', 1, 8, 'a text must stand in double quotes'],
    ['{ "a": }', 1, 8, 'a value is missing here'],
    ['{ "a": [1, 2, ] }', 1, 15, 'a comma stands before the closing ]'],
    ['{ "a": [1 2] }', 1, 11, 'a comma or a closing ] is missing'],
    ['{ "a": 0,35 }', 1, 10, 'a key in double quotes is expected here; decimals are written with a point'],
    ['{ "a": .5 }', 1, 8, '".5" is no number as JSON writes it (such as 0.35, -2 or 1e15)'],
    ['{ "a": 01 }', 1, 8, '"01" is no number as JSON writes it (such as 0.35, -2 or 1e15)'],
    ['{ "a": NaN }', 1, 8, '"NaN" is no value; a text must stand in double quotes'],
    ['{ // title\n}', 1, 3, 'a key in double quotes is expected here'],
    ['{ "a": "C:\\data" }', 1, 11, 'a backslash in a text must be written twice'],
    ['{ "a": "b', 1, 8, 'the closing double quote of this text is missing'],
    ['{ "a": 1', 1, 9, 'it breaks off before the closing bracket'],
    ['{}\r\n{}', 2, 1, '"{" stands after the end of the object'],
  ])('%j goes wrong in line %d, column %d', (text, line, column, why) => {
    expect(scanJson(text).fault).toEqual({ line, column, why })
  })

  it('refuses a text nested deeper than any procedure, before the stack runs out', () => {
    expect(scanJson('['.repeat(1e6)).fault?.why).toBe('it is nested deeper than 64 levels')
  })

  it('finds keys written twice, wherever they stand', () => {
    expect(scanJson('{"a":{"b":1,"b":2},"c":[{"d":1},{"d":1,"\\u0064":2}]}')).toEqual({
      fault: null,
      doubledKeys: ['a.b', 'c[1].d'],
    })
  })

  it('accepts what JSON.parse accepts', () => {
    fc.assert(
      fc.property(fc.json({ maxDepth: 5 }), (text) => {
        expect(scanJson(text).fault).toBeNull()
      }),
    )
  })

  it('agrees with JSON.parse on damaged texts', () => {
    const damage = fc.record({ text: fc.json({ maxDepth: 3 }), at: fc.nat(), cut: fc.nat(3), put: fc.constantFrom('', ',', '"', '}', ']', '\\', '0', '-', 'e', '\n', ':', 't') }) // prettier-ignore
    fc.assert(
      fc.property(damage, ({ text, at, cut, put }) => {
        const place = at % (text.length + 1)
        const damaged = text.slice(0, place) + put + text.slice(place + cut)
        expect(scanJson(damaged).fault === null).toBe(accepts(damaged))
      }),
      { numRuns: 1000 },
    )
  })
})
