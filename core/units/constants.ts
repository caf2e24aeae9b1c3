/**
 * Every physical constant of the project, once. Fit parameters of one model stay in that model's file, beside
 * their citation. Exact values are those of the SI (9th brochure, 2019) and CODATA 2018.
 */

/** Charge of the proton [C]. Exact, SI 2019. */
export const ELEMENTARY_CHARGE_C = 1.602176634e-19

/** 0 degrees Celsius [K]. Exact by definition of the Celsius scale. */
export const CELSIUS_ZERO_K = 273.15

/** Temperature to which SEMI MF43, MF84, MF723 and MF1527 refer a resistivity [degrees C]. */
export const STANDARD_TEMPERATURE_C = 23

/** The same [K]. */
export const STANDARD_TEMPERATURE_K = CELSIUS_ZERO_K + STANDARD_TEMPERATURE_C
