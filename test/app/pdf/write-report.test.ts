import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { renderReportPdf } from '../../../app/pdf/write-report'
import type { Block, ReportDocument } from '../../../core/report/document'
import { lotReport } from '../../../core/report/lot-report'
import { syntheticLot, syntheticSources, syntheticWorking } from '../../fixtures/report/synthetic-lot'

function report(paper: 'A4' | 'Letter' = 'A4'): ReportDocument {
  return lotReport({
    analysis: syntheticLot(),
    working: syntheticWorking,
    date: '2026-03-14T09:30:00+01:00',
    program: 'Persquare 0.1.0',
    paper,
    sources: syntheticSources,
  })
}

/** Poppler's tools, where they are installed. */
const hasPoppler = spawnSync('pdftotext', ['-v']).status === 0

function poppler(tool: string, ...args: string[]): string {
  return spawnSync(tool, args, { encoding: 'utf8', maxBuffer: 1e8 }).stdout
}

let bytes: Uint8Array
let folder: string
let file: string

beforeAll(async () => {
  bytes = await renderReportPdf(report())
  folder = mkdtempSync(join(tmpdir(), 'report-'))
  file = join(folder, 'report.pdf')
  writeFileSync(file, bytes)
})
afterAll(() => rmSync(folder, { recursive: true }))

describe('the report as PDF', () => {
  it('is small, and the same bytes for the same document', async () => {
    expect(bytes.length).toBeLessThan(2e6)
    const again = await renderReportPdf(report())
    expect(Buffer.compare(Buffer.from(bytes), Buffer.from(again))).toBe(0)
  })

  it('changes with its date, and takes no other', async () => {
    const later = await renderReportPdf({ ...report(), date: '2027-01-02T03:04:05Z' })
    const dates = Buffer.from(later)
      .toString('latin1')
      .match(/D:\d{14}Z/g)
    expect(new Set(dates)).toEqual(new Set(['D:20270102030405Z']))
    expect(Buffer.compare(Buffer.from(bytes), Buffer.from(later))).not.toBe(0)
    await expect(renderReportPdf({ ...report(), date: 'some day' })).rejects.toThrow('no date')
  })

  it('is tagged, names its language, and shows its title', () => {
    const text = Buffer.from(bytes).toString('latin1')
    expect(text).toMatch(/\/Marked true/)
    expect(text).toMatch(/\/Lang \(en\)/)
    expect(text).toMatch(/\/DisplayDocTitle true/)
    expect(text.match(/\/S \/Figure/g)!.length).toBeGreaterThan(75)
    expect(text.match(/\/S \/Figure\n\/Alt/g)!.length).toBe(text.match(/\/S \/Figure/g)!.length)
  })

  it('keeps its XML sound whatever a lot is called', async () => {
    const odd = await renderReportPdf({ ...report(), title: 'Lot A&B <1>', blocks: [] })
    const text = Buffer.from(odd).toString('latin1')
    expect(text).toContain('<rdf:li xml:lang="x-default">Lot A&amp;B &lt;1&gt;</rdf:li>')
  })

  it('carries files inside, with the date of the report', async () => {
    const attachments = [{ name: 'TB-0417.csv', bytes: Buffer.from('wafer,site\n01,1\n'), mime: 'text/csv', description: 'Readings' }] // prettier-ignore
    const first = await renderReportPdf({ ...report(), blocks: [] }, { attachments })
    const second = await renderReportPdf({ ...report(), blocks: [] }, { attachments })
    expect(Buffer.compare(Buffer.from(first), Buffer.from(second))).toBe(0)
    const text = Buffer.from(first).toString('latin1')
    expect(text).toContain('/EmbeddedFiles')
    expect(text).toContain('(TB-0417.csv)')
    expect(new Set(text.match(/D:\d{14}Z/g))).toEqual(new Set(['D:20260314083000Z']))
  })

  it('repeats a table’s header where the table breaks', async () => {
    const rows = Array.from({ length: 120 }, (_, i) => ({ cells: [`row ${i}`] }))
    const table: Block = { kind: 'table', summary: 'Long', columns: [{ title: 'Heading', align: 'left', share: 1 }], rows } // prettier-ignore
    const long = await renderReportPdf({ ...report(), blocks: [table] })
    const text = Buffer.from(long).toString('latin1')
    const pages = text.match(/\/Type \/Page\n/g)!.length
    expect(pages).toBeGreaterThan(1)
    expect(text.match(/\/S \/TH\n/g)!.length).toBe(pages)
  })
})

describe.skipIf(!hasPoppler)('the report as Poppler reads it', () => {
  it('has its text, with Ω, µ and superscripts', () => {
    const text = poppler('pdftotext', '-layout', file, '-')
    for (const part of [
      'Lot TB-0417',
      'Out of spec',
      'Ω/sq',
      'µm',
      '1.43 × 10²⁰',
      'cm⁻³',
      '100 s / mean',
      'page 1 of',
    ]) {
      expect(text).toContain(part)
    }
  })

  it('has a page for each wafer', () => {
    const pages = poppler('pdftotext', file, '-').split('\f')
    const begun = pages.filter((page) => /^Wafer \d\d\n/.test(page))
    expect(begun).toHaveLength(25)
    for (const page of begun) expect(page).toContain('Standard deviation')
  })

  it('embeds subsets of its typefaces and no other', () => {
    const fonts = poppler('pdffonts', file).trim().split('\n').slice(2)
    expect(fonts).toHaveLength(3)
    for (const font of fonts) expect(font).toMatch(/^[A-Z]{6}\+DejaVuSans.* yes yes yes /)
  })

  it('fits Letter as well', async () => {
    const letter = join(folder, 'letter.pdf')
    writeFileSync(letter, await renderReportPdf(report('Letter')))
    expect(poppler('pdfinfo', letter)).toMatch(/Page size: +612 x 792 pts \(letter\)/)
    const begun = poppler('pdftotext', letter, '-').split('\f').filter((page) => /^Wafer \d\d\n/.test(page)) // prettier-ignore
    for (const page of begun) expect(page).toContain('Mobility model')
  })
})
