/** A line or two under a map that explain the marks that occur in it, and no others. */
import type { Shape } from '../drawing'
import { group, labelWidth_pt, line, polygon, rectangle, text } from '../drawing'
import { formatFixed, formatMm } from '../../units/format'
import { INK, LABEL_PT, QUIET_INK } from './ink'
import { mark, type MarkKind, type SiteLimits } from './marks'
import type { WaferMapInput } from './map-input'

interface LegendEntry {
  /** Drawn about (0, 0), within 4 points each way. */
  readonly sample: Shape
  readonly label: string
}

const GAP_PT = 10
const SAMPLE_PT = 8
const LINE_PT = 9.5

export function mapLegend(marks: readonly MarkKind[], input: WaferMapInput, x_pt: number, y_pt: number): Shape {
  const shapes: Shape[] = []
  let x = 0
  let y = 0
  for (const { sample, label } of legendEntries(marks, input)) {
    const width = SAMPLE_PT + 2 + labelWidth_pt(label, LABEL_PT)
    if (x > 0 && x_pt + x + width > input.width_pt) [x, y] = [0, y + LINE_PT]
    shapes.push(
      group(x + SAMPLE_PT / 2, y - 2.3, [sample]),
      text(x + SAMPLE_PT + 2, y, label, { size_pt: LABEL_PT, fill: QUIET_INK }),
    )
    x += width + GAP_PT
  }
  return group(x_pt, y_pt, shapes)
}

function legendEntries(marks: readonly MarkKind[], input: WaferMapInput): LegendEntry[] {
  const entries: LegendEntry[] = []
  for (const kind of ['in-spec', 'above', 'below', 'undecided', 'not-assessed'] as const) {
    if (marks.includes(kind)) entries.push({ sample: mark(kind, 0, 0, 2.8), label: markLabel(kind, input.limits) })
  }
  if (input.diesOut && input.diesOut.centreX_mm.length > 0) {
    entries.push({
      sample: rectangle(-3.4, -2.6, 6.8, 5.2, { stroke: INK, lineWidth_pt: 0.6 }),
      label: 'die out of spec',
    })
  }
  if (input.edgeExclusion_mm > 0 && input.outline.shape !== 'infinite') {
    const sample = line(-4, 0, 4, 0, { stroke: INK, lineWidth_pt: 0.5, dash_pt: [1.2, 1.8] })
    entries.push({ sample, label: `edge exclusion ${formatMm(input.edgeExclusion_mm)}` })
  }
  const { edges } = input.scale
  const isOnScale = (value: number) => value >= edges[0] && value <= edges[edges.length - 1]
  const pointer = [3, 0, -1.5, -2.4, -1.5, 2.4]
  if (isOnScale(input.limits.lower) || isOnScale(input.limits.upper)) {
    entries.push({ sample: polygon(pointer, { fill: INK }), label: 'limit' })
  }
  if (isOnScale(input.limits.target)) {
    entries.push({ sample: polygon(pointer, { stroke: INK, lineWidth_pt: 0.5 }), label: 'target' })
  }
  return entries
}

function markLabel(kind: MarkKind, limits: SiteLimits): string {
  const noLimits = Number.isNaN(limits.lower) && Number.isNaN(limits.upper)
  switch (kind) {
    case 'in-spec':
      return noLimits ? 'site' : 'in spec'
    case 'above':
      return Number.isNaN(limits.upper) ? 'above' : `above ${formatLimit(limits.upper)}`
    case 'below':
      return Number.isNaN(limits.lower) ? 'below' : `below ${formatLimit(limits.lower)}`
    case 'undecided':
      return 'undecided'
    case 'not-assessed':
      return 'not assessed'
  }
}

/** A limit as it was written, not padded to the digits of a result. */
export function formatLimit(value: number): string {
  const decimals = (/\.(\d+)$/.exec(String(value))?.[1] ?? '').length
  return formatFixed(value, Math.min(8, decimals))
}
