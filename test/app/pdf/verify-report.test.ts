import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { deflateSync, inflateSync } from 'node:zlib'
import { describe, expect, it, vi } from 'vitest'
import { openPdf } from '../../../app/pdf/pdf-file'
import { readAttachments } from '../../../app/pdf/read-attachments'
import type { NamedBytes } from '../../../app/pdf/report-contents'
import type * as ReportPdf from '../../../app/pdf/report-pdf'
import { verifyReport, type Verification } from '../../../app/pdf/verify-report'
import type { ReportAttachment } from '../../../app/pdf/write-report'
import { ABSENT } from '../../../core/analysis/compare-results'
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import { CoreError } from '../../../core/problems/problem'
import { CSV, latin1, makeReport, optionsOf, OWN, PROCEDURE, renderPages, utf8 } from './reports'

// Hundreds of reports here have the same inputs: each is made again once, and then remembered.
vi.mock('../../../app/pdf/report-pdf', async (original) => {
  const { reportPdf } = await original<typeof ReportPdf>()
  const made = new Map<string, Promise<Uint8Array>>()
  return {
    reportPdf: (analysis: LotAnalysis, options: ReportPdf.ReportPdfOptions) => {
      const { inputs, ...rest } = options
      const digest = createHash('sha256').update(JSON.stringify(rest))
      for (const { name, bytes } of [...inputs.readings, inputs.procedure, ...(inputs.companions ?? [])])
        digest.update(name).update(bytes)
      const key = digest.update(JSON.stringify(analysis.excluded)).digest('hex')
      if (!made.has(key)) made.set(key, reportPdf(analysis, options))
      return made.get(key)!
    },
  }
})

const verify = (bytes: Uint8Array, own: { program: string; version: string } = OWN) =>
  verifyReport(bytes, { file: 'report.pdf', ...own })

/** What the command would end with. */
async function statusOf(bytes: Uint8Array): Promise<0 | 1 | 2> {
  try {
    return (await verify(bytes)).isSame ? 0 : 1
  } catch (error) {
    if (error instanceof CoreError && error.problem.kind === 'cannot-read') return 2
    throw error
  }
}

const attachmentsOf = (report: Uint8Array): readonly ReportAttachment[] =>
  readAttachments(openPdf(report)).map((file) => ({ ...file, mime: 'text/plain', description: 'x' }))

/** Another PDF of our kind around the same files, one of them written anew. */
async function withFile(name: string, rewrite: (text: string) => string, report?: Uint8Array): Promise<Uint8Array> {
  const files = attachmentsOf(report ?? (await makeReport()))
  const text = (bytes: Uint8Array) => new TextDecoder().decode(bytes)
  return renderPages(
    'Any words',
    files.map((file) => (file.name === name ? { ...file, bytes: utf8(rewrite(text(file.bytes))) } : file)),
  )
}

/**
 * The same objects with every stream packed at another level, as another build of the compressor would; `edit` may change
 * what a stream holds.
 */
function repacked(report: Uint8Array, edit = (content: string) => content): Uint8Array {
  const { offsets, tableAt } = openPdf(report)
  const text = Buffer.from(report).toString('latin1')
  const starts = [...offsets.slice(1)].sort((a, b) => a - b)
  const moved = new Map<number, number>()
  let out = text.slice(0, starts[0])
  starts.forEach((start, k) => {
    moved.set(start, out.length)
    out += repackedObject(text.slice(start, starts[k + 1] ?? tableAt), edit)
  })
  const entries = [...offsets.slice(1)].map((start) => `${String(moved.get(start)).padStart(10, '0')} 00000 n \n`)
  const table = text.slice(tableAt, text.indexOf('f \n', tableAt) + 3) + entries.join('')
  const trailer = text.slice(text.indexOf('trailer\n', tableAt)).replace(/startxref\n\d+/, `startxref\n${out.length}`)
  return latin1(out + table + trailer)
}

