import type { Dopant } from '../silicon/dopants'

/** A layer kind turns corrected sheet resistance into what the process engineer asks about. */
export interface LayerKind<Settings> {
  readonly id: string
  readonly title: string
  /** Which of the result columns it fills. */
  readonly gives: readonly LayerQuantity[]
  /** What its concentration column means: "surface concentration", "dopant concentration", "peak concentration". */
  readonly concentrationMeans: string
  /** From sheet resistance to what it gives, as text. */
  readonly formula: string
  readonly sources: readonly string[]
  /** Whether the whole wafer thickness conducts, so that the thickness factor applies. */
  readonly conductsThroughWafer: boolean
  /** Checks the settings (throws CoreError) and does once what every site shares, e.g. a table of its profile integral. */
  prepare(settings: Settings): PreparedLayer
}

export type LayerQuantity = 'resistivity' | 'concentration' | 'dose' | 'thickness'

export interface PreparedLayer {
  /** Sheet resistance range the inverse covers [ohm/sq]; outside, `invert` gives NaN and the site is flagged. */
  readonly range_ohm_sq: { readonly min: number; readonly max: number }
  /** Fills `into` for every site whose sheet resistance is a number; NaN stays NaN. Arrays have equal length. */
  invert(sheetResistance_ohm_sq: Float64Array, into: LayerColumns): void
  /** Sheet resistance that this concentration (as the kind means it) or, for a film, thickness in um would give. */
  forward(value: number): number
  /** What a person reads in the working: the steps from sheet resistance to the results, with formula and source. */
  explain(sheetResistance_ohm_sq: number): readonly LayerStep[]
}

/** Columns a layer fills; those it doesn't give are filled with NaN. */
export interface LayerColumns {
  readonly resistivity_ohm_cm: Float64Array
  readonly concentration_cm3: Float64Array
  readonly dose_cm2: Float64Array
  readonly thickness_um: Float64Array
  /** d ln(resistivity) / d ln(sheet resistance): 1 where the depth is given, less where it grows with the doping. */
  readonly resistivitySensitivity: Float64Array
  /** d ln(concentration) / d ln(sheet resistance), dimensionless, usually about -1. */
  readonly concentrationSensitivity: Float64Array
  /** d ln(dose) / d ln(sheet resistance). */
  readonly doseSensitivity: Float64Array
}

export interface LayerStep {
  readonly symbol: string
  readonly title: string
  readonly value: number
  readonly unit: string
  readonly formula: string
  readonly source: string
}

export type ProfileId = 'uniform' | 'gaussian' | 'erfc' | 'exponential'

/** A profile measured or simulated elsewhere, point by point from the surface down. */
export interface DepthTable {
  /** Rising. */
  readonly depth_um: Float64Array
  readonly concentration_cm3: Float64Array
}

/** A uniform doping of the opposite type under a layer; it ends the layer where the profile has come down to it. */
export interface Background {
  readonly dopant: Dopant
  readonly concentration_cm3: number
}
