import { deflateSync, inflateSync } from 'node:zlib'
import fc from 'fast-check'
import PDFDocument from 'pdfkit'
import { describe, expect, it } from 'vitest'
import { openPdf } from '../../../app/pdf/pdf-file'
import { PdfFault } from '../../../app/pdf/pdf-syntax'
import { ATTACHMENT_LIMITS, readAttachments } from '../../../app/pdf/read-attachments'
import { buildPdf, buildWithFiles, latin1, makeReport, renderPages, utf8, type BuiltObject } from './reports'

const read = (bytes: Uint8Array) => readAttachments(openPdf(bytes))
const binary = (length: number): Uint8Array => Uint8Array.from({ length }, (_, k) => (k * 7919 + (k >> 5)) & 255)

/** Refused with these words, and at once. */
function expectFault(bytes: Uint8Array, why: RegExp): void {
  const begin = performance.now()
  expect(() => read(bytes)).toThrow(PdfFault)
  expect(() => read(bytes)).toThrow(why)
  expect(performance.now() - begin).toBeLessThan(1000)
}

describe('readAttachments', () => {
  it('gives back what was attached, byte by byte and in its order', async () => {
    const files = ['b.csv', 'a 1_-x-.csv', 'B2.json'].map((name, k) => ({
      name,
      bytes: binary(10 ** (k + 2)),
      mime: 'text/csv',
      description: 'A file (with \\ brackets)',
    }))
    const found = read(await renderPages('x', files))
    expect(found.map(({ name }) => name)).toEqual(files.map(({ name }) => name))
    found.forEach(({ bytes }, k) => expect(Buffer.compare(bytes, files[k]!.bytes)).toBe(0))
  })

  it('reads a file built by hand in the same way', () => {
    expect(read(buildWithFiles([{ name: 'a.csv', content: utf8('1,2\n') }]))).toEqual([
      { name: 'a.csv', bytes: Buffer.from('1,2\n') },
    ])
    expect(read(buildWithFiles([]))).toEqual([])
  })

  it('reads large files that pack well, as readings do', () => {
    const rows = Array.from({ length: 200_000 }, (_, k) => `${k},1,0,0,5e-4,0.0101`)
    const content = utf8(rows.join('\n'))
    expect(read(buildWithFiles([{ name: 'a.csv', content }]))[0]!.bytes.length).toBe(content.length)
  })
})

