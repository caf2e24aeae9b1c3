/** The shapes of a drawing in PDF operators, the same in the same order as the SVG of it. */
import type { Drawing, GroupShape, RingsShape, Shape, Style, TextShape } from '../../core/report/drawing'
import type { Paper } from './paper'

export function drawDrawing(drawing: Drawing, x: number, y: number, paper: Paper): void {
  const { doc } = paper
  doc.save().translate(x, y)
  drawShapes(drawing.shapes, paper)
  doc.restore()
}

export function drawShapes(shapes: readonly Shape[], paper: Paper): void {
  for (const shape of shapes) drawShape(shape, paper)
}

function drawShape(shape: Shape, paper: Paper): void {
  switch (shape.kind) {
    case 'rings':
      return drawRings(shape, paper)
    case 'circle':
      if (!shape.fill && !shape.stroke) return
      applyStyle(shape, paper)
      paper.doc.circle(shape.x_pt, shape.y_pt, shape.radius_pt)
      paper.doc.addContent(paintOperator(shape, false))
      return
    case 'text':
      return drawText(shape, paper)
    case 'group':
      return drawGroup(shape, paper)
  }
}

/** Written as one string: tens of thousands of points through pdfkit's own calls would take most of the time. */
function drawRings(shape: RingsShape, paper: Paper): void {
  if (!shape.fill && !shape.stroke) return
  applyStyle(shape, paper)
  paper.doc.addContent(`${ringsPath(shape.rings, shape.closed)}${paintOperator(shape, shape.closed)}`)
}

function ringsPath(rings: readonly (readonly number[])[], closed: boolean): string {
  const parts: string[] = []
  for (const ring of rings) {
    for (let i = 0; i + 1 < ring.length; i += 2) {
      parts.push(`${rounded(ring[i])} ${rounded(ring[i + 1])} ${i === 0 ? 'm' : 'l'}`)
    }
    if (closed && ring.length > 0) parts.push('h')
  }
  parts.push('')
  return parts.join('\n')
}

function rounded(value: number): string {
  return String(Math.round(value * 100) / 100)
}

function applyStyle(style: Style, { doc }: Paper): void {
  if (style.fill) doc.fillColor(style.fill)
  if (!style.stroke) return
  doc
    .strokeColor(style.stroke)
    .lineWidth(style.lineWidth_pt ?? 1)
    .lineJoin('round')
  doc.addContent(`[${(style.dash_pt ?? []).join(' ')}] 0 d`)
}

function paintOperator({ fill, stroke }: Style, evenOdd: boolean): string {
  const rule = evenOdd ? '*' : ''
  if (fill) return stroke ? `B${rule}` : `f${rule}`
  return 'S'
}

function drawGroup(shape: GroupShape, paper: Paper): void {
  const { doc } = paper
  doc.save()
  if (shape.x_pt !== 0 || shape.y_pt !== 0) doc.translate(shape.x_pt, shape.y_pt)
  if (shape.clip) doc.addContent(`${ringsPath(shape.clip, true)}W n`)
  drawShapes(shape.shapes, paper)
  doc.restore()
}

function drawText(shape: TextShape, paper: Paper): void {
  const { doc } = paper
  const look = { font: shape.font, size: shape.size_pt, fill: shape.fill }
  const width = shape.anchor === 'start' ? 0 : paper.measure(shape.text, look)
  const x = shape.x_pt - (shape.anchor === 'middle' ? width / 2 : width)
  if (!shape.angle_deg) return paper.text(shape.text, x, shape.y_pt, look)
  doc.save().rotate(shape.angle_deg, { origin: [shape.x_pt, shape.y_pt] })
  paper.text(shape.text, x, shape.y_pt, look)
  doc.restore()
}
