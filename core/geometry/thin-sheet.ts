import { CoreError } from '../problems/problem'
import type { Outline } from '../wafer/outline'
import { createPinColumns, fourTerminalGradient, TERMINALS } from './four-terminal'
import type { Configuration, PinColumns } from './four-terminal'
import { pinOffsets_mm, type Placement } from './pin-line'
import { pinPlacer, requireProbeSites } from './probe-sites'
import type { ProbeSites } from './probe-sites'
import { outlineGeometry } from './registry'

/** One entry a site. Each `d...` is the derivative of ln C, with the direction of the pin line held [1/mm]. */
export interface ThinSheetColumns {
  /** C = Rs/(V/I); NaN where a pin is off the outline. */
  readonly factor: Float64Array
  /** To the spacings of pins 1-2, 2-3, 3-4, with the site (midpoint of the outer pins) held. */
  readonly dSpacing1_per_mm: Float64Array
  readonly dSpacing2_per_mm: Float64Array
  readonly dSpacing3_per_mm: Float64Array
  /** To the place of the site. */
  readonly dX_per_mm: Float64Array
  readonly dY_per_mm: Float64Array
  /** To the diameter of a disc, or the width of a rectangle whose aspect is held; 0 for the infinite sheet. */
  readonly dSize_per_mm: Float64Array
  /** To the direction of the pin line, turned about the site [1/deg]; null unless asked for. */
  readonly dAngle_per_deg: Float64Array | null
  /** Of the pin nearest to the edge, negative where that pin is off; infinite without an edge. */
  readonly edgeDistance_mm: Float64Array
}

/**
 * Geometry factor of a thin sheet at each site: sheet resistance = factor * V/I, edges and pin spacing included.
 *
 * @param outline       of the sheet; every edge insulated
 * @param spacings_mm   pins 1-2, 2-3, 3-4, each > 0 [mm]
 * @param orientation   of the pin line; see `pin-line.ts`
 * @param x_mm, y_mm    sites, equally long columns [mm]
 * @param configuration A: current 1-4, voltage 2-3; B: current 1-3, voltage 2-4
 * @returns columns; factor pi/ln 2 = 4.53236 (A) or 2 pi/ln 3 = 5.71920 (B) far from every edge with equal pitch,
 *   all NaN but the edge distance where a pin is off the outline
 * @throws CoreError out-of-range (spacing, size), not-applicable (columns of different length)
 *
 * Assumes thickness below about half a pitch, else multiply by the thickness factor (see `edge-and-thickness.ts` for
 * where the product fails), point contacts, a uniform sheet. A disc's fiducial is not counted.
 * Accuracy: exact but for rounding, 1e-12. dSize follows from the others: C depends on ratios of lengths alone.
 * Sources: those of the outline in `registry.ts`; derivation in `four-terminal.ts`.
 */
export function thinSheetFactors(sites: ThinSheetSites & { readonly withAngle?: boolean }): ThinSheetColumns {
  const columns = thinSheetColumns(sites.x_mm.length, sites.withAngle ?? false)
  fillThinSheetFactors(sites, columns)
  return columns
}

export type ThinSheetSites = ProbeSites & { readonly configuration: Configuration }

/** `thinSheetFactors` into columns that are there already, as long as those of the sites or longer. */
export function fillThinSheetFactors(sites: ThinSheetSites, columns: ThinSheetColumns): void {
  requireProbeSites(sites)
  const geometry = outlineGeometry(sites.outline)
  const logDistance = geometry.logDistance(sites.outline)
  const size_mm = geometry.size_mm(sites.outline)
  const terminals = TERMINALS[sites.configuration]
  const pins = createPinColumns()
  const direction = new Float64Array(2)
  const place = pinPlacer(sites, pins, direction)
  const offsets_mm = pinOffsets_mm(sites.spacings_mm)
  for (let site = 0; site < sites.x_mm.length; site++) {
    const edge_mm = place(site)
    columns.edgeDistance_mm[site] = edge_mm
    const sum = edge_mm >= 0 ? fourTerminalGradient(terminals, logDistance, pins) : NaN
    columns.factor[site] = (2 * Math.PI) / sum
    writeDerivatives(sites, site, sum, pins, direction, size_mm, columns)
    if (columns.dAngle_per_deg) columns.dAngle_per_deg[site] = angleDerivative(sum, pins, direction, offsets_mm)
  }
}

