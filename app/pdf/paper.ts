/** The paper in the typewriter: a cursor that moves down pages, and the few ways in which ink gets on them. */
import PDFDocument from 'pdfkit'
import { contentHeight_pt, MARGIN_PT, PAPER_SIZES_PT, type ReportDocument } from '../../core/report/document'
import type { FontId } from '../../core/report/drawing'
import { fontFile } from './fonts'
import { plainText } from './text-lines'

export interface Look {
  readonly font: FontId
  readonly size: number
  readonly fill: string
}

export interface RuleLook {
  readonly colour: string
  readonly width: number
}

export type StructureTag = 'Document' | 'Sect' | 'H1' | 'H2' | 'H3' | 'P' | 'L' | 'LI' | 'Table' | 'TR' | 'TH' | 'TD' | 'Figure' | 'Div' // prettier-ignore
type Element = ReturnType<PDFKit.PDFDocument['struct']>

/** By their files, not by registered names: pdfkit 0.20 opens a font anew each time it is asked for by a second name. */
const FONT_FILES = { regular: fontFile('regular'), bold: fontFile('bold'), mono: fontFile('mono') } as const

export class Paper {
  readonly doc: PDFKit.PDFDocument
  readonly left = MARGIN_PT
  readonly top = MARGIN_PT
  readonly width: number
  readonly bottom: number
  private readonly pageWidth: number
  private readonly parents: Element[] = []
  /** At size 1: the same words are measured again and again. */
  private readonly widths = { regular: new Map<string, number>(), bold: new Map<string, number>(), mono: new Map<string, number>() } // prettier-ignore
  y: number = MARGIN_PT

  constructor(report: ReportDocument) {
    const { width, height } = PAPER_SIZES_PT[report.paper]
    this.doc = openDocument(report, [width, height])
    this.pageWidth = width
    this.width = width - 2 * MARGIN_PT
    this.bottom = MARGIN_PT + contentHeight_pt(report.paper)
    const root = this.doc.struct('Document')
    this.doc.addStructure(root)
    this.parents.push(root)
    this.newPage()
  }

  newPage(): void {
    this.doc.addPage()
    this.y = this.top
  }

  /** Goes to a new page unless so much room is left, or the page is still empty. */
  ensure(height: number): void {
    if (this.y + height > this.bottom && this.y > this.top) this.newPage()
  }

  /** Whether so much still fits under the cursor. */
  fits(height: number): boolean {
    return this.y + height <= this.bottom
  }

  /** What is drawn inside is read as one element. */
  leaf(tag: StructureTag, draw: () => void, options: { alt?: string } = {}): void {
    const element = this.doc.struct(tag, options)
    this.parents[this.parents.length - 1].add(element)
    const content = this.doc.markStructureContent(tag)
    draw()
    this.doc.endMarkedContent()
    element.add(content)
    element.end()
  }

  /** Elements inside belong to this one. */
  branch(tag: StructureTag, draw: () => void, options: { title?: string } = {}): void {
    const element = this.doc.struct(tag, options)
    this.parents[this.parents.length - 1].add(element)
    this.parents.push(element)
    draw()
    this.parents.pop()
    element.end()
  }

  /** Ornament that no reader is told of: rules, page numbers. */
  artifact(draw: () => void, type: 'Layout' | 'Pagination' = 'Layout'): void {
    this.doc.markContent('Artifact', { type })
    draw()
    this.doc.endMarkedContent()
  }

  rule(x1: number, y: number, x2: number, { colour, width }: RuleLook): void {
    this.artifact(() => this.doc.lineWidth(width).strokeColor(colour).moveTo(x1, y).lineTo(x2, y).stroke())
  }

  /** One line of text from its baseline. */
  text(content: string, x: number, baseline: number, look: Look): void {
    const shown = plainText(content)
    if (shown.trim() === '') return
    this.doc.font(FONT_FILES[look.font]).fontSize(look.size).fillColor(look.fill)
    this.doc.text(shown, x, baseline, { lineBreak: false, baseline: 'alphabetic' })
  }

  textRight(content: string, right: number, baseline: number, look: Look): void {
    this.text(content, right - this.measure(content, look), baseline, look)
  }

  measure(content: string, { font, size }: Pick<Look, 'font' | 'size'>): number {
    const known = this.widths[font]
    let ems = known.get(content)
    if (ems === undefined) {
      ems = this.doc.font(FONT_FILES[font]).fontSize(1000).widthOfString(plainText(content)) / 1000
      known.set(content, ems)
    }
    return ems * size
  }

  /** An entry of the document's outline that leads to the cursor. */
  bookmark(title: string): void {
    // pdfkit counts the left edge from the right one; the page's width is therefore 0.
    const place = { top: Math.max(0, this.y - 12), left: this.pageWidth }
    ;(this.doc.outline.addItem as (title: string, place: object) => void)(plainText(title), place)
  }

  close(): void {
    while (this.parents.length > 0) this.parents.pop()!.end()
  }
}

/** Every date in the file is the report's own: pdfkit makes the file's id of these entries, and nothing reads the clock. */
function openDocument(report: ReportDocument, size: [number, number]): PDFKit.PDFDocument {
  const date = new Date(report.date)
  if (Number.isNaN(date.getTime())) throw new Error(`The report's date is no date: ${report.date}`)
  const doc = new PDFDocument({
    size,
    margin: 0,
    autoFirstPage: false,
    bufferPages: true,
    pdfVersion: '1.7',
    tagged: true,
    lang: report.language,
    displayTitle: true,
    font: FONT_FILES.regular,
    info: {
      Title: plainText(report.title),
      Subject: plainText(report.subject),
      Creator: report.program,
      Producer: `${report.program}, PDFKit`,
      CreationDate: date,
      ModDate: date,
    },
  })
  escapeXmpEntries(doc)
  return doc
}

interface XmpWriter {
  info: Record<string, unknown>
  _addInfo(): void
}

/** pdfkit 0.20 writes the entries into its XML as they stand: an ampersand in a lot's name would break it. */
function escapeXmpEntries(doc: PDFKit.PDFDocument): void {
  const writer = doc as unknown as XmpWriter
  const addInfo = writer._addInfo.bind(writer)
  writer._addInfo = () => {
    const entries = writer.info
    writer.info = Object.fromEntries(Object.entries(entries).map(([key, value]) => [key, typeof value === 'string' ? escapeXml(value) : value])) // prettier-ignore
    addInfo()
    writer.info = entries
  }
}

function escapeXml(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;')
}
