import type { OutlineGeometry } from './outline-geometry'

/**
 * The laterally infinite thin sheet: L = ln|zi - zj|. Equal pitch gives C = pi/ln 2 in configuration A.
 * Source: L. B. Valdes, Proc. IRE 42 (1954) 420; SEMI MF1527-1104 eq. R2-1.
 */
export const infiniteSheet = {
  id: 'infinite',
  title: 'Infinite sheet',
  formula: 'L(i,j) = ln|z_i − z_j|; equal pins: C = π/ln 2 = 4.53236 (A), 2π/ln 3 = 5.71920 (B)',
  source: 'L. B. Valdes, Proc. IRE 42 (1954) 420; SEMI MF1527-1104 eq. R2-1',
  domain: 'every edge further than about 30 pitches (0.1 %)',
  size_mm: () => Infinity,
  logDistance: () => (xi, yi, xj, yj, out) => {
    const dx = xi - xj
    const dy = yi - yj
    const squared = dx * dx + dy * dy
    out[0] = 0.5 * Math.log(squared)
    out[1] = dx / squared
    out[2] = dy / squared
    out[3] = -dx / squared
    out[4] = -dy / squared
  },
} as const satisfies OutlineGeometry<'infinite'>
