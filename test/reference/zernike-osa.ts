/**
 * The Zernike polynomials to degree 4, and some of degree 6, by the single index of OSA and ANSI, orthonormal over the
 * unit disc. Indices, radial and angular parts to degree 4: J. Eur. Opt. Soc.-Rapid Publ. 21 (2025), article
 * jeos20240062, table A.1, whose norms carry another factor sqrt(1/pi) (area instead of mean). Degree 6 and the norm
 * with mean square 1: L. N. Thibos et al., J. Refract. Surg. 18 (2002) S652; ISO 24157:2008, annex E (from memory).
 */
export interface PublishedZernike {
  readonly j: number
  readonly n: number
  readonly m: number
  readonly at: (rho: number, theta: number) => number
}

const { cos, sin, sqrt } = Math

export const ZERNIKE_OSA: readonly PublishedZernike[] = [
  { j: 0, n: 0, m: 0, at: () => 1 },
  { j: 1, n: 1, m: -1, at: (r, t) => 2 * r * sin(t) },
  { j: 2, n: 1, m: 1, at: (r, t) => 2 * r * cos(t) },
  { j: 3, n: 2, m: -2, at: (r, t) => sqrt(6) * r ** 2 * sin(2 * t) },
  { j: 4, n: 2, m: 0, at: (r) => sqrt(3) * (2 * r ** 2 - 1) },
  { j: 5, n: 2, m: 2, at: (r, t) => sqrt(6) * r ** 2 * cos(2 * t) },
  { j: 6, n: 3, m: -3, at: (r, t) => sqrt(8) * r ** 3 * sin(3 * t) },
  { j: 7, n: 3, m: -1, at: (r, t) => sqrt(8) * (3 * r ** 3 - 2 * r) * sin(t) },
  { j: 8, n: 3, m: 1, at: (r, t) => sqrt(8) * (3 * r ** 3 - 2 * r) * cos(t) },
  { j: 9, n: 3, m: 3, at: (r, t) => sqrt(8) * r ** 3 * cos(3 * t) },
  { j: 10, n: 4, m: -4, at: (r, t) => sqrt(10) * r ** 4 * sin(4 * t) },
  { j: 11, n: 4, m: -2, at: (r, t) => sqrt(10) * (4 * r ** 4 - 3 * r ** 2) * sin(2 * t) },
  { j: 12, n: 4, m: 0, at: (r) => sqrt(5) * (6 * r ** 4 - 6 * r ** 2 + 1) },
  { j: 13, n: 4, m: 2, at: (r, t) => sqrt(10) * (4 * r ** 4 - 3 * r ** 2) * cos(2 * t) },
  { j: 14, n: 4, m: 4, at: (r, t) => sqrt(10) * r ** 4 * cos(4 * t) },
  { j: 21, n: 6, m: -6, at: (r, t) => sqrt(14) * r ** 6 * sin(6 * t) },
  { j: 23, n: 6, m: -2, at: (r, t) => sqrt(14) * (15 * r ** 6 - 20 * r ** 4 + 6 * r ** 2) * sin(2 * t) },
  { j: 24, n: 6, m: 0, at: (r) => sqrt(7) * (20 * r ** 6 - 30 * r ** 4 + 12 * r ** 2 - 1) },
  { j: 26, n: 6, m: 4, at: (r, t) => sqrt(14) * (6 * r ** 6 - 5 * r ** 4) * cos(4 * t) },
]
