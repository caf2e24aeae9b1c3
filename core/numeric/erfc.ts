/** The complementary error function and its inverse, accurate to a few units in the last place over their whole range. */
import stdlibErfc from '@stdlib/math-base-special-erfc'
import stdlibErfcinv from '@stdlib/math-base-special-erfcinv'

/** 2/√π times the integral of exp(-t²) from x to infinity; 2 at -∞, 1 at 0, 0 at +∞. */
export function erfc(x: number): number {
  return stdlibErfc(x)
}

/** The x at which erfc(x) = y, for 0 ≤ y ≤ 2; NaN elsewhere. */
export function erfcInverse(y: number): number {
  return stdlibErfcinv(y)
}
