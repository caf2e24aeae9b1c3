/**
 * Intrinsic density of silicon by textbook semiconductor statistics [cm^-3], 200 to 700 K: ni = sqrt(Nc Nv) exp(-Eg/2kT), density-of-states
 * masses growing with temperature (fits to H. D. Barber, Solid-State Electron. 10 (1967) 1039; from memory) and the gap
 * 1.170 - 4.73e-4 T^2/(T + 636) eV (C. D. Thurmond, J. Electrochem. Soc. 122 (1975) 1133; from memory), less 7.4 meV, which
 * brings it to 1.00e10 at 300 K.
 */
export function effectiveMassDensity_cm3(temperature_K: number): number {
  const t = temperature_K
  const electrons = 1.028 + 6.11e-4 * t - 3.09e-7 * t * t
  const holes = 0.61 + 7.83e-4 * t - 4.46e-7 * t * t
  const gap_eV = 1.17 - (4.73e-4 * t * t) / (t + 636) - 0.0074
  return 2.51e19 * (t / 300) ** 1.5 * (electrons * holes) ** 0.75 * Math.exp(-gap_eV / (2 * 8.617e-5 * t))
}
