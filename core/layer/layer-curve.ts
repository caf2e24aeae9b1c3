import { derivative } from '../numeric/derivative'
import { findRoot } from '../numeric/find-root'

/**
 * What a layer's physics says along one variable t that runs smoothly from its least to its greatest doping, and how a
 * sheet resistance is looked up on it exactly. `inverse-table.ts` does the same fast for many sites.
 */
export interface LayerCurve {
  readonly from: number
  readonly to: number
  /** Where the curve goes on but bends or jumps, in any order; those outside from..to are ignored. */
  readonly bends: readonly number[]
  /** Of differences that slopes are taken from; smaller than the default 0.01 where the curve has many slight bends. */
  readonly slopeStep?: number
  lnConcentration(t: number): number
  lnDose(t: number): number
  /** Falls all the way. */
  lnSheetResistance(t: number): number
}

/** A stretch without bends. */
export interface CurvePiece {
  readonly from: number
  readonly to: number
  /** ln of sheet resistance at `to` and at `from`. */
  readonly lnLow: number
  readonly lnHigh: number
}

export interface LayerPoint {
  readonly concentration: number
  readonly dose: number
  readonly concentrationSensitivity: number
  readonly doseSensitivity: number
}

export const NO_POINT: LayerPoint = {
  concentration: NaN,
  dose: NaN,
  concentrationSensitivity: NaN,
  doseSensitivity: NaN,
}

/** Steps aside from a bend, so that each side is evaluated with its own law. */
const ASIDE = 1e-13
/** A root's width in t, hence about its relative error in concentration. */
const ROOT_WIDTH = 1e-13
const SLOPE_STEP = 0.01
const FINEST_SLOPE_STEP = 1e-4

/** The pieces in order of rising t. */
export function curvePieces(curve: LayerCurve): readonly CurvePiece[] {
  const inside = curve.bends.filter((t) => t > curve.from && t < curve.to).sort((a, b) => a - b)
  const ends = [curve.from, ...inside, curve.to]
  return ends.slice(1).map((end, i) => {
    const from = i === 0 ? curve.from : ends[i] + ASIDE * (1 + Math.abs(ends[i]))
    const to = i === ends.length - 2 ? curve.to : end - ASIDE * (1 + Math.abs(end))
    return { from, to, lnLow: curve.lnSheetResistance(to), lnHigh: curve.lnSheetResistance(from) }
  })
}

/** The piece that holds this sheet resistance. In the gap that a jump leaves, the piece of higher doping. */
export function pieceAt(pieces: readonly CurvePiece[], lnSheet: number): CurvePiece {
  for (const piece of pieces) if (lnSheet >= piece.lnLow) return piece
  return pieces[pieces.length - 1]
}

/** Concentration, dose and their slopes at a sheet resistance that the curve covers, to rounding. */
export function solveCurve(curve: LayerCurve, pieces: readonly CurvePiece[], lnSheet: number): LayerPoint {
  const piece = pieceAt(pieces, lnSheet)
  const t = rootIn(curve, piece, lnSheet)
  const slopeOf = (f: (t: number) => number) => slopeWithin(f, t, piece, curve.slopeStep ?? SLOPE_STEP)
  const sheetSlope = slopeOf(curve.lnSheetResistance)
  return {
    concentration: Math.exp(curve.lnConcentration(t)),
    dose: Math.exp(curve.lnDose(t)),
    concentrationSensitivity: slopeOf(curve.lnConcentration) / sheetSlope,
    doseSensitivity: slopeOf(curve.lnDose) / sheetSlope,
  }
}

function rootIn(curve: LayerCurve, piece: CurvePiece, lnSheet: number): number {
  if (lnSheet >= piece.lnHigh) return piece.from
  if (lnSheet <= piece.lnLow) return piece.to
  const f = (t: number): number => curve.lnSheetResistance(t) - lnSheet
  return findRoot({ f, low: piece.from, high: piece.to, tolerance: ROOT_WIDTH })
}

/** Fourth-order difference, finer towards the ends of the piece, where a model's jump leaves a square root, and one-sided at them. */
function slopeWithin(f: (t: number) => number, t: number, { from, to }: CurvePiece, widest: number): number {
  const step = Math.min(widest, Math.max(FINEST_SLOPE_STEP, Math.min(t - from, to - t) / 20))
  if (t - 2 * step >= from && t + 2 * step <= to) return derivative({ f, x: t, step })
  const h = t - 2 * step < from ? step : -step
  return (-25 * f(t) + 48 * f(t + h) - 36 * f(t + 2 * h) + 16 * f(t + 3 * h) - 3 * f(t + 4 * h)) / (12 * h)
}
