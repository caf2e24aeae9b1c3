import { requireRange } from '../problems/problem'
import type { OutlineGeometry } from './outline-geometry'

/**
 * The thin disc of radius R with an insulated rim, any place and direction, exact: L = ln|zi - zj| + ln|R^2 - zi zj*|.
 *
 * One image of each source at R^2/z*: on the rim |R^2 - z zj*| = R |z - zj|, and the normal derivative of the two terms
 * together is the constant 1/R, which the sink of the same current takes away. Written as R^2 - zi zj* (here over R^2)
 * the image has no singularity when a pin stands at the centre.
 * At the centre this is C = pi/(ln 2 + ln((D^2 + 3 s^2)/(D^2 - 3 s^2))), SEMI MF1527-1104 eq. R2-5.
 * Source: D. E. Vaughan, Br. J. Appl. Phys. 12 (1961) 414; L. J. Swartzendruber, NBS Technical Note 199 (1964).
 */
export const disc = {
  id: 'disc',
  title: 'Disc with an insulated rim',
  formula: 'L(i,j) = ln|z_i − z_j| + ln|R² − z_i z_j*|, z = x + iy, R the radius',
  source: 'D. E. Vaughan, Br. J. Appl. Phys. 12 (1961) 414; L. J. Swartzendruber, NBS Technical Note 199 (1964)',
  domain: 'every pin on the disc; the fiducial is not counted',
  size_mm: (outline) => outline.diameter_mm,
  logDistance: (outline) => {
    requireRange('diameter', outline.diameter_mm, 'mm', 1e-3, 1e9)
    const inverse = 4 / (outline.diameter_mm * outline.diameter_mm)
    return (xi, yi, xj, yj, out) => {
      const dx = xi - xj
      const dy = yi - yj
      const squared = dx * dx + dy * dy
      // P = 1 - zi zj*/R^2
      const re = 1 - (xi * xj + yi * yj) * inverse
      const im = (xi * yj - yi * xj) * inverse
      const image = re * re + im * im
      out[0] = 0.5 * Math.log(squared * image)
      const ux = dx / squared
      const uy = dy / squared
      const a = (re * inverse) / image
      const b = (im * inverse) / image
      out[1] = ux - a * xj + b * yj
      out[2] = uy - a * yj - b * xj
      out[3] = -ux - a * xi - b * yi
      out[4] = -uy - a * yi + b * xi
    }
  },
} as const satisfies OutlineGeometry<'disc'>
