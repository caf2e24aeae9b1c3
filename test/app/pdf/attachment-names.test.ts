import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { attachmentNames } from '../../../app/pdf/attachment-names'

describe('attachmentNames', () => {
  it.each([
    ['TB-0417.csv', 'TB-0417.csv'],
    ['lot 17 (new).CSV', 'lot 17 _new_.CSV'],
    ['result.json', 'result-2.json'],
    ['Persquare-Report.JSON', 'Persquare-Report-2.JSON'],
    ['../../etc/passwd', 'etc_passwd'],
    ['C:\\lots\\a.csv', 'C__lots_a.csv'],
    ['.hidden', 'hidden'],
    ['-rf.csv', 'rf.csv'],
    ['__proto__', 'proto__'],
    ['con.csv', 'input-con.csv'],
    ['COM1', 'input-COM1'],
    ['...', 'input'],
    ['', 'input'],
    ['Prüfung.csv', 'Pr_fung.csv'],
    ['a.csv. ', 'a.csv'],
    ['a\nb\u0000.csv', 'a_b_.csv'],
    ['no extension at all', 'no extension at all'],
  ])('%j travels as %j', (original, name) => expect(attachmentNames([original])).toEqual([name]))

  it('gives each its own, on systems that don’t tell capitals too', () => {
    expect(attachmentNames(['a.csv', 'A.csv', 'a.csv', 'a-2.csv'])).toEqual([
      'a.csv',
      'A-2.csv',
      'a-3.csv',
      'a-2-2.csv',
    ])
  })

  it('is safe, short and unique whatever the names are', () => {
    const name = fc.oneof(
      fc.string({ unit: 'binary', maxLength: 300 }),
      fc.constantFrom('a.csv', 'A.csv', 'result.json'),
    )
    fc.assert(
      fc.property(fc.array(name, { maxLength: 20 }), (originals) => {
        const names = attachmentNames(originals)
        expect(names).toHaveLength(originals.length)
        expect(new Set(['result.json', 'persquare-report.json', ...names].map((one) => one.toLowerCase())).size).toBe(
          names.length + 2,
        )
        for (const one of names) expect(one).toMatch(/^[A-Za-z0-9][\w .-]{0,119}$/)
      }),
      { numRuns: 200 },
    )
  })
})