function repackedObject(object: string, edit: (content: string) => string): string {
  const at = object.indexOf('\nstream\n')
  if (at < 0 || !object.slice(0, at).includes('/FlateDecode')) return object
  const packed = latin1(object.slice(at + '\nstream\n'.length, -'\nendstream\nendobj\n'.length))
  const content = edit(inflateSync(packed).toString('latin1'))
  const stream = deflateSync(latin1(content), { level: 1 })
  const dictionary = object.slice(0, at).replace(/\/Length \d+/, `/Length ${stream.length}`)
  return `${dictionary}\nstream\n${stream.toString('latin1')}\nendstream\nendobj\n`
}

describe('a report as it was made', () => {
  it('is the same to the last byte', async () => {
    expect(await verify(await makeReport())).toEqual<Verification>({
      isSame: true,
      madeBy: OWN,
      inputs: ['TB-0417.csv', 'procedure.json'],
      sentence: expect.any(String) as string,
      result: { differences: [], count: 0 },
      isRewritten: false,
      problems: [],
      tolerance: 0,
      pages: { how: 'bytes', places: [] },
    })
  })

  it('is so with its options, and with names that had to be changed to travel', async () => {
    const rows = CSV.split('\n')
    const part = (from: number, to: number) => [rows[0], ...rows.slice(from, to)].join('\n')
    const options = {
      ...optionsOf(
        [
          { name: 'result.json', text: part(1, 3) },
          { name: 'result.json', text: part(3, 4) },
        ],
        { name: '../Prüfung\n.json', text: PROCEDURE },
      ),
      date: '2026-03-16T12:00:00+01:00',
      paper: 'Letter',
    } as const
    const { isSame, inputs } = await verify(await makeReport(options))
    expect(isSame).toBe(true)
    expect(inputs).toEqual(['result.json', 'result.json', '../Prüfung\n.json'])
  })
})

describe('a report whose procedure names a file', () => {
  const name = 'tb-0417-boron-profile.csv'
  const bytes = new Uint8Array(readFileSync(join(import.meta.dirname, '../../fixtures/layer', name)))
  const background = { dopant: 'phosphorus', concentrationCm3: 1e15 }
  const layer = { kind: 'doped-layer', dopant: 'boron', profile: 'tabulated', profileFile: name, background }
  const procedure = JSON.stringify({ ...(JSON.parse(PROCEDURE) as object), layer })
  const made = (companions: readonly NamedBytes[]): Promise<Uint8Array> => {
    const options = optionsOf(undefined, { name: 'procedure.json', text: procedure })
    return makeReport({ ...options, inputs: { ...options.inputs, companions } })
  }

  it('carries that file and no other, and is made again with it', async () => {
    const report = await made([{ name: 'stray.csv', bytes: utf8('1') }, { name, bytes }])
    expect(attachmentsOf(report).map((file) => file.name)).toEqual([
      'TB-0417.csv', 'procedure.json', name, 'result.json', 'persquare-report.json',
    ])
    expect(await verify(report)).toMatchObject({ isSame: true, inputs: ['TB-0417.csv', 'procedure.json', name] })
  }) // prettier-ignore

  it('is another with another such file', async () => {
    const thinner = (text: string) => text.replace(/^\d+.*\n/m, '')
    const { isSame, problems, result } = await verify(await withFile(name, thinner, await made([{ name, bytes }])))
    expect(isSame).toBe(false)
    expect(problems.length + (result?.count ?? 0)).toBeGreaterThan(0)
  })
})

