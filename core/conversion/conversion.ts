/** One value at a time: what is asked, and what comes out with its working. */
import type { Back } from '../geometry/slab'
import type { LayerStep } from '../layer/layer-kind'
import type { Dopant } from '../silicon/dopants'
import type { MobilityModel } from '../silicon/mobility-model'

/** How V/I was taken: with one pin line, current through the outer pins. Pins equally spaced. */
export interface ProbedPlace {
  /** Absent: the edges are unknown and the sheet is taken as infinite [mm]. */
  readonly diameter_mm?: number
  /** Needed for a diameter or a thickness; on an infinite thin sheet it cancels [mm]. */
  readonly spacing_mm?: number
  /** Midpoint of the outer pins, from the centre [mm]. */
  readonly x_mm: number
  readonly y_mm: number
  /** Of the pin line, from +x anticlockwise [deg]. */
  readonly angle_deg: number
  readonly back: Back
}

/** The one value that is known. */
export type ConversionStart =
  | { readonly from: 'v-over-i'; readonly vOverI_ohm: number; readonly place: ProbedPlace }
  | { readonly from: 'sheet-resistance'; readonly sheetResistance_ohm_sq: number }
  | { readonly from: 'resistivity'; readonly resistivity_ohm_cm: number }
  | { readonly from: 'concentration'; readonly concentration_cm3: number }
  /** Of the resistor described beside it. */
  | { readonly from: 'resistance'; readonly resistance_ohm: number }

/** A bar with its current along the length. */
export interface Resistor {
  readonly length_um: number
  readonly width_um: number
}

export interface ConversionQuery {
  readonly start: ConversionStart
  /** Of what conducts: the wafer, or the layer [um]. */
  readonly thickness_um?: number
  /** Absent: nothing beyond resistivity is given, but for intrinsic silicon (concentration 0). */
  readonly dopant?: Dopant
  readonly mobility: MobilityModel
  /** Of the value given and of all that follows from it [K]. */
  readonly temperature_K: number
  /** In place of the published one [cm^-3]. */
  readonly intrinsicDensity_cm3?: number
  readonly resistor?: Resistor
  /** Where the same piece is to be tabulated; needs a model that knows temperature [K]. */
  readonly temperatures_K?: readonly number[]
}

/** A step whose value is NaN says in its formula why it could not be taken. */
export type ConversionStep = LayerStep

/** null where a quantity is not determined by what was given. */
export interface Conversion {
  readonly sheetResistance_ohm_sq: number | null
  readonly resistivity_ohm_cm: number | null
  readonly conductivity_S_per_cm: number | null
  /** Of the dopant. */
  readonly concentration_cm3: number | null
  /** Of the majority carriers; null in intrinsic silicon, which has none. */
  readonly mobility_cm2_per_Vs: number | null
  readonly electrons_cm3: number | null
  readonly holes_cm3: number | null
  readonly intrinsicDensity_cm3: number | null
  readonly temperature_K: number
  /** The mobility model that was used, if one was. */
  readonly model: MobilityModel | null
  readonly steps: readonly ConversionStep[]
  /** Only with a resistor. */
  readonly resistance_ohm: number | null
  readonly temperatures: readonly TemperatureRow[] | null
}

/** The same piece at another temperature: its dopant held, its carriers and mobility those of that temperature. */
export interface TemperatureRow {
  readonly temperature_K: number
  readonly intrinsicDensity_cm3: number
  /** Whether the temperature is beyond what intrinsic density was measured over, so that its law was carried on. */
  readonly isIntrinsicCarriedOn: boolean
  readonly electrons_cm3: number
  readonly holes_cm3: number
  readonly mobility_cm2_per_Vs: number | null
  readonly conductivity_S_per_cm: number
  readonly resistivity_ohm_cm: number
  readonly sheetResistance_ohm_sq: number | null
  readonly resistance_ohm: number | null
}