export function thinSheetColumns(length: number, withAngle: boolean): ThinSheetColumns {
  const column = () => new Float64Array(length)
  return {
    factor: column(),
    dSpacing1_per_mm: column(),
    dSpacing2_per_mm: column(),
    dSpacing3_per_mm: column(),
    dX_per_mm: column(),
    dY_per_mm: column(),
    dSize_per_mm: column(),
    dAngle_per_deg: withAngle ? column() : null,
    edgeDistance_mm: column(),
  }
}

/** Turned by a small angle, a pin moves across the line by its distance from the site. */
function angleDerivative(
  sum: number,
  { gx, gy }: PinColumns,
  direction: Float64Array,
  offsets_mm: Float64Array,
): number {
  let across = 0
  for (let pin = 0; pin < 4; pin++) across += offsets_mm[pin] * (gy[pin] * direction[0] - gx[pin] * direction[1])
  return ((-across / sum) * Math.PI) / 180
}

function writeDerivatives(
  sites: ProbeSites,
  site: number,
  sum: number,
  { gx, gy }: PinColumns,
  direction: Float64Array,
  size_mm: number,
  columns: ThinSheetColumns,
): void {
  const ux = direction[0]
  const uy = direction[1]
  const g1 = gx[0] * ux + gy[0] * uy
  const g2 = gx[1] * ux + gy[1] * uy
  const g3 = gx[2] * ux + gy[2] * uy
  const g4 = gx[3] * ux + gy[3] * uy
  const toLnC = -1 / sum
  // A longer spacing moves the pins before it by -1/2 and those after it by +1/2.
  const d1 = 0.5 * toLnC * (-g1 + g2 + g3 + g4)
  const d2 = 0.5 * toLnC * (-g1 - g2 + g3 + g4)
  const d3 = 0.5 * toLnC * (-g1 - g2 - g3 + g4)
  const dx = toLnC * (gx[0] + gx[1] + gx[2] + gx[3])
  const dy = toLnC * (gy[0] + gy[1] + gy[2] + gy[3])
  columns.dSpacing1_per_mm[site] = d1
  columns.dSpacing2_per_mm[site] = d2
  columns.dSpacing3_per_mm[site] = d3
  columns.dX_per_mm[site] = dx
  columns.dY_per_mm[site] = dy
  // Euler: all lengths grown alike leave C as it is.
  const [s1, s2, s3] = sites.spacings_mm
  columns.dSize_per_mm[site] = -(s1 * d1 + s2 * d2 + s3 * d3 + sites.x_mm[site] * dx + sites.y_mm[site] * dy) / size_mm
}

/**
 * `thinSheetFactors` of a single placement.
 * @throws CoreError as there, and not-applicable where a pin is off the outline
 */
export function thinSheetFactor({
  outline,
  configuration,
  x_mm,
  y_mm,
  orientation,
  spacings_mm,
}: Placement & { readonly outline: Outline; readonly configuration: Configuration }): {
  value: number
  source: string
} {
  const site = { x_mm: Float64Array.of(x_mm), y_mm: Float64Array.of(y_mm) }
  const columns = thinSheetFactors({ outline, configuration, orientation, spacings_mm, ...site })
  const value = columns.factor[0]
  if (Number.isNaN(value)) {
    throw new CoreError({ kind: 'not-applicable', what: 'geometry factor', why: 'a pin is off the outline' })
  }
  return { value, source: outlineGeometry(outline).source }
}
