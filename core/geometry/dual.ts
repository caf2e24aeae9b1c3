import { CoreError, requireRange } from '../problems/problem'

export const DUAL_SOURCE =
  'Exact relation of configurations A and B on an infinite sheet: R. Rymaszewski, J. Phys. E 2 (1969) 170; SEMI MF1529-1104 (configurations)'
export const DUAL_QUADRATIC_SOURCE = 'D. S. Perloff, J. Electrochem. Soc. 123 (1976) 1745; SEMI MF1529-1104 eq. 7-8'

/** Ratios RA/RB at which the exact relation is solved. Equal pins far from every edge: ln 4/ln 3 = 1.262. */
export const DUAL_RATIO = { min: 1.001, max: 1000 } as const
/** Ratios at which the published quadratic is within 0.1 % of the exact relation. */
export const DUAL_QUADRATIC_RATIO = { min: 1.2, max: 1.35 } as const

export interface DualResistances {
  /** V/I with current 1-4, voltage 2-3 [ohm]. */
  readonly resistanceA_ohm: number
  /** V/I with current 1-3, voltage 2-4 [ohm]. */
  readonly resistanceB_ohm: number
}

export interface DualSheetResistance {
  readonly sheetResistance_ohm_sq: number
  /** d ln Rs/d ln RA, and to RB; together 1. */
  readonly dLnA: number
  readonly dLnB: number
  readonly source: string
}

/**
 * Sheet resistance from the two configurations of one placement, without knowing the pin spacings.
 * Solves exp(2 pi RA/Rs) - exp(2 pi RB/Rs) = 1.
 *
 * @param resistanceA_ohm, resistanceB_ohm RA > RB > 0, 1.001 <= RA/RB <= 1000 [ohm]
 * @returns Rs: (pi/ln 2) RA at the ratio ln 4/ln 3 of equal pins; > 0; partial derivatives 2.465 and -1.465 there
 * @throws CoreError out-of-range
 *
 * Assumes a thin uniform sheet. Exact for pins in line at any spacings on the infinite sheet, along a diameter of a disc
 * and perpendicular to a straight edge; elsewhere near an edge see `dual-edge.ts`, for a thick wafer `dual-thickness.ts`.
 * Accuracy: rounding.
 * Sources: Rymaszewski 1969. With e12 e34 + e14 e23 = e13 e24 (Ptolemy, pins in line) RA and RB give the relation.
 * Note: exp(-2 pi RA/Rs) + exp(-2 pi RB/Rs) = 1, often quoted, holds for RA and RC = RA - RB, not for RB as measured
 * here (current 1-3, voltage 2-4): with RB it would be 1/4 + 1/3.
 */
export function dualSheetResistance({ resistanceA_ohm, resistanceB_ohm }: DualResistances): DualSheetResistance {
  requireRange('resistance of configuration B', resistanceB_ohm, 'ohm', Number.MIN_VALUE, 1e300)
  requireRange('ratio of configurations A and B', resistanceA_ohm / resistanceB_ohm, '', DUAL_RATIO.min, DUAL_RATIO.max)
  const sheetResistance_ohm_sq = solveDual(resistanceA_ohm, resistanceB_ohm)
  const dLnB = sensitivityToB(resistanceA_ohm, resistanceB_ohm, sheetResistance_ohm_sq)
  return { sheetResistance_ohm_sq, dLnA: 1 - dLnB, dLnB, source: DUAL_SOURCE }
}

export interface DualColumns {
  readonly sheetResistance_ohm_sq: Float64Array
  readonly dLnA: Float64Array
  readonly dLnB: Float64Array
}

/**
 * `dualSheetResistance` of many sites: one entry a site, NaN where a resistance is missing or the ratio outside
 * DUAL_RATIO (the caller says which).
 * @throws CoreError not-applicable where the columns differ in length
 */
