/** A drawing as an SVG text. Coordinates are rounded to a hundredth of a point, so that the text is the same anywhere. */
import type { Drawing, Shape, Style, TextShape } from './drawing'

const FONT_FAMILIES = {
  regular: `font-family="DejaVu Sans Condensed, DejaVu Sans, sans-serif"`,
  bold: `font-family="DejaVu Sans Condensed, DejaVu Sans, sans-serif" font-weight="bold"`,
  mono: `font-family="DejaVu Sans Mono, monospace"`,
} as const

export interface SvgOptions {
  /** Begins every id in the SVG; needed where several stand in one page. */
  readonly idPrefix?: string
}

export function toSvg(drawing: Drawing, options: SvgOptions = {}): string {
  const prefix = options.idPrefix ?? 'drawing'
  const ids = { next: 0, prefix }
  const width = number(drawing.width_pt)
  const height = number(drawing.height_pt)
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${width} ${height}" width="${width}pt" height="${height}pt"` +
      ` role="img" aria-labelledby="${escapeXml(prefix)}-title ${escapeXml(prefix)}-desc">`,
    `<title id="${escapeXml(prefix)}-title">${escapeXml(drawing.title)}</title>`,
    `<desc id="${escapeXml(prefix)}-desc">${escapeXml(drawing.description)}</desc>`,
    ...drawing.shapes.map((shape) => shapeSvg(shape, ids)),
    '</svg>',
    '',
  ].join('\n')
}

interface Ids {
  next: number
  readonly prefix: string
}

function shapeSvg(shape: Shape, ids: Ids): string {
  switch (shape.kind) {
    case 'rings':
      return `<path d="${ringsPath(shape.rings, shape.closed)}"${styleSvg(shape, shape.closed)}/>`
    case 'circle':
      return `<circle cx="${number(shape.x_pt)}" cy="${number(shape.y_pt)}" r="${number(shape.radius_pt)}"${styleSvg(shape, false)}/>`
    case 'text':
      return textSvg(shape)
    case 'group': {
      const inner = shape.shapes.map((each) => shapeSvg(each, ids)).join('\n')
      const place =
        shape.x_pt || shape.y_pt ? ` transform="translate(${number(shape.x_pt)} ${number(shape.y_pt)})"` : ''
      if (!shape.clip) return `<g${place}>\n${inner}\n</g>`
      const id = escapeXml(`${ids.prefix}-clip-${++ids.next}`)
      const clip = `<clipPath id="${id}"><path d="${ringsPath(shape.clip, true)}"/></clipPath>`
      return `<g${place}>\n${clip}\n<g clip-path="url(#${id})">\n${inner}\n</g>\n</g>`
    }
  }
}

function textSvg(shape: TextShape): string {
  const turn = shape.angle_deg
    ? ` transform="rotate(${number(shape.angle_deg)} ${number(shape.x_pt)} ${number(shape.y_pt)})"`
    : ''
  const anchor = shape.anchor === 'start' ? '' : ` text-anchor="${shape.anchor}"`
  return (
    `<text x="${number(shape.x_pt)}" y="${number(shape.y_pt)}" font-size="${number(shape.size_pt)}"` +
    ` ${FONT_FAMILIES[shape.font]}${anchor} fill="${shape.fill}"${turn}>${escapeXml(shape.text)}</text>`
  )
}

function styleSvg(style: Style, evenOdd: boolean): string {
  const fill = ` fill="${style.fill ?? 'none'}"` + (style.fill && evenOdd ? ' fill-rule="evenodd"' : '')
  if (!style.stroke) return fill
  const dash = style.dash_pt ? ` stroke-dasharray="${style.dash_pt.map(number).join(' ')}"` : ''
  return `${fill} stroke="${style.stroke}" stroke-width="${number(style.lineWidth_pt ?? 1)}" stroke-linejoin="round"${dash}`
}

function ringsPath(rings: readonly (readonly number[])[], closed: boolean): string {
  const parts: string[] = []
  for (const ring of rings) {
    for (let i = 0; i + 1 < ring.length; i += 2) {
      parts.push(`${i === 0 ? 'M' : 'L'}${number(ring[i])} ${number(ring[i + 1])}`)
    }
    if (closed && ring.length > 0) parts.push('Z')
  }
  return parts.join('')
}

function number(value: number): string {
  const rounded = Math.round(value * 100) / 100
  return Object.is(rounded, -0) ? '0' : String(rounded)
}

/** Characters XML can't hold, such as control codes in a name from a file, become spaces. */
function escapeXml(content: string): string {
  return content
    .replace(/[^\t\n\r\u0020-\ud7ff\ue000-\ufffd\u{10000}-\u{10ffff}]/gu, ' ')
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;')
}
