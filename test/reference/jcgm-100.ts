/**
 * JCGM 100:2008, example H.1 (end gauge, nm), as recomputed from its printed components: standard uncertainties with their
 * degrees of freedom, from memory; the guide prints u_c 32 nm, 16 degrees of freedom and U99 93 nm.
 */
export const END_GAUGE = {
  components: [
    { u: 25, degreesOfFreedom: 18 },
    { u: 9.7, degreesOfFreedom: 25.6 },
    { u: 2.9, degreesOfFreedom: 50 },
    { u: 16.6, degreesOfFreedom: 2 },
  ],
  combined: 31.7,
  wholeDegreesOfFreedom: 16,
  expanded99: 93,
} as const

/** JCGM 101:2008, 9.2.2 to 9.2.4: the sum of four quantities of standard uncertainty 1; 95 % intervals, from memory. */
export const ADDITIVE = { u: 2, normal: 3.92, rectangular: 3.88 } as const

/**
 * Budget of a resistivity by four-point probe, NIST/SEMATECH e-Handbook 2.6.4, ohm.cm: effects of the seven components
 * (the first three sensitivities are given squared); combined 0.065, the figure of the page from memory.
 */
export const RESISTIVITY_BUDGET = {
  effects: [
    Math.sqrt(0.83333) * 0.0362,
    0.0197,
    Math.sqrt(0.1) * 0.0167,
    900.9 * 0.0000308,
    22.222 * 0.000227,
    159.2 * 0.00000868,
    100 * 0.000441,
  ],
  combined: 0.065,
} as const
