import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { ABSENT, compareResults } from '../../../core/analysis/compare-results'
import { resultJson } from '../../../core/analysis/result-json'
import { sampleLot } from './lots'

const pathsOf = (before: unknown, after: unknown) => compareResults(before, after).differences.map(({ path }) => path)

describe('compareResults', () => {
  it('finds nothing between equals, whatever the order of their keys', () => {
    expect(compareResults({ a: [1, { b: null }], c: 'x' }, { c: 'x', a: [1, { b: null }] })).toEqual({
      differences: [],
      count: 0,
    })
  })

  it('names the place and both values', () => {
    const before = { wafers: [{ mean: 92 }, { mean: 92.1 }] }
    const after = { wafers: [{ mean: 92 }, { mean: 92.10000000000001 }] }
    expect(compareResults(before, after).differences).toEqual([
      { path: 'wafers[1].mean', before: 92.1, after: 92.10000000000001 },
    ])
  })

  it.each([
    [1, '1'],
    [null, 0],
    [null, {}],
    [[], {}],
    [false, null],
    [{ a: 1 }, [1]],
    ['a', 'A'],
  ])('%j is not %j', (before, after) => {
    expect(compareResults(before, after)).toEqual({ differences: [{ path: '', before, after }], count: 1 })
    expect(compareResults({ a: before }, { a: after }).differences).toEqual([{ path: 'a', before, after }])
  })

  it('tells a value that is not there from null', () => {
    expect(compareResults({ a: null }, {}).differences).toEqual([{ path: 'a', before: null, after: ABSENT }])
    expect(compareResults([1], [1, null]).differences).toEqual([{ path: '[1]', before: ABSENT, after: null }])
  })

  it('goes by the document of the first, with what only the second has at the end of its object', () => {
    const before = { z: { q: 1, gone: 1 }, a: 1 }
    const after = { a: 2, z: { added: 1, q: 2 } }
    expect(pathsOf(before, after)).toEqual(['z.q', 'z.gone', 'z.added', 'a'])
  })

  it('writes keys that are no plain words in quotes', () => {
    expect(pathsOf({ 'odd key': { 'x"y': 1 } }, { 'odd key': { 'x"y': 2 } })).toEqual([String.raw`["odd key"]["x\"y"]`])
    const prototype = JSON.parse('{"__proto__":{"a":1}}') as unknown
    expect(pathsOf(prototype, JSON.parse('{"__proto__":{"a":2}}'))).toEqual(['__proto__.a'])
    expect(pathsOf({}, prototype)).toEqual(['__proto__'])
    expect(pathsOf({ constructor: 1 }, {})).toEqual(['constructor'])
  })

  it('lists no more than asked for, and counts all', () => {
    const { differences, count } = compareResults([1, 2, 3, 4], [5, 6, 7, 8], { limit: 2 })
    expect(differences.map(({ path }) => path)).toEqual(['[0]', '[1]'])
    expect(count).toBe(4)
  })

  it('passes over what may differ', () => {
    const before = { program: { version: '1' }, other: { version: '1' } }
    const after = { program: { version: '2' }, other: { version: '2' } }
    expect(compareResults(before, after, { except: ['program.version'] }).differences).toEqual([
      { path: 'other.version', before: '1', after: '2' },
    ])
  })

  it('goes as deep as a document does', () => {
    const deep = (end: string) => JSON.parse('['.repeat(5000) + end + ']'.repeat(5000)) as unknown
    expect(compareResults(deep('1'), deep('1')).count).toBe(0)
    expect(pathsOf(deep('1'), deep('2'))).toEqual(['[0]'.repeat(5000)])
  })

  it('agrees with whether two documents are equal, and does so both ways round', () => {
    const json = fc.jsonValue({ maxDepth: 4 })
    fc.assert(
      fc.property(json, json, (a, b) => {
        expect(compareResults(a, JSON.parse(JSON.stringify(a))).count).toBe(0)
        expect(compareResults(a, b).count).toBe(compareResults(b, a).count)
        const isSame = (x: unknown, y: unknown) => JSON.stringify(sorted(x)) === JSON.stringify(sorted(y))
        expect(compareResults(a, b).count === 0).toBe(isSame(a, b))
      }),
      { numRuns: 200 },
    )
  })

  it('finds every number of a result that is moved by its last digit', () => {
    const text = resultJson(sampleLot('TB-0522'), { program: 'Persquare', version: '0' })
    const moved: string[] = []
    const after = JSON.parse(text, function (this: unknown, key: string, value: unknown) {
      if (typeof value !== 'number' || value === 0) return value
      moved.push(key)
      return value * (1 + 2 ** -52)
    }) as unknown
    const { count } = compareResults(JSON.parse(text), after)
    expect(moved.length).toBeGreaterThan(100)
    expect(count).toBe(moved.length)
  })
})

/** Keys in one order, an empty object told from an empty list; -0 is written as 0, as JSON does. */
function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted)
  if (typeof value !== 'object' || value === null) return value
  const entries = Object.entries(value).map(([key, inside]) => [JSON.stringify(key), sorted(inside)] as const)
  return { entries: entries.sort(([a], [b]) => (a < b ? -1 : 1)) }
}