describe('what is no file of ours', () => {
  it.each([
    ['nothing', new Uint8Array(0), /no PDF file/],
    ['words', utf8('dear all, please find the lot attached'), /no PDF file/],
    ['a PNG', Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10]), /no PDF file/],
    ['a header alone', utf8('%PDF-1.7\n'), /cut short/],
    ['a header and an end', utf8('%PDF-1.7\nstartxref\n9\n%%EOF\n'), /another program|damaged/],
    ['an end that points behind itself', utf8('%PDF-1.7\nstartxref\n999999\n%%EOF\n'), /damaged/],
    ['an end without a number', utf8('%PDF-1.7\nstartxref\n-1\n%%EOF\n'), /damaged/],
    ['a table in a stream', utf8('%PDF-1.7\n1 0 obj\nstartxref\n9\n%%EOF\n'), /another program/],
    ['lines that end in CR LF', utf8('%PDF-1.4\r\nxref\r\n0 1\r\nstartxref\r\n10\r\n%%EOF\r\n'), /another program/],
  ])('%s', (_, bytes, why) => expectFault(bytes, why))

  it('any bytes, with or without our beginning and end', () => {
    const around = (inner: Uint8Array, at: number) =>
      Buffer.concat([utf8('%PDF-1.7\n'), inner, utf8(`\nstartxref\n${at}\n%%EOF\n`)])
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 300 }), fc.nat(400), (bytes, at) => {
        expect(() => read(bytes)).toThrow(PdfFault)
        expect(() => read(around(bytes, at))).toThrow(PdfFault)
        expect(() => read(around(latin1(`xref\n0 ${Buffer.from(bytes).toString('latin1')}`), 9))).toThrow(PdfFault)
      }),
      { numRuns: 200 },
    )
  })

  it('a PDF without files, of ours or not', async () => {
    expectFault(await renderPages('no files', []), /no files are attached/)
  })

  it('one that is encrypted', async () => {
    const doc = new PDFDocument({ userPassword: 'secret' })
    const chunks: Uint8Array[] = []
    doc.on('data', (chunk: Uint8Array) => chunks.push(chunk))
    const ended = new Promise((resolve) => doc.on('end', resolve))
    doc.text('hidden')
    doc.file(Buffer.from('1,2'), { name: 'a.csv' })
    doc.end()
    await ended
    expectFault(Buffer.concat(chunks), /encrypted/)
  })

  it('one that another program added to', async () => {
    const report = await makeReport()
    expectFault(Buffer.concat([report, utf8('\n')]), /cut short|added/)
    const more = `xref\n0 0\ntrailer\n<< /Size 1 /Prev 9 >>\nstartxref\n${report.length}\n%%EOF\n`
    expectFault(Buffer.concat([report, utf8(more)]), /damaged|added|another/)
    expectFault(buildPdf(['<<\n>>'], { trailer: '/Prev 9\n' }), /another program/)
  })

  it('one that was cut anywhere', async () => {
    const report = await makeReport()
    for (let k = 0; k < 200; k++) {
      const length = Math.floor((report.length * k) / 200)
      expect(() => read(report.subarray(0, length)), String(length)).toThrow(PdfFault)
    }
    for (let k = 1; k <= 60; k++) expect(() => read(report.subarray(0, -k)), `-${k}`).toThrow(PdfFault)
    for (let k = 1; k <= 20; k++) expect(() => read(report.subarray(k)), `+${k}`).toThrow(PdfFault)
  })
})

