/** How a wafer's readings change with the order in which they were taken, apart from the pattern on the wafer. */
import { medianOf, robustDeviation, type HealthInput } from './finding'
import { surfaceResiduals } from './surface-residuals'

export interface OrderSlope {
  readonly wafer: string
  /** Of the site columns, in the order measured. */
  readonly rows: readonly number[]
  /** Place of each of the wafer's rows in the order measured, from 0. */
  readonly place: readonly number[]
  /** Change from the first site to the last, in parts of the wafer's median. */
  readonly change: number
  readonly standardError: number
  /** Of the residuals about the surface and the drift, in parts of the median. */
  readonly noise: number
  /** The residuals, in parts of the median, and the order that no surface can follow; in the order of the wafer's rows. */
  readonly residual: Float64Array
  readonly order: Float64Array
  readonly without: (values: Float64Array) => Float64Array
}

/** Beyond so many robust standard deviations a residual counts as being there. */
const STRAY = 4

/**
 * Slope of the values on the order, both freed of the surface: the coefficient that a least-squares fit of surface and
 * drift together gives the drift. Where the order is itself a pattern on the wafer (rows from the centre outwards)
 * little of it is left, and the standard error says so.
 *
 * Sources: R. Frisch, F. V. Waugh, Econometrica 1 (1933) 387; M. C. Lovell, J. Am. Stat. Assoc. 58 (1963) 993.
 */
export function orderSlopes(input: HealthInput): readonly OrderSlope[] {
  const earlier = known.get(input)
  if (earlier) return earlier
  const slopes = slopesOf(input)
  known.set(input, slopes)
  return slopes
}

/** Two checks look at the same slopes. */
const known = new WeakMap<HealthInput, readonly OrderSlope[]>()

function slopesOf(input: HealthInput): readonly OrderSlope[] {
  return surfaceResiduals(input).flatMap(({ wafer, residual, kept, without }) => {
    const sequence = sequenceOf(input, wafer.rows)
    const place = new Array<number>(sequence.length)
    sequence.forEach((k, at) => (place[k] = at))
    const order = without(Float64Array.from(place, (at) => at / (place.length - 1)))
    const power = sumOf(order, order)
    if (!(power > LEAST_POWER * order.length)) return []
    const level = medianOf(Array.from(wafer.rows, (i) => input.value[i]))
    const { change, own } = withoutStrays(residual.map((left) => left / level), order, power)
    const left = own.map((share, k) => (share - change * order[k]) / kept[k])
    const noise = Math.sqrt(sumOf(left, left) / left.length)
    const rows = sequence.map((k) => wafer.rows[k])
    return [{ wafer: wafer.id, rows, place, change, standardError: noise / Math.sqrt(power), noise, residual: own, order, without }]
  })
} // prettier-ignore

/**
 * The slope, and the residuals with strays drawn in to where they count as being there. Drawn in about the drift itself, by
 * turns (P. J. Huber, Robust Statistics (1981), 7.8; section from memory): about zero, a strong drift would pass for strays.
 */
function withoutStrays(residual: Float64Array, order: Float64Array, power: number): { change: number; own: Float64Array } {
  let change = 0
  let own = residual
  for (let turn = 0; turn < TURNS; turn++) {
    const left = residual.map((value, k) => value - change * order[k])
    const reach = STRAY * robustDeviation(left, 0)
    own = left.map((value, k) => change * order[k] + Math.min(reach, Math.max(-reach, value)))
    const next = sumOf(own, order) / power
    if (Math.abs(next - change) <= SETTLED * Math.abs(next)) return { change: next, own }
    change = next
  }
  return { change, own }
} // prettier-ignore

const TURNS = 20
const SETTLED = 1e-6

/** Mean square of what is left of an order from 0 to 1; less, and the surface follows it. */
const LEAST_POWER = 1e-4

/** Entries of the wafer's rows in the order measured: by time where there is one. */
function sequenceOf({ readings: { time_ms } }: HealthInput, rows: Uint32Array): number[] {
  const sequence = Array.from(rows.keys())
  return time_ms ? sequence.sort((a, b) => (time_ms[rows[a]] || 0) - (time_ms[rows[b]] || 0) || a - b) : sequence
}

export function sumOf(a: Float64Array, b: Float64Array): number {
  return a.reduce((sum, value, k) => sum + value * b[k], 0)
}
