/**
 * Properties of Crystalline Silicon (R. Hull, ed., EMIS Datareviews 20, INSPEC 1999), pp. 413-416: resistivity [ohm cm] at 23 C, as
 * printed to two or three digits.
 */
export const EMIS_RESISTIVITIES: readonly (readonly [concentration_cm3: number, phosphorus: number, boron: number])[] =
  [
    [1e12, 4300, 13000],
    [1e13, 430, 1300],
    [1e14, 42.9, 131],
    [1e15, 4.48, 13.3],
    [1e16, 0.523, 1.44],
    [1e17, 0.0838, 0.202],
    [1e18, 0.0236, 0.0435],
    [1e19, 5.78e-3, 8.87e-3],
    [1e20, 7.7e-4, 1.17e-3],
    [1e21, 1.6e-4, 1.3e-4],
  ]