describe('a report with a person’s part in it', () => {
  const excluded = [{ wafer: '1', site: '2', reason: 'scratch' }]
  const decision = { decision: 'hold', name: 'A. Person', comment: '', date: '2026-03-16T12:00:00+01:00' } as const
  const made = (): Promise<Uint8Array> => makeReport({ ...optionsOf(), decision }, excluded)
  const manifest = (report: Uint8Array) =>
    JSON.parse(new TextDecoder().decode(attachmentsOf(report).at(-1)!.bytes)) as Record<string, unknown>

  it('carries the sites that were taken out and the decision, and is made again with both', async () => {
    expect(manifest(await made())).toMatchObject({ excluded, decision })
    expect(await verify(await made())).toMatchObject({ isSame: true, pages: { how: 'bytes', places: [] } })
  })

  it('is another without the one or the other', async () => {
    const without = await withFile('persquare-report.json', (text) => text.replace(/"excluded": \[[^\]]*\]/, '"excluded": []'), await made()) // prettier-ignore
    expect((await verify(without)).result!.differences.map(({ path }) => path)).toContain('excluded[0]')
    const released = await withFile(
      'persquare-report.json',
      (text) => text.replace('"hold"', '"release"'),
      await made(),
    )
    const { result, pages } = await verify(released)
    expect(result!.count).toBe(0)
    expect(pages.places).toContain('page 1')
    expect(await statusOf(await withFile('persquare-report.json', (text) => text.replace('"hold"', '"sell"'), await made()))).toBe(2) // prettier-ignore
  })
})

describe('a report that was changed', () => {
  it('names a digit of the result', async () => {
    const report = await withFile('result.json', (text) =>
      text.replace(/("wafers": \[[^]*?"mean": )[\d.]+/, (_, before: string) => `${before}91.5`),
    )
    const { isSame, result, pages } = await verify(report)
    expect(isSame).toBe(false)
    expect(result!.differences).toEqual([
      {
        path: 'wafers[0].statistics.mean',
        before: 91.5,
        after: expect.closeTo((20.3 * Math.PI) / Math.LN2, 9) as number,
      },
    ])
    expect(pages.places).toContain('page 1')
  })

  it('names a value that was taken out and one that was put in', async () => {
    const report = await withFile('result.json', (text) => text.replace('"verdict"', '"verdikt"'))
    const { differences, count } = (await verify(report)).result!
    expect(count).toBe(2)
    expect(differences.map(({ path, after }) => [path, after === ABSENT])).toEqual([
      ['lot.verdikt', true],
      ['lot.verdict', false],
    ])
  })

  it('tells a result that says the same in another writing', async () => {
    const { isSame, isRewritten, result } = await verify(
      await withFile('result.json', (text) => text.replace(/\n */g, '')),
    )
    expect({ isSame, isRewritten, count: result!.count }).toEqual({ isSame: false, isRewritten: true, count: 0 })
  })

  it('finds readings that give another result', async () => {
    const { result } = await verify(await withFile('TB-0417.csv', (text) => text.replace('0.0102', '0.0103')))
    const paths = result!.differences.map(({ path }) => path)
    expect(paths).toContain('inputs[0].sha256')
    expect(paths).toContain('wafers[0].statistics.mean')
  })

  it('finds pages that say something else, and which', async () => {
    const report = await makeReport()
    const { isSame, result, pages } = await verify(await renderPages('All is well', attachmentsOf(report)))
    expect(isSame).toBe(false)
    expect(result!.count).toBe(0)
    expect(pages.places[0]).toBe('page 1')
    expect(pages.places).toContain('there is less in it than comes out')
  })

  it('says why nothing comes out of inputs that are no use', async () => {
    const { isSame, result, problems } = await verify(await withFile('procedure.json', () => '{}'))
    expect(isSame).toBe(false)
    expect(result).toBeNull()
    expect(problems).toMatchObject([{ kind: 'missing-key', key: 'format' }])
  })

  it('does not take apart a result of quite another size', async () => {
    const { result } = await verify(await withFile('result.json', () => `[${[...Array(1e6).keys()].join()}]`))
    expect(result).toMatchObject({ count: 1, differences: [{ path: '', before: '6888891 characters' }] })
  })

  it.each([
    ['a list of files that is no JSON', 'persquare-report.json', () => '{'],
    ['a list of another edition', 'persquare-report.json', (text: string) => text.replace('report/1', 'report/2')],
    ['a list that names a file that is not there', 'persquare-report.json', (text: string) => text.replace('TB-0417', 'TB')],
    ['a list that names a file twice', 'persquare-report.json', (text: string) => text.replace('"TB-0417.csv"', '"procedure.json"')],
    ['a date that is none', 'persquare-report.json', (text: string) => text.replace('"date": null', '"date": "soon"')],
    ['a paper that is none', 'persquare-report.json', (text: string) => text.replace('A4', 'A5')],
    ['a list without readings', 'persquare-report.json', (text: string) => text.replace(/"readings": \[[^\]]*\]/, '"readings": []')],
    ['a result that is no JSON', 'result.json', (text: string) => text.slice(1)],
    ['a result that is no text', 'result.json', () => '\ud800'],
  ])('refuses %s', async (_, name, rewrite) => {
    const status = await statusOf(await withFile(name, rewrite))
    expect(status).toBe(2)
  }) // prettier-ignore

  it('refuses a file that nobody listed, and a PDF with any other files', async () => {
    const more = { name: 'more.txt', bytes: utf8('x'), mime: 'text/plain', description: 'x' }
    expect(await statusOf(await renderPages('x', [...attachmentsOf(await makeReport()), more]))).toBe(2)
    expect(await statusOf(await renderPages('x', [more]))).toBe(2)
  })
})