export function dualSheetResistances(resistances: {
  readonly resistanceA_ohm: Float64Array
  readonly resistanceB_ohm: Float64Array
}): DualColumns {
  const { resistanceA_ohm, resistanceB_ohm } = resistances
  const length = resistanceA_ohm.length
  if (length !== resistanceB_ohm.length) {
    const why = `A has ${length} entries, B has ${resistanceB_ohm.length}`
    throw new CoreError({ kind: 'not-applicable', what: 'columns of the two configurations', why })
  }
  const column = () => new Float64Array(length).fill(NaN)
  const columns = { sheetResistance_ohm_sq: column(), dLnA: column(), dLnB: column() }
  for (let site = 0; site < length; site++) {
    const a = resistanceA_ohm[site]
    const b = resistanceB_ohm[site]
    if (!(b > 0 && a >= DUAL_RATIO.min * b && a <= DUAL_RATIO.max * b)) continue
    const rs = solveDual(a, b)
    const dLnB = sensitivityToB(a, b, rs)
    columns.sheetResistance_ohm_sq[site] = rs
    columns.dLnA[site] = 1 - dLnB
    columns.dLnB[site] = dLnB
  }
  return columns
}

/**
 * Rs of RA > 0 and RA > RB; no range check (very unequal pins can bring RB to 0 and below). In k = RA/Rs the relation reads h(k) = e^-2 pi k + e^-2 pi gap k - 1 = 0,
 * gap = 1 - RB/RA: falling and convex, so Newton's step from either side lands left of the root and climbs.
 * The bracket guards rounding at the end.
 */
export function solveDual(resistanceA_ohm: number, resistanceB_ohm: number): number {
  const ratio = resistanceA_ohm / resistanceB_ohm
  const gap = (resistanceA_ohm - resistanceB_ohm) / resistanceA_ohm
  const fast = 2 * Math.PI
  const slow = fast * gap
  let low = (2 * Math.LN2) / (fast + slow)
  let high = Math.LN2 / Math.min(fast, slow)
  let k = ratio > DUAL_QUADRATIC_RATIO.min && ratio < DUAL_QUADRATIC_RATIO.max ? 1 / quadratic(ratio) : low
  for (let step = 0; step < 100; step++) {
    const p = Math.exp(-fast * k)
    const q = Math.exp(-slow * k)
    const excess = p + q - 1
    if (excess > 0) low = k
    else high = k
    let next = k + excess / (fast * p + slow * q)
    if (!(next >= low && next <= high)) next = (low + high) / 2
    const moved = Math.abs(next - k)
    k = next
    if (moved <= 4e-16 * k) break
  }
  return resistanceA_ohm / k
}

function sensitivityToB(a: number, b: number, rs: number): number {
  const q = Math.exp((-2 * Math.PI * (a - b)) / rs)
  return (-q * b) / (a - q * b)
}

function quadratic(ratio: number): number {
  return -14.696 + (25.173 - 7.872 * ratio) * ratio
}

/**
 * The published quadratic, for comparison: Rs = Ka RA, Ka = -14.696 + 25.173 (RA/RB) - 7.872 (RA/RB)^2.
 *
 * @param resistanceA_ohm, resistanceB_ohm 1.20 <= RA/RB <= 1.35 [ohm]
 * @returns Rs; +0.043 % above the exact relation at equal pins, within 0.1 % over the domain
 * @throws CoreError out-of-range
 *
 * Source: Perloff 1976; SEMI MF1529-1104 eq. 7-8.
 * Note: the 2004 printing shows 14.696 without its minus sign; with plus, Ka would be 33.9 where the infinite sheet
 * has 4.532.
 */
export function dualQuadratic({ resistanceA_ohm, resistanceB_ohm }: DualResistances): {
  value: number
  source: string
} {
  const ratio = resistanceA_ohm / resistanceB_ohm
  requireRange('resistance of configuration B', resistanceB_ohm, 'ohm', Number.MIN_VALUE, 1e300)
  const { min, max } = DUAL_QUADRATIC_RATIO
  requireRange('ratio of configurations A and B', ratio, '', min, max)
  return { value: quadratic(ratio) * resistanceA_ohm, source: DUAL_QUADRATIC_SOURCE }
}
