/** The shapes that tell a verdict, the same in maps, charts and tables. */
import { circle, line, polygon, type Shape } from '../drawing'
import { ALERT, INK, PAPER } from './ink'

export type MarkKind = 'in-spec' | 'above' | 'below' | 'undecided' | 'not-assessed'

export interface MarkLook {
  /** What stands behind the mark is dark: draw what is not alarming in paper white. */
  readonly onDark?: boolean
  /** A thin rim that lifts a filled mark off a map. */
  readonly rim?: boolean
}

/** Centred on (x, y); `size_pt` is the half width of a triangle, the dot is smaller. */
export function mark(kind: MarkKind, x: number, y: number, size_pt: number, look: MarkLook = {}): Shape {
  const ink = look.onDark ? PAPER : INK
  const rim = look.rim ? { stroke: PAPER, lineWidth_pt: 0.6 } : {}
  const s = size_pt
  switch (kind) {
    case 'in-spec':
      return circle(x, y, s * 0.4, { fill: ink })
    case 'above':
      return polygon([x - s, y + s * 0.8, x, y - s, x + s, y + s * 0.8], { fill: ALERT, ...rim })
    case 'below':
      return polygon([x - s, y - s * 0.8, x, y + s, x + s, y - s * 0.8], { fill: ALERT, ...rim })
    case 'undecided':
      return polygon([x, y - s * 1.1, x + s * 0.9, y, x, y + s * 1.1, x - s * 0.9, y], {
        stroke: ink,
        lineWidth_pt: 0.8,
      })
    case 'not-assessed': {
      const r = s * 0.7
      const cross = line(x - r, y - r, x + r, y + r, { stroke: ink, lineWidth_pt: 0.8 })
      return { ...cross, rings: [...cross.rings, [x - r, y + r, x + r, y - r]] }
    }
  }
}

/** Limits of the mapped quantity at a site; NaN where there is none. */
export interface SiteLimits {
  readonly target: number
  readonly lower: number
  readonly upper: number
}

export const NO_LIMITS: SiteLimits = { target: NaN, lower: NaN, upper: NaN }

/**
 * The mark of a site from its verdict code (order of VERDICTS) and its value. Where there are no site limits nothing
 * was asked of it, so that a site with a value is a plain dot.
 */
export function markOf(verdict: number, value: number, limits: SiteLimits): MarkKind {
  if (Number.isNaN(value)) return 'not-assessed'
  if (Number.isNaN(limits.lower) && Number.isNaN(limits.upper)) return 'in-spec'
  if (verdict === 0) return 'in-spec'
  if (verdict === 2) return 'undecided'
  if (verdict === 3) return 'not-assessed'
  if (value > limits.upper) return 'above'
  if (value < limits.lower) return 'below'
  // Out of spec with its value inside: nearer to which side it failed.
  return limits.upper - value < value - limits.lower || Number.isNaN(limits.lower) ? 'above' : 'below'
}
