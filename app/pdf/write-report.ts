/** The report as PDF: vector, searchable, tagged, and the same bytes for the same document. */
import { INK, QUIET_INK, RULE } from '../../core/report/figures/ink'
import { PAPER_SIZES_PT, type Block, type ReportDocument } from '../../core/report/document'
import { drawBlock, startHeight } from './blocks/block'
import { SMALL_PT } from './fonts'
import { Paper, type Look } from './paper'

/** A file that travels inside the report. */
export interface ReportAttachment {
  readonly name: string
  readonly bytes: Uint8Array
  /** Media type, e.g. `text/csv`. */
  readonly mime: string
  readonly description: string
}

export interface RenderOptions {
  readonly attachments?: readonly ReportAttachment[]
}

export async function renderReportPdf(report: ReportDocument, options: RenderOptions = {}): Promise<Uint8Array> {
  const paper = new Paper(report)
  const bytes = collected(paper.doc)
  drawBlocks(report.blocks, paper)
  drawFooters(report, paper)
  paper.close()
  options.attachments?.forEach((attachment, place) => attach(attachment, place, report.date, paper.doc))
  paper.doc.end()
  return bytes
}

function drawBlocks(blocks: readonly Block[], paper: Paper): void {
  const place = { x: paper.left, width: paper.width }
  blocks.forEach((block, i) => {
    paper.ensure(heightToStart(blocks, i, paper))
    drawBlock(block, paper, place)
  })
}

/** A heading is never the last thing on a page: what follows it must begin there too. */
function heightToStart(blocks: readonly Block[], from: number, paper: Paper): number {
  let height = 0
  for (let i = from; i < blocks.length; i++) {
    const block = blocks[i]
    if (block.kind === 'page-break') break
    height += startHeight(block, paper, paper.width)
    if (block.kind !== 'heading') break
  }
  return height
}

const FOOTER: Look = { font: 'regular', size: SMALL_PT, fill: QUIET_INK }

function drawFooters({ footer, paper: size }: ReportDocument, paper: Paper): void {
  const { start, count } = paper.doc.bufferedPageRange()
  const baseline = PAPER_SIZES_PT[size].height - 34
  for (let page = start; page < start + count; page++) {
    paper.doc.switchToPage(page)
    const number = `page ${page - start + 1} of ${count}`
    paper.artifact(() => {
      paper.doc.lineWidth(0.4).strokeColor(RULE)
      paper.doc.moveTo(paper.left, baseline - 11).lineTo(paper.left + paper.width, baseline - 11).stroke() // prettier-ignore
      paper.text(footer, paper.left, baseline, { ...FOOTER, fill: INK })
      paper.textRight(number, paper.left + paper.width, baseline, FOOTER)
    }, 'Pagination') // prettier-ignore
  }
}

/**
 * The list of files is kept in the order of its keys. Keys that are numbers stand in one order everywhere; pdfkit would
 * take the names, and sort them as the machine's language does.
 */
function attach(attachment: ReportAttachment, place: number, date: string, doc: PDFKit.PDFDocument): void {
  const { name, bytes, mime, description } = attachment
  const made = new Date(date)
  const options = { name, type: mime, description, creationDate: made, modifiedDate: made, hidden: true }
  const entry = doc.file(Buffer.from(bytes), options) as unknown as PDFKit.PDFKitReference
  doc.addNamedEmbeddedFile(String(place).padStart(4, '0'), entry)
}

function collected(doc: PDFKit.PDFDocument): Promise<Uint8Array> {
  return new Promise((resolve, reject) => {
    const chunks: Uint8Array[] = []
    doc.on('data', (chunk: Uint8Array) => chunks.push(chunk))
    doc.on('end', () => resolve(new Uint8Array(Buffer.concat(chunks))))
    doc.on('error', reject)
  })
}
