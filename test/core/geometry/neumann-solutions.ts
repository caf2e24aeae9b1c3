/** Second routes to the factors of thin sheets, written without image charges and theta functions. */
export interface Pin {
  readonly x_mm: number
  readonly y_mm: number
}

/** Configuration A as a list of currents at pins and signs of the voltage pins. */
export const CURRENTS_A = [
  { pin: 0, share: 1 },
  { pin: 3, share: -1 },
] as const

/**
 * C of a disc: the potential of the two currents in free space, plus harmonics r^m cos m theta, r^m sin m theta whose
 * slope at the rim cancels the free-space current through it, found there by a discrete Fourier sum.
 */
export function discByHarmonics(radius: number, pins: readonly Pin[], modes = 400): number {
  const samples = 4 * modes
  const flux = Array.from({ length: samples }, (_, k) => {
    const angle = (2 * Math.PI * k) / samples
    const [x, y] = [radius * Math.cos(angle), radius * Math.sin(angle)]
    return CURRENTS_A.reduce((sum, { pin, share }) => {
      const [dx, dy] = [x - pins[pin]!.x_mm, y - pins[pin]!.y_mm]
      return sum - (share * (dx * x + dy * y)) / radius / (dx * dx + dy * dy)
    }, 0)
  })
  const cos: number[] = []
  const sin: number[] = []
  for (let m = 1; m <= modes; m++) {
    let c = 0
    let s = 0
    flux.forEach((value, k) => {
      c += value * Math.cos((2 * Math.PI * ((k * m) % samples)) / samples)
      s += value * Math.sin((2 * Math.PI * ((k * m) % samples)) / samples)
    })
    // d/dr of A (r/R)^m at the rim is A m/R.
    cos.push((-2 * c * radius) / (samples * m))
    sin.push((-2 * s * radius) / (samples * m))
  }
  const potential = ({ x_mm, y_mm }: Pin) => {
    let sum = 0
    for (const { pin, share } of CURRENTS_A) {
      sum -= share * Math.log(Math.hypot(x_mm - pins[pin]!.x_mm, y_mm - pins[pin]!.y_mm))
    }
    const angle = Math.atan2(y_mm, x_mm)
    const ratio = Math.hypot(x_mm, y_mm) / radius
    for (let m = 1; m <= modes; m++) {
      sum += ratio ** m * (cos[m - 1]! * Math.cos(m * angle) + sin[m - 1]! * Math.sin(m * angle))
    }
    return sum
  }
  return (2 * Math.PI) / (potential(pins[1]!) - potential(pins[2]!))
}

/**
 * C of a rectangle by modes: cosines across the pin line (in y), hyperbolic functions along it (in x). Converges like
 * exp(-n pi dx/height), dx the smallest difference of x between a current pin and a voltage pin.
 */
export function rectangleByModes(width: number, height: number, pins: readonly Pin[], modes = 4000): number {
  const potential = (at: Pin) =>
    CURRENTS_A.reduce((sum, { pin, share }) => sum + share * modePotential(width, height, at, pins[pin]!, modes), 0)
  return 1 / (potential(pins[1]!) - potential(pins[2]!))
}

function modePotential(width: number, height: number, at: Pin, source: Pin, modes: number): number {
  const [x, u] = [at.x_mm + width / 2, source.x_mm + width / 2]
  const [y, v] = [at.y_mm + height / 2, source.y_mm + height / 2]
  let sum = ((x * x + u * u) / (2 * width) - Math.max(x, u)) / height
  for (let n = 1; n <= modes; n++) {
    const k = (n * Math.PI) / height
    const before = Math.min(x, u)
    const after = width - Math.max(x, u)
    const size = Math.exp(-k * Math.abs(x - u))
    // cosh(k before) cosh(k after)/sinh(k width), by decaying exponentials alone.
    const hyperbolic =
      (0.5 * size * (1 + Math.exp(-2 * k * before)) * (1 + Math.exp(-2 * k * after))) / (1 - Math.exp(-2 * k * width))
    sum += ((2 / height) * Math.cos(k * y) * Math.cos(k * v) * hyperbolic) / k
    if (size < 1e-18) break
  }
  return sum
}
