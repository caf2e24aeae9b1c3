import { CoreError } from '../problems/problem'

export interface RootSearch {
  /** Continuous between low and high, of opposite sign (or zero) at the two. */
  readonly f: (x: number) => number
  readonly low: number
  readonly high: number
  /** Largest error of the root, absolute, >= 0; 0 asks for the last digit. */
  readonly tolerance: number
  /** Default 100. Bisection alone would need log2((high - low) / tolerance). */
  readonly maxIterations?: number
}

function refuse(why: string): never {
  throw new CoreError({ kind: 'not-applicable', what: 'root finding', why })
}

/** Where to cut the bracket next, as a fraction from b to a: inverse quadratic if it can be trusted, else the middle. */
function nextCut(a: number, fa: number, b: number, fb: number, c: number, fc: number): number {
  const xi = (a - b) / (c - b)
  const phi = (fa - fb) / (fc - fb)
  // Chandrupatla's condition: inside it the parabola through the three points is monotone over the bracket.
  if (!(phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi)) return 0.5
  return (fa / (fb - fa)) * (fc / (fb - fc)) + ((c - a) / (b - a)) * (fa / (fc - fa)) * (fb / (fc - fb))
}

/**
 * The x between low and high at which f changes sign. Keeps a bracket throughout, so it can't run away; takes an inverse
 * quadratic step where that is safe and halves the bracket where not.
 *
 * @returns x within `tolerance` (or four units in the last place, whichever is more) of a sign change of f
 * @throws CoreError not-applicable: no sign change between low and high, f not a number, or maxIterations used up
 *
 * Source: T. R. Chandrupatla, Adv. Eng. Software 28 (1997) 145-149.
 */
export function findRoot({ f, low, high, tolerance, maxIterations = 100 }: RootSearch): number {
  let [a, b] = [low, high]
  let [fa, fb] = [f(a), f(b)]
  if (fa === 0) return a
  if (fb === 0) return b
  if (!(fa * fb < 0 || Math.sign(fa) * Math.sign(fb) < 0)) refuse(`no change of sign between ${low} and ${high}`)
  let cut = 0.5
  for (let i = 0; i < maxIterations; i++) {
    const x = a + cut * (b - a)
    const fx = f(x)
    if (Number.isNaN(fx)) refuse(`the function is not a number at ${x}`)
    // [a, b] is the bracket with a the newest point, c the one that left it.
    const keepsSign = Math.sign(fx) === Math.sign(fa)
    const [c, fc] = keepsSign ? [a, fa] : [b, fb]
    if (!keepsSign) [b, fb] = [a, fa]
    ;[a, fa] = [x, fx]
    const best = Math.abs(fa) < Math.abs(fb) ? a : b
    const width = Math.abs(b - a)
    const error = Math.max(tolerance, 4 * Number.EPSILON * Math.abs(best))
    if (fa === 0 || width <= error) return fa === 0 ? a : best
    // Never nearer to an end than the tolerance, so that the bracket closes from both sides.
    const edge = error / (2 * width)
    cut = Math.min(1 - edge, Math.max(edge, nextCut(a, fa, b, fb, c, fc)))
  }
  refuse(`not within ${tolerance} after ${maxIterations} iterations`)
}
