/** Procedures with damage to their tree, then to their text. */
import fc from 'fast-check'
import { halfShapedProcedures, shapedProcedures } from './shaped-procedures'
import { soundProcedures, type Json } from './sound-procedures'

const INTRUDERS: readonly Json[] = [
  null,
  true,
  0,
  -0,
  -1,
  1e308,
  -1e308,
  5e-324,
  1e22,
  0.1,
  '',
  'NaN',
  'Infinity',
  '12',
  'x'.repeat(10_000),
  [],
  [[[[]]]],
  {},
  { kind: 'sheet' },
  { kind: 'toString' },
  { kind: null },
  [1, 2, 3],
  [1, 2],
  ['radial'],
  'disc',
  'sheet',
  '\u0000',
  '\u202e',
  '😀',
  { length: 3 },
  { angleDeg: '0' },
]
const KEYS = [
  '__proto__',
  'constructor',
  'prototype',
  'toString',
  'hasOwnProperty',
  'diametermm',
  'DiameterMm',
  'thickness',
  '',
  ' ',
  'a.b',
  'a[0]',
  '\u0000',
  'kind',
  'x'.repeat(500),
]

type TextChange = (text: string) => string

export const damagedProcedures: fc.Arbitrary<string> = fc
  .tuple(
    fc.oneof(soundProcedures, halfShapedProcedures, shapedProcedures),
    fc.array(fc.tuple(fc.nat(), fc.nat({ max: 3 }), fc.constantFrom(...INTRUDERS), fc.constantFrom(...KEYS)), {
      maxLength: 4,
    }),
    textChanges(),
  )
  .map(([procedure, changes, change]) => {
    let tree = procedure
    for (const [place, action, intruder, key] of changes) tree = changed(tree, place, action, intruder, key)
    return change(JSON.stringify(tree))
  })

function textChanges(): fc.Arbitrary<TextChange> {
  const place = fc.nat({ max: 100_000 })
  const insert = (text: string, at: number, more: string) =>
    text.slice(0, at % (text.length + 1)) + more + text.slice(at % (text.length + 1))
  return fc.oneof(
    { weight: 6, arbitrary: fc.constant<TextChange>((text) => text) },
    place.map(
      (at): TextChange =>
        (text) =>
          text.slice(0, at % (text.length + 1)),
    ),
    fc
      .tuple(
        place,
        fc.constantFrom(
          '{',
          '}',
          '[',
          ']',
          '"',
          ',',
          ':',
          '\\',
          '\\u12',
          '//',
          '\n',
          '\uFEFF',
          '\u0000',
          '1,5',
          'NaN',
          '01',
          '.5',
          '+1',
          "'",
          '1e',
          '\ud800',
        ),
      )
      .map(
        ([at, sign]): TextChange =>
          (text) =>
            insert(text, at, sign),
      ),
    fc.constantFrom<TextChange>(
      (text) => `\uFEFF${text}`,
      (text) => text.replace('{', '{"format":"persquare-procedure/1",'),
      (text) => text.replace('{', '{"__proto__":{"polluted":1},'),
      (text) => text.replace('persquare-procedure/1', 'persquare-procedure/2'),
      () => '['.repeat(100_000),
      () => '{"wafer":'.repeat(20_000),
      () => '',
      () => '"text"',
      (text) => `${text}${text}`,
      (text) => text.replace(/\d+/, '1'.repeat(5000)),
    ),
  )
}

/** The tree with one of its places replaced, removed, nested deeper or given a new key. */
function changed(tree: Json, place: number, action: number, intruder: Json, key: string): Json {
  const paths = pathsOf(tree)
  const path = paths[place % paths.length]
  return replaced(tree, path, (value) => {
    if (action === 0) return intruder
    if (action === 1) return undefined
    if (action === 2) return [value]
    return typeof value === 'object' && value !== null && !Array.isArray(value)
      ? withKey(value, key, intruder)
      : { [key]: value }
  })
}

function withKey(value: { [key: string]: Json }, key: string, entry: Json): Json {
  return Object.fromEntries([...Object.entries(value), [key, entry]])
}

function pathsOf(tree: Json, path: readonly string[] = []): (readonly string[])[] {
  if (typeof tree !== 'object' || tree === null) return [path]
  return [path, ...Object.entries(tree).flatMap(([key, value]) => pathsOf(value as Json, [...path, key]))]
}

function replaced(tree: Json, [first, ...rest]: readonly string[], change: (value: Json) => Json | undefined): Json {
  if (first === undefined) return change(tree) ?? null
  const inside = (value: Json) => (rest.length === 0 ? change(value) : replaced(value, rest, change))
  if (Array.isArray(tree)) {
    return tree.flatMap((value, at) => (String(at) === first ? (inside(value) ?? []) : [value]))
  }
  const entries = Object.entries(tree as { [key: string]: Json }).flatMap(([key, value]) => {
    const next = key === first ? inside(value) : value
    return next === undefined ? [] : [[key, next] as const]
  })
  return Object.fromEntries(entries)
}
