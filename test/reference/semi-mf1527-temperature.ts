/**
 * SEMI MF1527-1104, table R2-1: temperature coefficient of resistivity of silicon, C_T in %/C at 23 C against resistivity in ohm cm.
 * The polynomials' coefficients were read with their signs from the standard's text; these values were computed from them by an
 * implementation independent of the project's, four decimals.
 */
export const MF1527_COEFFICIENTS: readonly (readonly [
  resistivity_ohm_cm: number,
  phosphorus: number,
  boron: number,
])[] = [
  [0.001, 0.2058, 0.1578],
  [0.002, 0.1576, 0.1479],
  [0.005, 0.0954, 0.0938],
  [0.01, -0.023, 0.0307],
  [0.02, 0.0248, 0.0454],
  [0.05, 0.3085, 0.2082],
  [0.1, 0.4855, 0.3715],
  [0.2, 0.5846, 0.5115],
  [0.5, 0.6785, 0.6394],
  [1, 0.7364, 0.7068],
  [2, 0.768, 0.7591],
  [5, 0.7912, 0.8053],
  [10, 0.8132, 0.8248],
  [20, 0.8262, 0.8398],
  [50, 0.8246, 0.8623],
  [100, 0.8304, 0.8757],
  [200, 0.8322, 0.8815],
  [500, 0.8301, 0.8964],
]

/** The table itself, for a second implementation. */
export const MF1527_TABLE_R2_1 = {
  phosphorus: [
    7.364e-1, 6.56e-2, -3.075e-2, -2.427e-3, 7.5883e-3, 7.5541e-4, -1.3976e-3, -1.159e-6, 1.106882e-4, -4.56719e-6,
    -4.407686e-6, 2.601512e-7, 9.40856e-8, -6.1907e-9, -1.032377e-9, 6.890181e-11, 4.58514e-12, -2.94332e-13,
  ],
  boron: [
    7.068e-1, 8.544e-2, -1.478e-2, 1.635e-3, -2.003e-3, 3.415e-4, 2.0915e-4, -4.3237e-5, -7.0532e-6, 1.60868e-6,
    1.0346e-7, -2.5201e-8, -5.6419e-10, 1.4445e-10,
  ],
}
