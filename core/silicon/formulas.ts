/** Silicon as formulas; the mobility models' own stand in `mobility/registry.ts`. */
import { ELEMENTARY_CHARGE_C } from '../units/constants'
import type { Formula } from '../units/formula'
import { INTRINSIC_DENSITY_RANGE_K, INTRINSIC_DENSITY_SOURCE } from './intrinsic-density'
import { COEFFICIENT_RANGE_OHM_CM, COEFFICIENTS_IN_WORDS, CORRECTION_RANGE_C, TEMPERATURE_SOURCE } from './temperature'

export const CONDUCTIVITY = {
  title: 'Resistivity of uniformly doped silicon',
  formula: 'ρ = 1/(q (n μ_n + p μ_p))',
  where: `q = ${ELEMENTARY_CHARGE_C} C; both mobilities at the total impurity density; every dopant ionised`,
  range: '0 (intrinsic) to 1e22 cm⁻³, flagged outside the model’s own range; two sound models differ by up to 11 %',
  source: 'σ = q (n μ_n + p μ_p); q exact, SI 2019',
} as const satisfies Formula

export const CARRIERS = {
  title: 'Electrons and holes',
  formula: 'n p = n_i², n − p = N_D − N_A; n = N/2 + √(N²/4 + n_i²) of the majority, N = |N_D − N_A|',
  range: 'thermal equilibrium, Boltzmann statistics, every dopant ionised',
  source: 'charge neutrality and n p = n_i², every dopant ionised',
} as const satisfies Formula

export const INTRINSIC_DENSITY = {
  title: 'Intrinsic carrier density',
  formula: 'n_i = 5.29e19 (T/300)^2.54 exp(−6726/T) cm⁻³',
  where: 'T in K: 9.70e9 at 300 K',
  range: `${INTRINSIC_DENSITY_RANGE_K.min} to ${INTRINSIC_DENSITY_RANGE_K.max} K`,
  source: INTRINSIC_DENSITY_SOURCE,
} as const satisfies Formula

export const TEMPERATURE_COEFFICIENT = {
  title: 'Temperature coefficient',
  formula: 'ρ(23 °C) = ρ(T) [1 − C_T (T − 23 °C)/100], C_T = Σ c_n (ln ρ)ⁿ %/°C at ρ(23 °C)',
  where: COEFFICIENTS_IN_WORDS.join('; '),
  range: `bulk silicon of ${COEFFICIENT_RANGE_OHM_CM.min} to ${COEFFICIENT_RANGE_OHM_CM.max} Ω·cm, ${CORRECTION_RANGE_C.min} to ${CORRECTION_RANGE_C.max} °C; ±0.02 %/°C`,
  source: TEMPERATURE_SOURCE,
} as const satisfies Formula
