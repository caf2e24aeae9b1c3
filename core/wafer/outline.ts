/**
 * The shape of what is probed. The origin is the centre, x to the right, y away from the fiducial, which lies
 * at the bottom (-y): SEMI M20. The fiducial is drawn but no correction factor includes it.
 */
export type Outline =
  | {
      readonly shape: 'disc'
      readonly diameter_mm: number
      readonly fiducial: 'notch' | 'flat' | 'none'
      /** Chord of the primary flat; only with `fiducial: 'flat'`. */
      readonly flatLength_mm?: number
    }
  | { readonly shape: 'rectangle'; readonly width_mm: number; readonly height_mm: number }
  /** Nothing is known of the edges: every factor is that of the laterally infinite sheet. */
  | { readonly shape: 'infinite' }

/**
 * Distance from a place to the nearest edge, positive inside, negative outside, infinite without an edge.
 * A disc's fiducial is not counted.
 */
export function edgeDistance_mm(outline: Outline, x_mm: number, y_mm: number): number {
  switch (outline.shape) {
    case 'disc':
      return outline.diameter_mm / 2 - Math.sqrt(x_mm * x_mm + y_mm * y_mm)
    case 'rectangle':
      return Math.min(outline.width_mm / 2 - Math.abs(x_mm), outline.height_mm / 2 - Math.abs(y_mm))
    case 'infinite':
      return Infinity
  }
}