describe('a single bit of a report', () => {
  it('is missed at none of 300 places', async () => {
    const report = await makeReport()
    const statuses = new Map<number, number>()
    let state = 20_260_316
    const next = (below: number): number => (state = (state * 48_271) % 2_147_483_647) % below
    for (let k = 0; k < 300; k++) {
      const changed = Uint8Array.from(report)
      const at = next(report.length)
      changed[at]! ^= 1 << next(8)
      const status = await statusOf(changed)
      expect(status, `byte ${at}`).not.toBe(0)
      statuses.set(status, (statuses.get(status) ?? 0) + 1)
    }
    // Both happen: what can't be read, and what reads well but isn't what comes out.
    expect(statuses.get(1)).toBeGreaterThan(50)
    expect(statuses.get(2)).toBeGreaterThan(20)
  })

  it('is missed nowhere in its first and last hundred bytes, nor in its attachments', async () => {
    const report = await makeReport()
    const text = Buffer.from(report).toString('latin1')
    const first = text.indexOf('/EmbeddedFile\n')
    const places = [...Array(100).keys()].flatMap((k) => [k, report.length - 1 - k, first + 3 * k])
    for (const at of places) {
      const changed = Uint8Array.from(report)
      changed[at]! ^= 1
      expect(await statusOf(changed), `byte ${at}`).not.toBe(0)
    }
  })
})

describe('a report of another version', () => {
  it('has its result compared to the digit and its pages left alone', async () => {
    const report = await makeReport()
    expect(await verify(report, { program: 'Persquare', version: '10.0.0' })).toMatchObject({
      isSame: true,
      madeBy: OWN,
      result: { count: 0 },
      pages: { how: 'none', places: [] },
    })
    const changed = await withFile('result.json', (text) => text.replace(/"mean": [\d.]+/, '"mean": 91.5'))
    expect(await verify(changed, { program: 'Persquare', version: '10.0.0' })).toMatchObject({
      isSame: false,
      result: { count: 1 },
    })
  })

  it('is not taken at its word about its version', async () => {
    const report = await withFile('persquare-report.json', (text) => text.replace('9.8.7', '9.8.8'))
    expect((await verify(report)).result!.differences).toEqual([
      { path: 'program.version', before: '9.8.7', after: '9.8.8' },
    ])
  })
})

