import type { Dopant } from './dopants'

export type Carrier = 'electron' | 'hole'

/** What a mobility model is asked: the majority or minority carriers' drift mobility in uniformly doped silicon. */
export interface MobilityQuery {
  readonly carrier: Carrier
  /** The dopant that makes the material n- or p-type; models that only know the type ignore its name. */
  readonly dopant: Dopant
  /** Total ionised impurity density, donors and acceptors together [cm^-3]. */
  readonly impurity_cm3: number
  readonly temperature_K: number
}

/** One published mobility model: one file in `mobility/`, one entry in `mobility/registry.ts`. */
export interface MobilityModel {
  /** Stands in saved procedures; never renamed. */
  readonly id: string
  readonly title: string
  /** As text: mu in cm^2/(V s), N the total ionised impurity density, T_n = T/300 K. */
  readonly formula: string
  /** The fitted numbers, a line a carrier or dopant. */
  readonly coefficients: readonly string[]
  /** Reference with year, journal and page. */
  readonly source: string
  readonly dopants: readonly Dopant[]
  /** Impurity densities the model was fitted over [cm^-3]. */
  readonly range_cm3: { readonly min: number; readonly max: number }
  /** A model at one temperature has min equal to max and is used as it stands. */
  readonly temperature_K: { readonly min: number; readonly max: number }
  /** cm^2/(V s). Pure; no range check: the callers flag a site outside `range_cm3`. */
  mobility_cm2_per_Vs(query: MobilityQuery): number
}