describe('files that are made to do harm', () => {
  const bomb = (megabytes: number): Uint8Array => new Uint8Array(megabytes * 2 ** 20)

  it('an attachment that unpacks to a thousand times its size', () => {
    expectFault(buildWithFiles([{ name: 'a.csv', content: bomb(64) }], 9), /unpacks to far too much/)
  })

  it('one that lies about it', () => {
    expectFault(buildWithFiles([{ name: 'a.csv', content: bomb(64), size: 1000 }], 9), /damaged/)
    expectFault(buildWithFiles([{ name: 'a.csv', content: utf8('short'), size: 1000 }]), /damaged/)
    expectFault(buildWithFiles([{ name: 'a.csv', content: utf8('1'), size: -1 }]), /damaged/)
    expectFault(buildWithFiles([{ name: 'a.csv', content: utf8('1'), size: 0.5 }]), /damaged/)
    expectFault(buildWithFiles([{ name: 'a.csv', content: utf8('1'), size: 2 ** 40 }]), /larger than 256 MB/)
  })

  it('one that lies, before it is unpacked any further than it says', () => {
    const packed = deflateSync(bomb(64), { level: 9 })
    const lying = buildWithFiles([{ name: 'a.csv', content: bomb(64), size: 1000 }], 9)
    const quickest = (work: () => unknown) =>
      Math.min(
        ...[1, 2, 3].map(() => {
          const begin = performance.now()
          work()
          return performance.now() - begin
        }),
      )
    const whole = quickest(() => inflateSync(packed))
    expect(quickest(() => expect(() => read(lying)).toThrow(PdfFault))).toBeLessThan(whole / 4)
  })

  it('many that are too much together', () => {
    const noise = binary(2 ** 20)
    const files = Array.from({ length: 3 }, (_, k) => ({ name: `${k}.csv`, content: noise, size: 200 * 2 ** 20 }))
    expectFault(buildWithFiles(files, 0), /too large together/)
  })

  it('too many', () => {
    const files = (count: number) => Array.from({ length: count }, (_, k) => ({ name: `${k}.csv`, content: utf8('1') }))
    expect(read(buildWithFiles(files(ATTACHMENT_LIMITS.count)))).toHaveLength(ATTACHMENT_LIMITS.count)
    expectFault(buildWithFiles(files(ATTACHMENT_LIMITS.count + 1)), /more than 200/)
  })

  it.each(['../a.csv', 'a/b.csv', '', 'a\\\\b', 'x'.repeat(121), 'a\\nb', 'é'])('a file named %j', (name) => {
    expectFault(buildWithFiles([{ name, content: utf8('1') }]), /no proper name/)
  })

  it('two files of one name, or one file under two', () => {
    const file = (name: string) => ({ name, content: utf8('1') })
    expectFault(buildWithFiles([file('a.csv'), file('A.csv')]), /two files/)
    const twice = buildPdf([
      '<<\n/Names 2 0 R\n>>',
      '<<\n/EmbeddedFiles <<\n/Names [\n(0) 3 0 R\n(1) 4 0 R\n]\n>>\n>>',
      '<<\n/UF (a)\n/EF <<\n/F 5 0 R\n>>\n>>',
      '<<\n/UF (b)\n/EF <<\n/F 5 0 R\n>>\n>>',
      '<<\n>>',
    ])
    expectFault(twice, /damaged/)
  })

  const cyclic: readonly (readonly [string, readonly BuiltObject[]])[] = [
    ['a root that is its own list of names', ['<<\n/Names 1 0 R\n>>']],
    ['names that hold themselves', ['<<\n/Names 2 0 R\n>>', '<<\n/EmbeddedFiles 2 0 R\n/Names [(a) 2 0 R]\n>>']],
    ['a file that is its own entry', [
      '<<\n/Names 2 0 R\n>>',
      '<<\n/EmbeddedFiles <<\n/Names [(a) 3 0 R]\n>>\n>>',
      '<<\n/UF (a)\n/EF <<\n/F 3 0 R\n>>\n>>',
    ]],
    ['a length that is another object', [
      '<<\n/Names 2 0 R\n>>',
      '<<\n/EmbeddedFiles <<\n/Names [(a) 3 0 R]\n>>\n>>',
      '<<\n/UF (a)\n/EF <<\n/F 4 0 R\n>>\n>>',
      { dictionary: '<<\n/Length 4 0 R\n>>', stream: utf8('x') },
    ]],
    ['an object number beyond all', ['<<\n/Names 4294967297 0 R\n>>']],
    ['an object number of many digits', ['<<\n/Names 99999999999999999999 0 R\n>>']],
    ['object 0', ['<<\n/Names 0 0 R\n>>']],
    ['a negative object', ['<<\n/Names -1 0 R\n>>']],
    ['arrays in arrays', [`<<\n/Names ${'['.repeat(100_000)}\n>>`]],
    ['dictionaries in dictionaries', ['<</A'.repeat(100_000)]],
    ['an array without an end', [`<<\n/Names [${'1 '.repeat(1_000_000)}\n>>`]],
    ['a text without an end', [`<<\n/Names (${'('.repeat(100_000)}`]],
    ['a text that ends in its escape', ['<<\n/Names (abc\\']],
    ['a key twice', ['<<\n/Names 1 0 R\n/Names 1 0 R\n>>']],
    ['a name of a megabyte', [`<<\n/${'N'.repeat(2 ** 20)} 1\n>>`]],
    ['no dictionary', ['[1 2 3]']],
    ['nothing', ['']],
  ] // prettier-ignore
  it.each(cyclic)('%s', (_, objects) => {
    expectFault(buildPdf(objects), /damaged|nested|has no object|twice|no files|without/)
  })

  it.each(['-000000001', '9999999999', '0000000000', '99999999999', '00000000x1', '0000000003'])(
    'an object said to stand at %s',
    (offset) => expectFault(buildPdf(['<<\n/Names 1 0 R\n>>'], { offsets: { 1: offset } }), /damaged/),
  )

  it('a table that says it is longer than the file', () => {
    const bytes = Buffer.from(buildPdf(['<<\n>>'])).toString('latin1')
    for (const count of ['3', '999999999', '-1', '0', '99999999999999999999']) {
      expectFault(latin1(bytes.replace('0 2\n', `0 ${count}\n`)), /damaged/)
    }
  })
})
