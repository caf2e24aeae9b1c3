import { derivative } from '../numeric/derivative'
import { findRoot } from '../numeric/find-root'
import { requireRange } from '../problems/problem'
import { prepareConcentrations } from './concentration-table'
import type { ConcentrationColumns } from './concentration-table'
import { isResistivityCurve } from './mobility/mf723'
import { netDopingPieces, otherImpurityOf, resistivityByCarriers } from './resistivity-curve'
import type { Material, NetDopingPiece } from './resistivity-curve'

export interface ResistivityQuery extends Material {
  /** Of the dopant, not less than `otherImpurity_cm3`, to 1e22 [cm^-3]; SEMI MF723 only over its published range. */
  readonly concentration_cm3: number
}

export interface ConcentrationQuery extends Material {
  readonly resistivity_ohm_cm: number
}

/** The piece that net doping lies on: the upper one where two meet. */
function pieceAt(pieces: readonly NetDopingPiece[], netDoping_cm3: number): NetDopingPiece {
  const last = pieces[pieces.length - 1]
  requireRange('net dopant density', netDoping_cm3, 'cm^-3', pieces[0].min_cm3, last.max_cm3)
  return [...pieces].reverse().find(({ min_cm3 }) => min_cm3 <= netDoping_cm3) ?? last
}

/**
 * Resistivity of uniformly doped silicon: 1 / (q (n mu_n + p mu_p)), both carriers, mobility at the total impurity density.
 *
 * @param dopant               boron, phosphorus, arsenic
 * @param concentration_cm3    0 (intrinsic silicon) to 1e22 [cm^-3]; SEMI MF723 over its published range only
 * @param mobility             the model; SEMI MF723 gives its own resistivity directly, at 23 C
 * @param temperature_K        78 to 340, or 1 to 1000 with an intrinsic density given [K]
 * @param intrinsicDensity_cm3 default Misiakos and Tsamakis [cm^-3]
 * @param otherImpurity_cm3    density of the other type's dopant, 0 to min(1e20, concentration) [cm^-3]
 * @returns resistivity [ohm cm]: intrinsic at 0, 1 / (q mu N) for N >> ni
 * @throws CoreError out-of-range
 *
 * Assumes full ionisation (a mobility fitted to carrier density then stands for dopant density). Two sound models differ by up
 * to 11 % here: name the model beside the number.
 * Not monotone near intrinsic: p-type resistivity first rises with doping, to a maximum near 1.2 ni (some 1e10 cm^-3 at room
 * temperature), because each hole replaces a faster electron. From 1e12 up to 1e21 every model falls throughout.
 * Sources: those of the mobility model and of `intrinsicDensity_cm3`.
 */
export function resistivity_ohm_cm(query: ResistivityQuery): number {
  const other = otherImpurityOf(query)
  requireRange('concentration', query.concentration_cm3, 'cm^-3', other, 1e22)
  const netDoping_cm3 = query.concentration_cm3 - other
  if (!isResistivityCurve(query.mobility)) return resistivityByCarriers(query)(netDoping_cm3)
  return pieceAt(netDopingPieces(query), netDoping_cm3).resistivity_ohm_cm(netDoping_cm3)
}

/** Five-point differences in ln N: at this step truncation and rounding are both near 1e-11 of the slope. */
const SLOPE_STEP = 0.004

/** d ln(resistivity) / d ln(net doping) on one piece. */
function logSlope(piece: NetDopingPiece, netDoping_cm3: number): number {
  const logResistivity = (logStep: number) => Math.log(piece.resistivity_ohm_cm(netDoping_cm3 * Math.exp(logStep)))
  return derivative({ f: logResistivity, x: 0, step: SLOPE_STEP })
}

/** Net doping on one piece whose ends bracket the resistivity. */
function solvePiece(piece: NetDopingPiece, resistivity: number): number {
  const target = Math.log(resistivity)
  const logExcess = (logNet: number) => Math.log(piece.resistivity_ohm_cm(Math.exp(logNet))) - target
  // A hair wider than the piece, so that a resistivity that belongs to an end is bracketed in spite of rounding.
  const low = Math.log(piece.min_cm3) - 1e-9
  const high = Math.log(piece.max_cm3) + 1e-9
  const netDoping = Math.exp(findRoot({ f: logExcess, low, high, tolerance: 0 }))
  return Math.min(piece.max_cm3, Math.max(piece.min_cm3, netDoping))
}

interface Solution {
  readonly netDoping_cm3: number
  readonly piece: NetDopingPiece
}

function solve(query: ConcentrationQuery): Solution {
  const pieces = netDopingPieces(query)
  const last = pieces[pieces.length - 1]
  const rho = query.resistivity_ohm_cm
  const min = last.resistivity_ohm_cm(last.max_cm3)
  requireRange('resistivity', rho, 'ohm cm', min, pieces[0].resistivity_ohm_cm(pieces[0].min_cm3))
  // The first piece that reaches down to it; in the gap between two pieces that is the upper one, at its start.
  const piece = pieces.find(({ max_cm3, resistivity_ohm_cm }) => resistivity_ohm_cm(max_cm3) <= rho) ?? last
  if (rho >= piece.resistivity_ohm_cm(piece.min_cm3)) return { piece, netDoping_cm3: piece.min_cm3 }
  if (rho === piece.resistivity_ohm_cm(piece.max_cm3)) return { piece, netDoping_cm3: piece.max_cm3 }
  return { piece, netDoping_cm3: solvePiece(piece, rho) }
}

/**
 * Dopant concentration from resistivity: the numerical inverse of `resistivity_ohm_cm`, from 1e12 to 1e21 cm^-3.
 *
 * @param resistivity_ohm_cm what that range of concentration gives [ohm cm]
 * @returns concentration [cm^-3]
 * @throws CoreError out-of-range, also outside SEMI MF723's published range; not-applicable where two concentrations
 * would give the same resistivity (p-type with an intrinsic density near 1e12 or above)
 *
 * Assumes as `resistivity_ohm_cm`. The published fits of SEMI MF723 for this direction are not used: they miss by up to 7 % on return.
 * Accuracy: returns to its start within 1e-12. Arsenic by SEMI MF723 has no concentration between 5.555e-3 and 5.775e-3 ohm cm,
 * where its curve jumps: 1e19 is returned.
 */
export function concentration_cm3(query: ConcentrationQuery): number {
  return solve(query).netDoping_cm3 + otherImpurityOf(query)
}

/**
 * d ln(concentration) / d ln(resistivity) at a resistivity: how a relative error of one becomes that of the other.
 *
 * @returns about -1 in dilute silicon, -1.3 to -2 between 1e17 and 1e19; to -6.5 near 5e20 cm^-3 in n-type by Masetti or Klaassen,
 * where resistivity hardly tells the concentration any more
 * @throws CoreError as `concentration_cm3`
 */
export function concentrationSensitivity(query: ConcentrationQuery): number {
  const { piece, netDoping_cm3 } = solve(query)
  return netDoping_cm3 / (netDoping_cm3 + otherImpurityOf(query)) / logSlope(piece, netDoping_cm3)
}

/**
 * `concentration_cm3` and `concentrationSensitivity` down a column: within 1e-10 of the one-value functions, and fast.
 *
 * @param resistivity [ohm cm]; NaN, or outside the range, gives NaN in both
 * @throws CoreError as `concentration_cm3`, for the settings alone
 */
export function concentrationsFromResistivities(
  resistivity: Float64Array,
  settings: Material,
  into: ConcentrationColumns,
): void {
  prepareConcentrations(settings).fill(resistivity, into)
}
