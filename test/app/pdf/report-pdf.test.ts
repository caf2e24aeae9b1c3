import { deflateSync } from 'node:zlib'
import { afterEach, describe, expect, it } from 'vitest'
import { openPdf } from '../../../app/pdf/pdf-file'
import { readAttachments } from '../../../app/pdf/read-attachments'
import { arithmeticMark, compressionMark } from '../../../app/pdf/making-marks'
import { resultJson } from '../../../core/analysis/result-json'
import { CoreError } from '../../../core/problems/problem'
import { runText } from '../../core/analysis/lots'
import { CSV, makeReport, optionsOf, OWN, PROCEDURE, utf8 } from './reports'

const filesOf = (report: Uint8Array) =>
  new Map(readAttachments(openPdf(report)).map(({ name, bytes }) => [name, new TextDecoder().decode(bytes)]))
const isSame = (a: Uint8Array, b: Uint8Array): boolean => Buffer.compare(a, b) === 0

describe('what a report carries', () => {
  it('is its inputs as read, its result as analyze writes it, and a list of them', async () => {
    const files = filesOf(await makeReport({ ...optionsOf(), date: '2026-03-16' }))
    const { analysis } = runText(CSV, PROCEDURE, 'TB-0417.csv')
    expect([...files.keys()]).toEqual(['TB-0417.csv', 'procedure.json', 'result.json', 'persquare-report.json'])
    expect(files.get('TB-0417.csv')).toBe(CSV)
    expect(files.get('procedure.json')).toBe(PROCEDURE)
    expect(files.get('result.json')).toBe(resultJson(analysis!, OWN))
    expect(JSON.parse(files.get('persquare-report.json')!)).toEqual({
      format: 'persquare-report/1',
      program: { name: 'Persquare', version: '9.8.7' },
      options: { date: '2026-03-16', paper: 'A4' },
      excluded: [],
      decision: null,
      compression: compressionMark(),
      arithmetic: arithmeticMark(),
      readings: [{ attachment: 'TB-0417.csv', name: 'TB-0417.csv' }],
      procedure: { attachment: 'procedure.json', name: 'procedure.json' },
      companions: [],
      result: 'result.json',
    })
  })

  it('keeps files of one name apart', async () => {
    const second = CSV.replaceAll(/^\d,/gm, '3,')
    const same = [
      { name: 'result.json', text: CSV },
      { name: 'result.json', text: second },
    ]
    const files = filesOf(await makeReport(optionsOf(same, { name: 'Result.json', text: PROCEDURE })))
    expect(files.get('Result-2.json')).toBe(PROCEDURE)
    expect(files.get('result-3.json')).toBe(CSV)
    expect(files.get('result-4.json')).toBe(second)
    expect(JSON.parse(files.get('persquare-report.json')!)).toMatchObject({
      readings: [
        { attachment: 'result-3.json', name: 'result.json' },
        { attachment: 'result-4.json', name: 'result.json' },
      ],
    })
  })

  it('keeps bytes that are no UTF-8', async () => {
    const bytes = Uint8Array.from([...utf8(CSV), ...utf8('# temp '), 0xb0, 0x43, 10])
    const options = optionsOf()
    const report = await makeReport({ ...options, inputs: { ...options.inputs, readings: [{ name: 'a.csv', bytes }] } })
    expect(isSame(readAttachments(openPdf(report))[0]!.bytes, bytes)).toBe(true)
  })

  it('adds its inputs compressed, and little else', async () => {
    const noise = (row: number) =>
      Array.from({ length: 4000 }, (_, k) =>
        Math.sin(k + row)
          .toString(36)
          .slice(3, 9),
      ).join('')
    const withNotes = (note: (row: number) => string) =>
      CSV.split('\n')
        .map((line, row) => (line === '' ? '' : `${line},${row === 0 ? 'remark' : note(row)}`))
        .join('\n')
    const [small, large] = [withNotes(() => 'x'), withNotes(noise)]
    const [before, after] = await Promise.all(
      [small, large].map((text) => makeReport(optionsOf([{ name: 'a.csv', text }]))),
    )
    const added = deflateSync(large).length - deflateSync(small).length
    expect(large.length - small.length).toBeGreaterThan(60_000)
    expect(after!.length - before!.length - added).toBeLessThan(100)
  })
})

describe('the same input', () => {
  afterEach(() => void (process.env['TZ'] = 'UTC'))

  it('makes the same bytes', async () => {
    expect(isSame(await makeReport(), await makeReport())).toBe(true)
    expect(isSame(await makeReport(), await makeReport({ ...optionsOf(), paper: 'Letter' }))).toBe(false)
  })

  it.each(['2026-03-16T12:00', '16.03.2026 12:00', '2026-03-16', '2026/03/16', '2026-03-16T12:00:00+09:00'])(
    'makes them wherever it is, with the date %s',
    async (date) => {
      process.env['TZ'] = 'Asia/Tokyo'
      const one = await makeReport({ ...optionsOf(), date })
      process.env['TZ'] = 'America/New_York'
      expect(new Date('2026-03-16T12:00').getUTCHours()).toBe(16)
      expect(isSame(await makeReport({ ...optionsOf(), date }), one)).toBe(true)
    },
  )
})

describe('what can’t travel', () => {
  it('a date that is none', async () => {
    await expect(makeReport({ ...optionsOf(), date: 'soon' })).rejects.toBeInstanceOf(CoreError)
  })

  it('more files than a report may hold', async () => {
    const [head, row] = CSV.split('\n')
    const many = Array.from({ length: 198 }, (_, k) => ({ name: `${k}.csv`, text: `${head}\n${row!.replace('1,1', `1,${k}`)}\n` }))
    await expect(makeReport(optionsOf(many))).rejects.toMatchObject({
      problem: { kind: 'cannot-write', path: 'report.pdf', why: 'no more than 197 files with readings can travel in it' },
    })
    expect(filesOf(await makeReport(optionsOf(many.slice(1)))).size).toBe(200)
  }) // prettier-ignore

  it('readings so alike that nobody could tell them from a trap', async () => {
    const options = optionsOf([{ name: 'a.csv', text: CSV + '\n'.repeat(4e6) }])
    await expect(makeReport(options)).rejects.toMatchObject({
      problem: { kind: 'cannot-write', why: "its inputs can't travel in it: a.csv in it unpacks to far too much" },
    })
  })
})
