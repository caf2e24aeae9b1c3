/**
 * A vector figure as plain data, in points with y downward. The window makes SVG of it, the report PDF; both draw the
 * same shapes in the same order.
 */
export interface Drawing {
  readonly width_pt: number
  readonly height_pt: number
  /** What it is, in a few words. */
  readonly title: string
  /** What it shows, for a reader who can't see it. */
  readonly description: string
  readonly shapes: readonly Shape[]
}

export type Shape = RingsShape | CircleShape | TextShape | GroupShape

export interface Style {
  /** `#rrggbb`; absent is none. */
  readonly fill?: string
  readonly stroke?: string
  readonly lineWidth_pt?: number
  readonly dash_pt?: readonly number[]
}

/** Lines (open) or a polygon with holes (closed, even-odd). Each ring is x, y, x, y... */
export interface RingsShape extends Style {
  readonly kind: 'rings'
  readonly rings: readonly (readonly number[])[]
  readonly closed: boolean
}

export interface CircleShape extends Style {
  readonly kind: 'circle'
  readonly x_pt: number
  readonly y_pt: number
  readonly radius_pt: number
}

export type FontId = 'regular' | 'bold' | 'mono'
export type Anchor = 'start' | 'middle' | 'end'

export interface TextShape {
  readonly kind: 'text'
  readonly x_pt: number
  /** Of the baseline. */
  readonly y_pt: number
  readonly text: string
  readonly size_pt: number
  readonly font: FontId
  readonly anchor: Anchor
  readonly fill: string
  /** Clockwise about (x, y). */
  readonly angle_deg?: number
}

export interface GroupShape {
  readonly kind: 'group'
  readonly x_pt: number
  readonly y_pt: number
  /** A polygon, in the group's own coordinates, outside which nothing shows. */
  readonly clip?: readonly (readonly number[])[]
  readonly shapes: readonly Shape[]
}

export function line(x1: number, y1: number, x2: number, y2: number, style: Style): RingsShape {
  return { kind: 'rings', rings: [[x1, y1, x2, y2]], closed: false, ...style }
}

/** An open line through x, y, x, y... */
export function polyline(points: readonly number[], style: Style): RingsShape {
  return { kind: 'rings', rings: [points], closed: false, ...style }
}

export function polygon(points: readonly number[], style: Style): RingsShape {
  return { kind: 'rings', rings: [points], closed: true, ...style }
}

export function rectangle(x: number, y: number, width: number, height: number, style: Style): RingsShape {
  return polygon([x, y, x + width, y, x + width, y + height, x, y + height], style)
}

export function circle(x_pt: number, y_pt: number, radius_pt: number, style: Style): CircleShape {
  return { kind: 'circle', x_pt, y_pt, radius_pt, ...style }
}

export function group(x_pt: number, y_pt: number, shapes: readonly Shape[]): GroupShape {
  return { kind: 'group', x_pt, y_pt, shapes }
}

export interface TextLook {
  readonly size_pt: number
  readonly fill: string
  readonly font?: FontId
  readonly anchor?: Anchor
  readonly angle_deg?: number
}

export function text(x_pt: number, y_pt: number, content: string, look: TextLook): TextShape {
  const { size_pt, fill, font = 'regular', anchor = 'start', angle_deg } = look
  const shape = { kind: 'text', x_pt, y_pt, text: content, size_pt, font, anchor, fill } as const
  return angle_deg === undefined ? shape : { ...shape, angle_deg }
}

/**
 * Width a label will take, near enough to keep labels apart: figures have one width in the report's typeface, the rest
 * is taken at its average, rather wide than narrow.
 */
export function labelWidth_pt(content: string, size_pt: number): number {
  let ems = 0
  for (const character of content) {
    if (/[0-9]/.test(character)) ems += 0.573
    else if (/[.,:;il|'\u202f ()·]/.test(character)) ems += 0.3
    else if (/[−±×=%mwMWΩ]/.test(character)) ems += 0.8
    else ems += 0.56
  }
  return ems * size_pt
}
