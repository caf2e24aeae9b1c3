/** The geometry factor of every site, and how the probe and the wafer move it. */
import {
  fillThinSheetFactors,
  thinSheetColumns,
  type ThinSheetColumns,
  type ThinSheetSites,
} from '../geometry/thin-sheet'
import type { MeasuringSetUp } from './measuring-set-up'
import type { SitePositions } from './site-positions'

export interface SheetGeometry {
  /** Rs/(V/I) of the thin sheet; NaN where a pin is off the wafer. */
  readonly factor: Float64Array
  /** Of the pin nearest to the edge, negative where it is off; infinite without an edge. */
  readonly edgeDistance_mm: Float64Array
  readonly slopes: GeometrySlopes
}

/** How ln Rs moves a unit of each component, a column each; the three spacings added in quadrature, and so x and y. */
export interface GeometrySlopes {
  readonly spacing_per_mm: Float64Array
  readonly diameter_per_mm: Float64Array
  readonly position_per_mm: Float64Array
  /** null where the direction counts as exact. */
  readonly orientation_per_deg: Float64Array | null
}

/** d ln F / ds of the thickness factor F, for each of the three spacings [1/mm]. */
export type ThicknessSpacingSlopes = readonly [number, number, number]

/** Sites at a time: their derivatives, seven columns, are needed no longer than until they are added up. */
const BLOCK = 4096

/** Without positions every site is that of the infinite sheet. */
export function sheetGeometry(
  count: number,
  { spacings_mm, orientation, outline }: MeasuringSetUp,
  positions: SitePositions | null,
  withAngle: boolean,
  thicknessSlopes: ThicknessSpacingSlopes,
): SheetGeometry {
  const column = () => new Float64Array(count)
  const sheet: SheetGeometry = {
    factor: column(),
    edgeDistance_mm: column(),
    slopes: {
      spacing_per_mm: column(),
      diameter_per_mm: column(),
      position_per_mm: column(),
      orientation_per_deg: withAngle ? column() : null,
    },
  }
  const nowhere = new Float64Array(positions ? 0 : Math.min(BLOCK, count))
  const block = thinSheetColumns(Math.min(BLOCK, count), withAngle)
  for (let begin = 0; begin < count; begin += BLOCK) {
    const size = Math.min(BLOCK, count - begin)
    const places = {
      x_mm: positions ? positions.x_mm.subarray(begin, begin + size) : nowhere.subarray(0, size),
      y_mm: positions ? positions.y_mm.subarray(begin, begin + size) : nowhere.subarray(0, size),
    }
    const probe: Omit<ThinSheetSites, 'x_mm' | 'y_mm'> = {
      outline: positions ? outline : { shape: 'infinite' },
      spacings_mm,
      orientation,
      configuration: 'A',
    }
    fillThinSheetFactors({ ...probe, ...places }, block)
    takeBlock(block, begin, size, thicknessSlopes, sheet)
  }
  return sheet
}

function takeBlock(
  block: ThinSheetColumns,
  begin: number,
  size: number,
  [throughF1, throughF2, throughF3]: ThicknessSpacingSlopes,
  { factor, edgeDistance_mm, slopes }: SheetGeometry,
): void {
  const { dX_per_mm, dY_per_mm } = block
  for (let k = 0; k < size; k++) {
    const site = begin + k
    factor[site] = block.factor[k]
    edgeDistance_mm[site] = block.edgeDistance_mm[k]
    const s1 = block.dSpacing1_per_mm[k] + throughF1
    const s2 = block.dSpacing2_per_mm[k] + throughF2
    const s3 = block.dSpacing3_per_mm[k] + throughF3
    slopes.spacing_per_mm[site] = Math.sqrt(s1 * s1 + s2 * s2 + s3 * s3)
    slopes.diameter_per_mm[site] = block.dSize_per_mm[k]
    slopes.position_per_mm[site] = Math.sqrt(dX_per_mm[k] * dX_per_mm[k] + dY_per_mm[k] * dY_per_mm[k])
    if (slopes.orientation_per_deg) slopes.orientation_per_deg[site] = block.dAngle_per_deg![k]
  }
}
