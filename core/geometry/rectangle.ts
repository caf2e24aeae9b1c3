import { requireRange } from '../problems/problem'
import type { LogDistance, OutlineGeometry } from './outline-geometry'

/**
 * The thin rectangle with insulated edges, any place, direction and aspect, exact.
 *
 * A source at (x', y'), counted from a corner, has images at (+-x', +-y') repeated with periods 2a and 2b. The potential
 * of one such doubly periodic lattice is ln|theta_1(u, q)| - (Im u)^2 a/(pi b), u = pi z/2a, q = exp(-pi b/a); L is the
 * sum over the four. Where b < a the axes are exchanged, so that q <= exp(-pi) and a few factors of the product suffice.
 * |theta_1| is taken as exp(Y) times factors 1 - 2 p cos 2X + p^2 with X = pi dx/2a, Y = pi |dy|/2a, dy folded into
 * [-b, b] and p = exp(-2Y), q^2n exp(-2Y), q^2n exp(2Y): no factor overflows or cancels at any aspect.
 *
 * Accuracy: 1e-13; agrees with a cosine-mode series. F. M. Smits' printed table differs by up to 2e-3 (d/s = 20).
 * Source: F. M. Smits, Bell Syst. Tech. J. 37 (1958) 711 (the images); NIST DLMF 20.5.1 (the product), 20.2.
 */
export const rectangle = {
  id: 'rectangle',
  title: 'Rectangle with insulated edges',
  formula:
    'L(i,j) = Σ over the four images (±x_j, ±y_j) of ln|ϑ₁(u, q)| − (Im u)² a/(π b), u = π (z_i − z_j)/2a, q = exp(−π b/a), a ≤ b the sides',
  source: 'F. M. Smits, Bell Syst. Tech. J. 37 (1958) 711; image lattice summed by theta functions (NIST DLMF 20.5)',
  domain: 'every pin on the rectangle',
  size_mm: (outline) => outline.width_mm,
  logDistance: (outline) => {
    requireRange('width', outline.width_mm, 'mm', 1e-3, 1e9)
    requireRange('height', outline.height_mm, 'mm', 1e-3, 1e9)
    const { width_mm: width, height_mm: height } = outline
    if (height >= width) return uprightLogDistance(width, height)
    const upright = uprightLogDistance(height, width)
    return (xi, yi, xj, yj, out) => {
      upright(yi, xi, yj, xj, out)
      swap(out, 1, 2)
      swap(out, 3, 4)
    }
  },
} as const satisfies OutlineGeometry<'rectangle'>

function swap(out: Float64Array, m: number, n: number): void {
  const kept = out[m]
  out[m] = out[n]
  out[n] = kept
}

/** L of a rectangle not wider than high, centred on the origin. */
function uprightLogDistance(a: number, b: number): LogDistance {
  const aspect = b / a
  const q2 = Math.exp(-2 * Math.PI * aspect)
  // The largest p of the n-th pair of factors is q^(2n-1).
  const pairs = Math.max(1, Math.ceil((41 / (Math.PI * aspect) + 1) / 2))
  const scale = Math.PI / (2 * a)
  /** The running product of the factors, then d/dX and d/dY of half its logarithm. */
  const lattice = new Float64Array(3)

  return (xi, yi, xj, yj, out) => {
    out.fill(0)
    let product = 1
    let linear = 0
    for (let image = 0; image < 4; image++) {
      const signX = image & 1 ? 1 : -1
      const signY = image & 2 ? 1 : -1
      // Differences to the image; sums are counted from the corner, and folded by the period 2b.
      const dx = signX < 0 ? xi - xj : xi + xj + a
      let dy = signY < 0 ? yi - yj : yi + yj + b
      if (dy > b) dy -= 2 * b
      const Y = scale * Math.abs(dy)
      multiplyFactors(scale * dx, Y, q2, pairs, aspect, lattice)
      product *= lattice[0]
      linear += Y * (1 - Y / (Math.PI * aspect))
      const gx = scale * lattice[1]
      const gy = scale * Math.sign(dy) * (1 - (2 * Y) / (Math.PI * aspect) + lattice[2])
      out[1] = out[1] + gx
      out[2] = out[2] + gy
      out[3] = out[3] + signX * gx
      out[4] = out[4] + signY * gy
    }
    out[0] = linear + 0.5 * Math.log(product)
  }
}

function multiplyFactors(X: number, Y: number, q2: number, pairs: number, aspect: number, out: Float64Array): void {
  const sin = Math.sin(X)
  const sin2 = 2 * sin * Math.cos(X)
  const cos2 = 1 - 2 * sin * sin
  const lessened = Math.expm1(-2 * Y)
  let down = lessened + 1
  // The first factor vanishes at the source itself, so it is written as a sum of squares.
  let product = lessened * lessened + 4 * down * sin * sin
  let gx = (2 * down * sin2) / product
  let gy = (2 * down * (cos2 - 1 - lessened)) / product
  let up = Math.exp(2 * Y - 2 * Math.PI * aspect)
  for (let n = 1; n <= pairs; n++) {
    down *= q2
    const falling = 1 - 2 * down * cos2 + down * down
    const rising = 1 - 2 * up * cos2 + up * up
    product *= falling * rising
    gx += 2 * sin2 * (down / falling + up / rising)
    gy += 2 * ((down * (cos2 - down)) / falling - (up * (cos2 - up)) / rising)
    up *= q2
  }
  out[0] = product
  out[1] = gx
  out[2] = gy
}