describe('a report of a computer that compresses in another way', () => {
  const elsewhere = () => makeReport({ ...optionsOf(), compression: 'elsewhere' })

  it('says the same, found by what its streams hold', async () => {
    const report = repacked(await elsewhere())
    expect(Buffer.compare(report, await elsewhere())).not.toBe(0)
    expect(await verify(report)).toMatchObject({ isSame: true, pages: { how: 'contents', places: [] } })
  })

  it('is found out all the same where a page was changed', async () => {
    const edit = (content: string) => content.replace(/<([0-9a-f]{4})/, (found) => found.replace(/.$/, (d) => (d === '0' ? '1' : '0'))) // prettier-ignore
    const report = repacked(await elsewhere(), (content) => (content.includes('BDC') ? edit(content) : content))
    const { isSame, pages } = await verify(report)
    expect(isSame).toBe(false)
    expect(pages.how).toBe('contents')
    expect(pages.places).toContain('page 1')
  })

  it('is found out where its result was, and only there', async () => {
    const edit = (content: string) => content.replace('"count": 2', '"count": 3')
    const { result, pages } = await verify(repacked(await elsewhere(), edit))
    expect(result!.differences).toEqual([{ path: 'lot.statistics.count', before: 3, after: 2 }])
    expect(pages.places).toEqual(['the attached result.json'])
  })

  it('is found out where anything else was', async () => {
    const text = Buffer.from(repacked(await elsewhere())).toString('latin1')
    for (const [was, is] of [['/Lang (en)', '/Lang (de)'], ['%PDF-1.7', '%PDF-1.6'], ['(Persquare 9.8.7)', '(Persquare 9.8.8)']]) {
      expect(text).toContain(was)
      expect((await verify(latin1(text.replace(was!, is!)))).isSame, was).toBe(false)
    }
  }) // prettier-ignore

  it('is held to its bytes where it says that it compresses as we do', async () => {
    const { isSame, pages } = await verify(repacked(await makeReport()))
    expect(isSame).toBe(false)
    expect(pages.how).toBe('bytes')
  })
})

describe('a report of an engine that rounds otherwise', () => {
  const elsewhere = () => makeReport({ ...optionsOf(), arithmetic: 'elsewhere', compression: 'elsewhere' })
  /** The first number of the kind, moved by a share of itself. */
  const moved = (content: string, key: string, share: number): string =>
    content.replace(new RegExp(`"${key}": ([\\d.]+)`), (_, number: string) => `"${key}": ${Number(number) * (1 + share)}`)

  it('is the same to within rounding', async () => {
    const report = repacked(await elsewhere(), (content) => moved(content, 'mean', 3e-10))
    expect(await verify(report)).toMatchObject({ isSame: true, tolerance: 1e-7, pages: { how: 'rounding', places: [] } })
  })

  it('is found out where a number differs by more', async () => {
    const { isSame, result } = await verify(repacked(await elsewhere(), (content) => moved(content, 'mean', 1e-6)))
    expect(isSame).toBe(false)
    expect(result!.differences.map(({ path }) => path)).toEqual(['lot.statistics.mean'])
  })

  it('may draw a hair beside, and no more', async () => {
    const nudge = (by: number) => (content: string) =>
      content.includes('BDC') ? content.replace(/(\d+\.\d+) m\b/, (_, y: string) => `${Number(y) + by} m`) : content
    expect((await verify(repacked(await elsewhere(), nudge(0.0004)))).isSame).toBe(true)
    const { isSame, pages } = await verify(repacked(await elsewhere(), nudge(0.5)))
    expect([isSame, pages.places]).toEqual([false, expect.arrayContaining(['page 1'])])
  })

  it('is found out where a word of a page was changed', async () => {
    const edit = (content: string) => (content.includes('BDC') ? content.replace(/<([0-9a-f]{4})/, (found) => found.replace(/.$/, (d) => (d === '0' ? '1' : '0'))) : content)
    const { isSame, pages } = await verify(repacked(await elsewhere(), edit))
    expect(isSame).toBe(false)
    expect(pages.places).toContain('page 1')
  })
}) // prettier-ignore
