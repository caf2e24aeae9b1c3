/**
 * The inverse of a layer curve for very many sites: ln concentration and ln dose as piecewise quintics of ln sheet
 * resistance. A site costs one logarithm, two indices, two polynomials and two exponentials.
 *
 * Cells of ln sheet resistance are equal, so that a site finds its own by index; a cell where the curve bends strongly is
 * divided into equal segments. Each quintic matches value, slope and curvature at both ends of its segment. Those come
 * from Chebyshev series of the curve, resolved to 1e-11. Every segment is checked at its middle to 1e-10; one that stays
 * off in the finest division, because the curve is not smooth there, is empty (NaN) and its sites are solved one by one.
 */
import { chebyshevJet, chebyshevPanel, chebyshevPanels } from '../numeric/chebyshev'
import type { ChebyshevPanel, Jet, ResolvedPanel } from '../numeric/chebyshev'
import type { CurvePiece, LayerCurve } from './layer-curve'

export interface InverseTable {
  readonly piece: CurvePiece
  readonly cells: number
  readonly perCell: number
  /** Segments of each cell, and the first of them. */
  readonly division: Uint16Array
  readonly firstSegment: Uint32Array
  /** Twelve a segment: six of ln concentration, six of ln dose, lowest power first, in 0..1 of the segment. */
  readonly coefficients: Float64Array
}

export const COEFFICIENTS_A_SEGMENT = 12
const CELL_WIDTH = 1 / 16
const DIVISIONS = [1, 3, 9, 27] as const
const CHECK = 1e-10
const PLAN = { widest: 1, narrowest: 1 / 64, tolerance: 1e-11 } as const

/** The curve's series on one panel, and ln sheet resistance at the panel's upper end in t. */
interface Stretch {
  readonly sheet: ResolvedPanel
  readonly concentration: ChebyshevPanel
  readonly dose: ChebyshevPanel
  readonly lnLow: number
}

/** What a node gives a quintic: two functions of ln sheet resistance, each with two derivatives. */
interface Node {
  readonly t: number
  readonly concentration: Jet
  readonly dose: Jet
}

export function inverseTable(curve: LayerCurve, piece: CurvePiece): InverseTable {
  const stretches = stretchesOf(curve, piece)
  const cells = Math.max(4, Math.ceil((piece.lnHigh - piece.lnLow) / CELL_WIDTH))
  const width = (piece.lnHigh - piece.lnLow) / cells
  const division = new Uint16Array(cells)
  const firstSegment = new Uint32Array(cells)
  const coefficients: number[] = []
  for (let cell = 0; cell < cells; cell++) {
    firstSegment[cell] = coefficients.length / COEFFICIENTS_A_SEGMENT
    const from = piece.lnLow + cell * width
    for (const count of DIVISIONS) {
      const segments = dividedCell({ curve, stretches, from, step: width / count, count })
      if (segments.some(Number.isNaN) && count !== DIVISIONS[DIVISIONS.length - 1]) continue
      division[cell] = count
      for (const coefficient of segments) coefficients.push(coefficient)
      break
    }
  }
  return { piece, cells, perCell: 1 / width, division, firstSegment, coefficients: Float64Array.from(coefficients) }
}

interface Cell {
  readonly curve: LayerCurve
  readonly stretches: readonly Stretch[]
  readonly from: number
  readonly step: number
  readonly count: number
}

/** Coefficients of a cell's segments; NaN for those that miss the curve. */
function dividedCell({ curve, stretches, from, step, count }: Cell): Float64Array {
  const coefficients = new Float64Array(count * COEFFICIENTS_A_SEGMENT).fill(NaN)
  let left = nodeAt(stretches, from)
  for (let i = 0; i < count; i++) {
    const right = nodeAt(stretches, from + step * (i + 1))
    const middle = nodeAt(stretches, from + step * (i + 0.5))
    if (left !== null && middle !== null && right !== null) {
      const segment = coefficients.subarray(i * COEFFICIENTS_A_SEGMENT, (i + 1) * COEFFICIENTS_A_SEGMENT)
      fillQuintic(segment.subarray(0, 6), left.concentration, right.concentration, step)
      fillQuintic(segment.subarray(6, 12), left.dose, right.dose, step)
      if (!isTrueAt(curve, middle.t, segment)) segment.fill(NaN)
    }
    left = right
  }
  return coefficients
}

/** In order of falling t, so that ln sheet resistance rises. */
function stretchesOf(curve: LayerCurve, piece: CurvePiece): readonly Stretch[] {
  const panels = chebyshevPanels(curve.lnSheetResistance, { from: piece.from, to: piece.to, ...PLAN })
  return panels
    .map((sheet) => ({
      sheet,
      concentration: chebyshevPanel(curve.lnConcentration, sheet.from, sheet.to),
      dose: chebyshevPanel(curve.lnDose, sheet.from, sheet.to),
      lnLow: chebyshevJet(sheet, sheet.to, { value: 0, slope: 0, curvature: 0 }).value,
    }))
    .reverse()
}

/** Null where the curve is not smooth. */
function nodeAt(stretches: readonly Stretch[], lnSheet: number): Node | null {
  let at = stretches.length - 1
  while (at > 0 && lnSheet < stretches[at].lnLow) at--
  const { sheet, concentration, dose } = stretches[at]
  if (!sheet.isResolved) return null
  const jet: Jet = { value: 0, slope: 0, curvature: 0 }
  let t = (sheet.from + sheet.to) / 2
  // Nearly straight over one panel: Newton from its middle settles in three or four steps.
  for (let i = 0; i < 12; i++) {
    chebyshevJet(sheet, t, jet)
    const next = Math.min(sheet.to, Math.max(sheet.from, t - (jet.value - lnSheet) / jet.slope))
    const moved = Math.abs(next - t)
    t = next
    if (moved < 1e-14 * (1 + Math.abs(t))) break
  }
  chebyshevJet(sheet, t, jet)
  return { t, concentration: overSheet(concentration, t, jet), dose: overSheet(dose, t, jet) }
}

/** From derivatives by t to derivatives by ln sheet resistance. */
function overSheet(panel: ChebyshevPanel, t: number, sheet: Jet): Jet {
  const own = chebyshevJet(panel, t, { value: 0, slope: 0, curvature: 0 })
  const slope = own.slope / sheet.slope
  return { value: own.value, slope, curvature: (own.curvature - slope * sheet.curvature) / (sheet.slope * sheet.slope) }
}

function fillQuintic(into: Float64Array, left: Jet, right: Jet, step: number): void {
  const slope = left.slope * step
  const bend = left.curvature * step * step
  const a = right.value - left.value - slope - bend / 2
  const b = right.slope * step - slope - bend
  const c = right.curvature * step * step - bend
  into.set([left.value, slope, bend / 2, 10 * a - 4 * b + c / 2, -15 * a + 7 * b - c, 6 * a - 3 * b + c / 2])
}

function isTrueAt(curve: LayerCurve, t: number, segment: Float64Array): boolean {
  const middleOf = (from: number): number => {
    let value = 0
    for (let k = from + 5; k >= from; k--) value = value / 2 + segment[k]
    return value
  }
  return Math.abs(middleOf(0) - curve.lnConcentration(t)) < CHECK && Math.abs(middleOf(6) - curve.lnDose(t)) < CHECK
}
