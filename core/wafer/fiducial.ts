/** The notch or flat at the bottom of a wafer, and the outline as a path to draw (SEMI M1-0305, SEMI M20-1104). */
import { CoreError } from '../problems/problem'
import type { Outline } from './outline'

export interface Place {
  readonly x_mm: number
  readonly y_mm: number
}

/** Depth of a notch; its walls stand at 90 degrees. SEMI M1-0305: 1.00 +0.25/-0.00 mm, 90 +5/-1 degrees. */
const NOTCH_DEPTH_MM = 1
/** A piece too small for a 1 mm notch to be drawn to scale gets one of this share of its radius. */
const LARGEST_NOTCH_SHARE = 0.05

/** Nominal primary flat by nominal diameter, mm (SEMI M1-0305). The flatted 200 mm wafer is given by its flat diameter. */
const NOMINAL_FLATS: ReadonlyMap<number, number> = new Map([
  [50.8, 15.88],
  [76.2, 22.22],
  [100, 32.5],
  [125, 42.5],
  [150, 57.5],
  // Flat diameter 195.5 mm: the chord lies 95.5 mm from the centre.
  [200, 2 * Math.sqrt(100 ** 2 - 95.5 ** 2)],
])

/** Distance from the centre to a chord of that length: sqrt(R^2 - L^2 / 4). Throws where the chord is no chord. */
export function chordDistance_mm(diameter_mm: number, chord_mm: number): number {
  if (!(chord_mm > 0 && chord_mm < diameter_mm)) {
    throw new CoreError({
      kind: 'out-of-range', quantity: 'flat length', value: chord_mm, unit: 'mm', min: 0, max: diameter_mm,
    }) // prettier-ignore
  }
  return Math.sqrt(diameter_mm ** 2 - chord_mm ** 2) / 2
}

/**
 * Distance from the centre to the primary flat: of the length given, else of the nominal one of that diameter.
 * null without a flat, or where neither length is known: then the disc is drawn and used whole.
 */
export function flatDistance_mm(outline: Outline): number | null {
  if (outline.shape !== 'disc' || outline.fiducial !== 'flat') return null
  const chord_mm = outline.flatLength_mm ?? NOMINAL_FLATS.get(outline.diameter_mm)
  return chord_mm === undefined ? null : chordDistance_mm(outline.diameter_mm, chord_mm)
}

/**
 * The outline as a closed polygon, anticlockwise, its first place not repeated. The default of an edge a degree keeps
 * within R / 26 000 of the true arc: 4 um on a 200 mm wafer. Throws CoreError for an outline without edges.
 */
export function outlinePath(outline: Outline, edges = 360): readonly Place[] {
  switch (outline.shape) {
    case 'infinite':
      throw new CoreError({ kind: 'not-applicable', what: 'wafer outline', why: 'its edges are not known' })
    case 'rectangle': {
      const [x, y] = [outline.width_mm / 2, outline.height_mm / 2]
      return [[-x, -y], [x, -y], [x, y], [-x, y]].map(([x_mm, y_mm]) => ({ x_mm: x_mm!, y_mm: y_mm! })) // prettier-ignore
    }
    case 'disc': {
      const radius_mm = outline.diameter_mm / 2
      const flat_mm = flatDistance_mm(outline)
      if (outline.fiducial === 'notch') return notchedDisc(radius_mm, edges)
      // A flat's two ends are joined by closing the path; without one the arc is the whole circle.
      if (flat_mm !== null) return arc(radius_mm, Math.acos(flat_mm / radius_mm), edges)
      return arc(radius_mm, 0, edges).slice(0, -1)
    }
  }
}

function notchedDisc(radius_mm: number, edges: number): readonly Place[] {
  const depth_mm = Math.min(NOTCH_DEPTH_MM, LARGEST_NOTCH_SHARE * radius_mm)
  const apex_mm = radius_mm - depth_mm
  // Where a wall x = t, y = -(apex + t) meets the circle: 2 t^2 + 2 apex t = R^2 - apex^2.
  const halfWidth_mm = (Math.sqrt(2 * radius_mm ** 2 - apex_mm ** 2) - apex_mm) / 2
  return [...arc(radius_mm, Math.asin(halfWidth_mm / radius_mm), edges), { x_mm: 0, y_mm: -apex_mm }]
}

/** Anticlockwise from just right of the bottom to just left of it, leaving a gap of twice the half angle. */
function arc(radius_mm: number, halfGap: number, edges: number): readonly Place[] {
  return Array.from({ length: edges + 1 }, (_, i) => {
    const angle = -Math.PI / 2 + halfGap + ((2 * Math.PI - 2 * halfGap) * i) / edges
    return { x_mm: radius_mm * Math.cos(angle), y_mm: radius_mm * Math.sin(angle) }
  })
}
