import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { guardTextCell, readTextCell } from '../../../core/ingest/text-cell'
import { writeCsv } from '../../../core/ingest/write-csv'

function oneCell(cell: string | number): string {
  return writeCsv([{ name: 'a', cell: () => cell }], 1).slice(2, -1)
}

describe('writeCsv', () => {
  it('numbers in the shortest form that reads back, NaN empty, LF', () => {
    const values = [0.1, 1e-7, 1e21, -0, NaN, 92]
    expect(
      writeCsv(
        [
          { name: 'value', cell: (row) => values[row]! },
          { name: 'n', cell: (row) => row },
        ],
        values.length,
      ),
    ).toBe('value,n\n0.1,0\n1e-7,1\n1e+21,2\n-0,3\n,4\n92,5\n')
  })

  it.each([
    ['a,b', '"a,b"'],
    ['say "so"', '"say ""so"""'],
    ['two\nlines', '"two\nlines"'],
    ['=1+1', "'=1+1"],
    ['-3', "'-3"],
    ['@a,b', '"\'@a,b"'],
    ['\tx', "'\tx"],
    ["'=x", "''=x"],
    ["o'clock", "o'clock"],
  ])('text %j is written %j', (text, written) => expect(oneCell(text)).toBe(written))

  it('guarding and reading undo each other', () => {
    fc.assert(
      fc.property(fc.stringMatching(/^['=+@\t-]{0,4}[a-z]{1,3}$/), (text) => {
        expect(readTextCell(guardTextCell(text))).toBe(/^[ \t]/.test(text) ? text : text.trim())
      }),
      { numRuns: 200 },
    )
  })
})
