/**
 * The laterally infinite slab of thickness w, current fed and read at its front surface.
 *
 * Per unit sheet resistance rho/w its generalised log distance (see `four-terminal.ts`) is, with ratio = r/w,
 *   insulating back:  ln r - 2 Sum_{n>=1} K0(n pi r/w)
 *   conducting back:       - 2 Sum_{n>=1} K0((n - 1/2) pi r/w)
 * or, the same by images 2nw below and above (signs alternating on a conducting back), up to a constant
 *   -w/r - 2 Sum_{n>=1} (+-1)^n / sqrt((r/w)^2 + 4 n^2).
 * The first converges in a few terms when r >= w. For r < w the images' inverse roots are expanded in powers of
 * (r/2w)^2, whose sums over n are values of the zeta (or alternating zeta) function: 30 terms give full precision where
 * the plain image sum would need a million.
 * Sources: A. Uhlir, Bell Syst. Tech. J. 34 (1955) 105; L. B. Valdes, Proc. IRE 42 (1954) 420; Gradshteyn & Ryzhik
 * 8.526 (equality of the two sums, and the constant that joins them).
 */
import { besselK0 } from '../numeric/bessel-k0'
import { besselK1 } from '../numeric/bessel-k1'

export type Back = 'insulating' | 'conducting'

const EULER_GAMMA = 0.5772156649015329
/** Terms of the power series: (1/4)^30 is below rounding. */
const POWERS = 30

interface SlabSeries {
  /** Factor of ln r in the log distance. */
  readonly thinShare: 0 | 1
  /** Arguments of K0 are (n - shift) pi r/w. */
  readonly shift: 0 | 0.5
  readonly constant: number
  /** Coefficients of (r/2w)^2k, k = 1, 2, ... */
  readonly powers: Float64Array
}

const SERIES: Readonly<Record<Back, SlabSeries>> = {
  insulating: { thinShare: 1, shift: 0, constant: Math.log(4) - EULER_GAMMA, powers: powerCoefficients(1) },
  conducting: { thinShare: 0, shift: 0.5, constant: Math.LN2, powers: powerCoefficients(-1) },
}

function powerCoefficients(imageSign: 1 | -1): Float64Array {
  const powers = new Float64Array(POWERS)
  let binomial = 1
  for (let k = 1; k <= POWERS; k++) {
    binomial *= -(2 * k - 1) / (2 * k)
    const zeta = zetaOf(2 * k + 1)
    // Sum of (-1)^n/n^s is -(1 - 2^(1-s)) zeta(s).
    const sum = imageSign === 1 ? zeta : -(1 - 2 ** (-2 * k)) * zeta
    powers[k - 1] = -binomial * sum
  }
  return powers
}

/** Riemann zeta for s >= 3, by Euler-Maclaurin from n = 40; relative 1e-16. */
function zetaOf(s: number): number {
  const N = 40
  let sum = 0
  for (let n = N - 1; n >= 1; n--) sum += n ** -s
  const bernoulli =
    s / (12 * N) -
    (s * (s + 1) * (s + 2)) / (720 * N ** 3) +
    (s * (s + 1) * (s + 2) * (s + 3) * (s + 4)) / (30240 * N ** 5)
  return sum + N ** -s * (N / (s - 1) + 0.5 + bernoulli)
}

/** What the slab's log distance has beside `thinShare` * ln r, and its derivative to ln(r/w). */
export interface SlabTerm {
  readonly value: number
  readonly slope: number
}

/** 1 where the log distance holds ln r (insulating back), 0 where it does not (conducting). */
export function thinShare(back: Back): 0 | 1 {
  return SERIES[back].thinShare
}

/**
 * The slab's term at a distance of `ratio` thicknesses, ratio > 0.
 * Limits: 0 as ratio -> inf; -1/ratio as ratio -> 0. Relative accuracy 1e-13 of the larger of 1 and the value.
 */
export function slabTerm(ratio: number, back: Back): SlabTerm {
  // K0 of all arguments underflows.
  if (ratio > 500) return { value: 0, slope: 0 }
  return ratio > 1 ? besselTerm(ratio, SERIES[back]) : powerTerm(ratio, SERIES[back])
}

function besselTerm(ratio: number, { shift }: SlabSeries): SlabTerm {
  let value = 0
  let slope = 0
  for (let n = 1; ; n++) {
    const argument = (n - shift) * Math.PI * ratio
    const term = 2 * besselK0(argument)
    value -= term
    slope += 2 * argument * besselK1(argument)
    if (term <= 1e-18 * -value) return { value, slope }
  }
}

function powerTerm(ratio: number, { thinShare: share, constant, powers }: SlabSeries): SlabTerm {
  const square = (ratio / 2) ** 2
  let value = 0
  let slope = 0
  let power = 1
  for (let k = 1; k <= POWERS; k++) {
    power *= square
    value += powers[k - 1] * power
    slope += 2 * k * powers[k - 1] * power
  }
  return {
    value: constant - 1 / ratio - share * Math.log(ratio) + value,
    slope: 1 / ratio - share + slope,
  }
}
