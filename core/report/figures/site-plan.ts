/** Where a plan measures: the wafer with its fiducial, the edge exclusion, the sites. */
import type { Outline } from '../../wafer/outline'
import type { SitePlan } from '../../wafer/site-patterns'
import type { Drawing } from '../drawing'
import { circle, polygon } from '../drawing'
import { FAINT, INK, QUIET_INK } from './ink'
import { drawnExtent, outlineRing } from './outline-path'

export interface SitePlanInput {
  readonly title: string
  readonly outline: Outline
  readonly edgeExclusion_mm: number
  readonly plan: SitePlan
  readonly size_pt: number
}

export function sitePlanDrawing({ title, outline, edgeExclusion_mm, plan, size_pt }: SitePlanInput): Drawing {
  const extent = drawnExtent(outline, plan.x_mm, plan.y_mm)
  const scale = (size_pt / 2 - 4) / Math.max(extent.halfWidth_mm, extent.halfHeight_mm)
  const middle = size_pt / 2
  const placed = (ring: readonly number[]): number[] => ring.map((value, k) => (k % 2 === 0 ? middle + scale * value : middle - scale * value))
  const edge = outlineRing(outline)
  const inner = edgeExclusion_mm > 0 ? outlineRing(outline, edgeExclusion_mm) : []
  return {
    width_pt: size_pt,
    height_pt: size_pt,
    title,
    description: `${plan.count} sites on the wafer, with its edge exclusion of ${edgeExclusion_mm} mm.`,
    shapes: [
      ...(edge.length > 0 ? [polygon(placed(edge), { fill: FAINT, stroke: INK, lineWidth_pt: 1 })] : []),
      ...(inner.length > 0 ? [polygon(placed(inner), { stroke: QUIET_INK, lineWidth_pt: 0.6, dash_pt: [2, 3] })] : []),
      ...Array.from(plan.x_mm, (x, i) => circle(middle + scale * x, middle - scale * plan.y_mm[i], 2.2, { fill: INK })),
    ],
  }
} // prettier-ignore
