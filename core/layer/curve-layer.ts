/** A prepared layer made from its curve: what the doped layer and the implant have in common. */
import { requireRange } from '../problems/problem'
import { COEFFICIENTS_A_SEGMENT, inverseTable } from './inverse-table'
import type { InverseTable } from './inverse-table'
import { NO_POINT, curvePieces, pieceAt, solveCurve } from './layer-curve'
import type { CurvePiece, LayerCurve, LayerPoint } from './layer-curve'
import type { LayerColumns } from './layer-kind'

/** With fewer sites, solving each one costs less than making the table. */
export const TABLE_FROM_SITES = 64
/** Lets a value that rounding has carried over an end of the range back in. */
const SLACK = 1e-9

export interface CurveInverse {
  readonly range_ohm_sq: { readonly min: number; readonly max: number }
  /** Exact, one sheet resistance at a time; all NaN outside the range. */
  pointAt(sheetResistance_ohm_sq: number): LayerPoint
  /** Fills concentration, dose and their sensitivities; the other columns are left alone. */
  fill(sheetResistance_ohm_sq: Float64Array, into: LayerColumns): void
}

export function curveInverse(curve: LayerCurve): CurveInverse {
  const pieces = curvePieces(curve)
  const range_ohm_sq = { min: Math.exp(pieces[pieces.length - 1].lnLow), max: Math.exp(pieces[0].lnHigh) }
  const pointAt = (sheet: number): LayerPoint =>
    isInside(sheet, range_ohm_sq) ? solveCurve(curve, pieces, Math.log(sheet)) : NO_POINT
  let tables: ReadonlyMap<CurvePiece, InverseTable> | null = null
  return {
    range_ohm_sq,
    pointAt,
    fill(sheetResistance_ohm_sq, into) {
      if (sheetResistance_ohm_sq.length < TABLE_FROM_SITES) return solveSites(sheetResistance_ohm_sq, pointAt, into)
      tables ??= new Map(pieces.map((piece) => [piece, inverseTable(curve, piece)]))
      lookUpSites({ sheetResistance_ohm_sq, range_ohm_sq, pieces, tables, pointAt }, into)
    },
  }
}

export function isInside(sheet: number, { min, max }: CurveInverse['range_ohm_sq']): boolean {
  return sheet >= min * (1 - SLACK) && sheet <= max * (1 + SLACK)
}

export function solveSites(sheets: Float64Array, pointAt: (sheet: number) => LayerPoint, into: LayerColumns): void {
  for (let i = 0; i < sheets.length; i++) setPoint(into, i, pointAt(sheets[i]))
}

export function setPoint(into: LayerColumns, i: number, point: LayerPoint): void {
  into.concentration_cm3[i] = point.concentration
  into.dose_cm2[i] = point.dose
  into.concentrationSensitivity[i] = point.concentrationSensitivity
  into.doseSensitivity[i] = point.doseSensitivity
}

interface LookUp {
  readonly sheetResistance_ohm_sq: Float64Array
  readonly range_ohm_sq: CurveInverse['range_ohm_sq']
  readonly pieces: readonly CurvePiece[]
  readonly tables: ReadonlyMap<CurvePiece, InverseTable>
  readonly pointAt: (sheet: number) => LayerPoint
}

function lookUpSites(look: LookUp, into: LayerColumns): void {
  const sheets = look.sheetResistance_ohm_sq
  let table = look.tables.get(look.pieces[0])!
  const isOne = look.pieces.length === 1
  for (let i = 0; i < sheets.length; i++) {
    const sheet = sheets[i]
    if (!isInside(sheet, look.range_ohm_sq)) {
      setPoint(into, i, NO_POINT)
      continue
    }
    const lnSheet = Math.log(sheet)
    if (!isOne) table = look.tables.get(pieceAt(look.pieces, lnSheet))!
    if (!lookUp(table, lnSheet, i, into)) setPoint(into, i, look.pointAt(sheet))
  }
}

/** False where the table's segment is empty. */
function lookUp(table: InverseTable, lnSheet: number, i: number, into: LayerColumns): boolean {
  const { piece, cells, perCell, division, firstSegment, coefficients: c } = table
  const position = Math.min(cells, Math.max(0, (lnSheet - piece.lnLow) * perCell))
  const cell = Math.min(cells - 1, Math.floor(position))
  const count = division[cell]
  const inCell = (position - cell) * count
  const segment = Math.min(count - 1, Math.floor(inCell))
  const u = inCell - segment
  const perSegment = perCell * count
  const k = (firstSegment[cell] + segment) * COEFFICIENTS_A_SEGMENT
  if (Number.isNaN(c[k])) return false
  into.concentration_cm3[i] = Math.exp(
    c[k] + u * (c[k + 1] + u * (c[k + 2] + u * (c[k + 3] + u * (c[k + 4] + u * c[k + 5])))),
  )
  into.dose_cm2[i] = Math.exp(
    c[k + 6] + u * (c[k + 7] + u * (c[k + 8] + u * (c[k + 9] + u * (c[k + 10] + u * c[k + 11])))),
  )
  into.concentrationSensitivity[i] =
    perSegment * (c[k + 1] + u * (2 * c[k + 2] + u * (3 * c[k + 3] + u * (4 * c[k + 4] + u * 5 * c[k + 5]))))
  into.doseSensitivity[i] =
    perSegment * (c[k + 7] + u * (2 * c[k + 8] + u * (3 * c[k + 9] + u * (4 * c[k + 10] + u * 5 * c[k + 11]))))
  return true
}

/** Throws unless the density lies between the curve's ends, give or take rounding. */
export function requireDensity(quantity: string, density_cm3: number, min: number, max: number): void {
  requireRange(quantity, density_cm3, 'cm^-3', min * (1 - SLACK), max * (1 + SLACK))
}
