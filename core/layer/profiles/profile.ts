import type { ProfileId } from '../layer-kind'

/**
 * How a layer's dopant falls from its surface density N_s to the background N_B over 0..1 of its junction depth.
 * `ratio` is N_B / N_s, in 0..1 without its ends; `eta` is depth over junction depth.
 */
export interface LayerProfile {
  readonly id: ProfileId
  readonly title: string
  /** As set in print. */
  readonly formula: string
  readonly source: string
  /** N / N_s as a function of eta. */
  shape(ratio: number): (eta: number) => number
  /** The eta at which N / N_s has come down to `level`, for ratio <= level <= 1. */
  depthOf(level: number, ratio: number): number
  /** Mean of N / N_s over 0..1, in closed form: what the dose is made of. */
  mean(ratio: number): number
  /** How the junction depth follows from that length, as set in print; empty where no length makes the profile. */
  readonly depthFormula: string
  /** The length that diffusion sets, as set in print. */
  readonly lengthSymbol: string
  /** Junction depth over the length that diffusion sets: the square root of D t, or the decay length. */
  depthInLengths(ratio: number): number
  /** d ln(junction depth) / d ln(N_s) at a given length and background. */
  depthResponse(ratio: number): number
}
