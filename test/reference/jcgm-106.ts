/**
 * JCGM 106:2012, Evaluation of measurement data - The role of measurement uncertainty in conformity assessment, clause
 * 7. The inputs of the examples are from memory; the probabilities as published to two digits, and recomputed to ten.
 */
export const CONFORMANCE_EXAMPLES = [
  { what: 'Zener breakdown voltage', value: -5.47, u: 0.05, upper: -5.4, published: 0.92, recomputed: 0.9192433408 },
  { what: 'burst pressure', value: 509.7, u: 8.6, lower: 490, published: 0.99, recomputed: 0.9890095474 },
  { what: 'kinematic viscosity', value: 13.6, u: 1.8, lower: 12.5, upper: 16.3, published: 0.66, recomputed: 0.6626297865 },
] as const // prettier-ignore
