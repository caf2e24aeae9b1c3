/**
 * Concentration from resistivity for many sites: a table of the forward function, read backwards by cubic Hermite
 * interpolation of ln(net doping) over ln(resistivity). Nothing is solved, so building takes some 8000 evaluations.
 */
import { CoreError } from '../problems/problem'
import { netDopingPieces, otherImpurityOf } from './resistivity-curve'
import type { Material, NetDopingPiece } from './resistivity-curve'

export interface ConcentrationColumns {
  readonly concentration_cm3: Float64Array
  /** d ln(concentration) / d ln(resistivity). */
  readonly sensitivity: Float64Array
}

export interface PreparedConcentrations {
  /** Resistivities that have a concentration [ohm cm]. */
  readonly range_ohm_cm: { readonly min: number; readonly max: number }
  /** Fills both columns; NaN, or outside the range, gives NaN. */
  fill(resistivity_ohm_cm: Float64Array, into: ConcentrationColumns): void
}

/** Intervals of a table: 0.0025 each in ln(net doping) over nine decades, where the interpolation error is below 1e-11. */
const INTERVALS = 8192
/** Points beyond each end, so that the slope there is a central difference too. */
const MARGIN = 3

interface Table {
  /** Resistivities at the greatest and the least net doping [ohm cm]. */
  readonly bottom_ohm_cm: number
  readonly top_ohm_cm: number
  readonly min_cm3: number
  readonly max_cm3: number
  /** ln(resistivity) at the nodes, rising: from high doping to low. */
  readonly logResistivity: Float64Array
  readonly logNet: Float64Array
  /** d ln(net doping) / d ln(resistivity) at the nodes. */
  readonly slope: Float64Array
  /** For each of as many equal cells of ln(resistivity), the interval that its start lies in. */
  readonly intervalOfCell: Uint16Array
  readonly cellsPerLog: number
}

/** Seven-point central difference of equally spaced values, times the spacing. */
function centralDifference(values: Float64Array, i: number): number {
  const [near, middle, far] = [1, 2, 3].map((offset) => values[i + offset] - values[i - offset])
  return (45 * near - 9 * middle + far) / 60
}

function indexCells(logResistivity: Float64Array, cellsPerLog: number): Uint16Array {
  const intervalOfCell = new Uint16Array(INTERVALS + 1)
  let interval = 0
  for (let cell = 0; cell <= INTERVALS; cell++) {
    const start = logResistivity[0] + cell / cellsPerLog
    while (interval < INTERVALS - 1 && logResistivity[interval + 1] <= start) interval++
    intervalOfCell[cell] = interval
  }
  return intervalOfCell
}

function buildTable({ min_cm3, max_cm3, resistivity_ohm_cm }: NetDopingPiece): Table {
  const step = Math.log(max_cm3 / min_cm3) / INTERVALS
  const padded = new Float64Array(INTERVALS + 1 + 2 * MARGIN)
  for (let i = 0; i < padded.length; i++) {
    padded[i] = Math.log(resistivity_ohm_cm(max_cm3 * Math.exp(-(i - MARGIN) * step)))
  }
  const logNet = new Float64Array(INTERVALS + 1)
  const slope = new Float64Array(INTERVALS + 1)
  for (let i = 0; i <= INTERVALS; i++) {
    const rise = centralDifference(padded, i + MARGIN)
    if (!(rise > 0)) refuseTwoConcentrations()
    logNet[i] = Math.log(max_cm3) - i * step
    slope[i] = -step / rise
  }
  const logResistivity = padded.slice(MARGIN, MARGIN + INTERVALS + 1)
  const cellsPerLog = INTERVALS / (logResistivity[INTERVALS] - logResistivity[0])
  return {
    bottom_ohm_cm: resistivity_ohm_cm(max_cm3),
    top_ohm_cm: resistivity_ohm_cm(min_cm3),
    min_cm3,
    max_cm3,
    logResistivity,
    logNet,
    slope,
    intervalOfCell: indexCells(logResistivity, cellsPerLog),
    cellsPerLog,
  }
}

function refuseTwoConcentrations(): never {
  throw new CoreError({
    kind: 'not-applicable',
    what: 'concentration from resistivity',
    why: 'resistivity does not fall with concentration throughout, so that one resistivity may have two concentrations',
  })
}

/** One row. A resistivity between two tables (a jump of the curve) takes the upper table's start. */
function readTable(
  table: Table,
  resistivity: number,
  other_cm3: number,
  row: number,
  into: ConcentrationColumns,
): void {
  const { logResistivity, logNet, slope, intervalOfCell, cellsPerLog } = table
  const x = Math.min(Math.log(resistivity), logResistivity[INTERVALS])
  const cell = Math.max(0, Math.min(INTERVALS, Math.floor((x - logResistivity[0]) * cellsPerLog)))
  let i = intervalOfCell[cell]
  while (i < INTERVALS - 1 && logResistivity[i + 1] <= x) i++
  const width = logResistivity[i + 1] - logResistivity[i]
  const t = (x - logResistivity[i]) / width
  const secant = (logNet[i + 1] - logNet[i]) / width
  // Hermite's cubic through both ends with both slopes, in powers of t.
  const third = slope[i] + slope[i + 1] - 2 * secant
  const second = secant - slope[i] - third
  const logDoping = logNet[i] + width * t * (slope[i] + t * (second + t * third))
  const net = Math.max(table.min_cm3, Math.min(table.max_cm3, Math.exp(logDoping)))
  into.concentration_cm3[row] = net + other_cm3
  into.sensitivity[row] = (net / (net + other_cm3)) * (slope[i] + t * (2 * second + 3 * t * third))
}

/**
 * Does once what every site shares.
 *
 * @throws CoreError as `netDopingPieces`; not-applicable when resistivity does not fall throughout
 *
 * Accuracy: concentration within 1e-10 of `concentration_cm3`, sensitivity within 1e-7 of `concentrationSensitivity`.
 */
export function prepareConcentrations(settings: Material): PreparedConcentrations {
  const other = otherImpurityOf(settings)
  const tables = netDopingPieces(settings).map(buildTable)
  const max = tables[0].top_ohm_cm
  const min = tables[tables.length - 1].bottom_ohm_cm
  return {
    range_ohm_cm: { min, max },
    fill(resistivity_ohm_cm, into) {
      for (let row = 0; row < resistivity_ohm_cm.length; row++) {
        const rho = resistivity_ohm_cm[row]
        if (!(rho >= min && rho <= max)) {
          into.concentration_cm3[row] = NaN
          into.sensitivity[row] = NaN
          continue
        }
        let table = 0
        while (tables[table].bottom_ohm_cm > rho) table++
        readTable(tables[table], rho, other, row, into)
      }
    },
  }
}
