import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { explainNumber, parseNumber } from '../../../core/ingest/parse-number'

const POINT = 46
const COMMA = 44

describe('parseNumber', () => {
  it('gives the double that the language itself gives, for any way of writing', () => {
    const decimal = fc.tuple(
      fc.bigInt({ min: 0n, max: 10n ** 25n }),
      fc.integer({ min: 0, max: 30 }),
      fc.integer({ min: -40, max: 40 }),
      fc.boolean(),
    )
    fc.assert(
      fc.property(decimal, ([digits, places, exponent, isNegative]) => {
        const padded = String(digits).padStart(places + 1, '0')
        const text = `${isNegative ? '-' : ''}${padded.slice(0, padded.length - places)}.${padded.slice(padded.length - places)}e${exponent}`
        expect(parseNumber(text, POINT, 0)).toBe(Number(text))
        expect(parseNumber(text.replace('.', ','), COMMA, 0)).toBe(Number(text))
        expect(parseNumber(text, POINT, -3)).toBe(Number(text.replace(/e.*/, `e${exponent - 3}`)))
      }),
      { numRuns: 200 },
    )
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(parseNumber(String(value), POINT, 0)).toBe(Object.is(value, -0) ? 0 : value)
      }),
      { numRuns: 200 },
    )
  })

  it('a shift is exact: 3.51 mV is 0.00351 V, which a product is not', () => {
    expect(parseNumber('3.51', POINT, -3)).toBe(0.00351)
    expect(3.51 * 1e-3).not.toBe(0.00351)
  })

  it.each([
    '',
    ' ',
    '.',
    '-',
    '+',
    'e5',
    '1e',
    '1e+',
    '1.2.3',
    '1,2',
    '0x10',
    '1_000',
    '1 000',
    'NaN',
    'Infinity',
    '1e999',
    '1e99999',
    '--1',
    '1-',
    '١',
    '5V',
  ])('%j is no number', (text) => expect(parseNumber(text, POINT, 0)).toBeNaN())

  it.each([
    [' 1.5\r', 1.5],
    ['+.5', 0.5],
    ['5.', 5],
    ['1E-03', 1e-3],
    ['\u22122', -2],
    ['00012', 12],
    ['\u00a07', 7],
  ])('%j is %d', (text, value) => expect(parseNumber(text, POINT, 0)).toBe(value))
})

describe('explainNumber', () => {
  it.each([
    ['1,234.5', '.', 'thousands'],
    ["1'234", '.', 'thousands'],
    ['1 234,5', ',', 'thousands'],
    ['1.5', ',', 'decimal mark'],
    ['O.L.', '.', 'overload'],
    ['---', '.', 'dash'],
    ['1e999', '.', 'too large'],
    ['', '.', 'empty'],
    ['n/a', '.', 'not a number'],
  ] as const)('%j with %j: %s', (text, mark, why) => expect(explainNumber(text, mark)).toContain(why))
})
