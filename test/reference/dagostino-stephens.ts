/**
 * R. B. D'Agostino, M. A. Stephens, Goodness-of-Fit Techniques (1986), table 4.7: upper tail points of A^2 (1 + 0.75/n +
 * 2.25/n^2) for a normal distribution of unknown mean and variance (from memory).
 */
export const ANDERSON_DARLING_POINTS: readonly (readonly [p: number, adjusted: number])[] = [
  [0.1, 0.631],
  [0.05, 0.752],
  [0.025, 0.873],
  [0.01, 1.035],
  [0.005, 1.159],
]
