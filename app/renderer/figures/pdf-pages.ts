/** The pages of a PDF as pictures. The library that reads PDF is loaded when the first is shown. */
import type { PDFDocumentProxy } from 'pdfjs-dist'

export interface PdfPages {
  readonly count: number
  /** Height over width of each page. */
  readonly shapes: readonly number[]
  /** Paints page `index` (from 0) as wide as the canvas is on the screen. */
  paint(index: number, canvas: HTMLCanvasElement): Promise<void>
  close(): void
}

/** More would blow the memory of a page that is only read. */
const MOST_PIXELS_ACROSS = 2400

/** Rejects where the bytes are no PDF. */
export async function openPdf(bytes: Uint8Array): Promise<PdfPages> {
  const { getDocument, GlobalWorkerOptions } = await import('pdfjs-dist')
  GlobalWorkerOptions.workerPort ??= new Worker(new URL('pdfjs-dist/build/pdf.worker.mjs', import.meta.url), {
    type: 'module',
  })
  // A copy: the library takes the memory that it is given.
  const task = getDocument({ data: bytes.slice(), isEvalSupported: false, useWasm: false, useSystemFonts: false })
  const document = await task.promise
  return {
    count: document.numPages,
    shapes: await shapesOf(document),
    paint: (index, canvas) => paintPage(document, index, canvas),
    close: () => void task.destroy(),
  }
}

async function shapesOf(document: PDFDocumentProxy): Promise<number[]> {
  const shapes: number[] = []
  for (let page = 1; page <= document.numPages; page++) {
    const { width, height } = (await document.getPage(page)).getViewport({ scale: 1 })
    shapes.push(height / width)
  }
  return shapes
}

async function paintPage(document: PDFDocumentProxy, index: number, canvas: HTMLCanvasElement): Promise<void> {
  const page = await document.getPage(index + 1)
  const whole = page.getViewport({ scale: 1 })
  const across = Math.min(MOST_PIXELS_ACROSS, canvas.clientWidth * (window.devicePixelRatio || 1))
  const viewport = page.getViewport({ scale: across / whole.width })
  canvas.width = Math.round(viewport.width)
  canvas.height = Math.round(viewport.height)
  await page.render({ canvas, viewport }).promise
}
