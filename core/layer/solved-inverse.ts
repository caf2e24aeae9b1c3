/**
 * The inverse of a layer curve with so many slight bends that no series resolves it, as a tabulated profile makes them:
 * each of its points bends the curve where it comes down to the background. Sites are solved one by one; where they are
 * many, through cells of ln sheet resistance, each a pair of cubics with the values and slopes solved at its ends. A cell
 * is made when the first site falls into it and checked at its middle to 3e-10; one that misses is halved, a few times
 * over, and sites of one that still misses are solved.
 */
import { TABLE_FROM_SITES, isInside, setPoint, solveSites } from './curve-layer'
import type { CurveInverse } from './curve-layer'
import { NO_POINT, curvePieces, solveCurve } from './layer-curve'
import type { LayerCurve, LayerPoint } from './layer-curve'
import type { LayerColumns } from './layer-kind'

const CELL_WIDTH = 0.01
const CHECK = 3e-10
const MOST_HALVINGS = 6

export function solvedInverse(curve: LayerCurve): CurveInverse {
  const pieces = curvePieces(curve)
  const range_ohm_sq = { min: Math.exp(pieces[pieces.length - 1].lnLow), max: Math.exp(pieces[0].lnHigh) }
  const pointAt = (sheet: number): LayerPoint =>
    isInside(sheet, range_ohm_sq) ? solveCurve(curve, pieces, Math.log(sheet)) : NO_POINT
  const levels = Array.from({ length: MOST_HALVINGS + 1 }, () => new Map<number, Cell | null>())
  const cellAt = (lnSheet: number): Cell | null => {
    let width = CELL_WIDTH
    for (const cells of levels) {
      const index = Math.floor(lnSheet / width)
      let cell = cells.get(index)
      if (cell === undefined) cells.set(index, (cell = cellOf(index * width, width, pointAt)))
      if (cell !== null) return cell
      width /= 2
    }
    return null
  }
  return {
    range_ohm_sq,
    pointAt,
    fill(sheets, into) {
      if (sheets.length < TABLE_FROM_SITES) return solveSites(sheets, pointAt, into)
      for (let i = 0; i < sheets.length; i++) {
        const lnSheet = Math.log(sheets[i])
        const cell = isInside(sheets[i], range_ohm_sq) ? cellAt(lnSheet) : null
        if (cell) readCell(cell, lnSheet, i, into)
        else setPoint(into, i, pointAt(sheets[i]))
      }
    },
  }
}

interface Cell {
  readonly from: number
  readonly width: number
  /** Powers 0 to 3 of the place in the cell, 0..1. */
  readonly concentration: Cubic
  readonly dose: Cubic
}

type Cubic = readonly [number, number, number, number]

/** Null where the cubics miss the curve, or the cell reaches over an end of it. */
function cellOf(from: number, width: number, pointAt: (sheet: number) => LayerPoint): Cell | null {
  const [left, middle, right] = [0, 0.5, 1].map((place) => pointAt(Math.exp(from + place * width)))
  const concentration = hermite(
    [Math.log(left.concentration), width * left.concentrationSensitivity],
    [Math.log(right.concentration), width * right.concentrationSensitivity],
  )
  const dose = hermite(
    [Math.log(left.dose), width * left.doseSensitivity],
    [Math.log(right.dose), width * right.doseSensitivity],
  )
  const isTrue = (cubic: Cubic, value: number): boolean => Math.abs(valueAt(cubic, 0.5) - Math.log(value)) < CHECK
  // False for NaN as well.
  const fits = isTrue(concentration, middle.concentration) && isTrue(dose, middle.dose)
  return fits ? { from, width, concentration, dose } : null
}

type ValueAndSlope = readonly [value: number, slope: number]

function hermite([from, a]: ValueAndSlope, [to, b]: ValueAndSlope): Cubic {
  return [from, a, 3 * (to - from) - 2 * a - b, a + b - 2 * (to - from)]
}

function valueAt([c0, c1, c2, c3]: Cubic, u: number): number {
  return c0 + u * (c1 + u * (c2 + u * c3))
}

function slopeAt([, c1, c2, c3]: Cubic, u: number): number {
  return c1 + u * (2 * c2 + u * 3 * c3)
}

function readCell({ from, width, concentration, dose }: Cell, lnSheet: number, i: number, into: LayerColumns): void {
  const u = (lnSheet - from) / width
  into.concentration_cm3[i] = Math.exp(valueAt(concentration, u))
  into.dose_cm2[i] = Math.exp(valueAt(dose, u))
  into.concentrationSensitivity[i] = slopeAt(concentration, u) / width
  into.doseSensitivity[i] = slopeAt(dose, u) / width
}
