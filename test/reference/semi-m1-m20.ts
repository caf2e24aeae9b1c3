/** SEMI M1-0305 and SEMI M20-1104: nominal wafers, their flats, and where the fiducial lies. */

/** Nominal diameter, primary flat, and the distance of the flat from the centre that follows, sqrt(R^2 - L^2 / 4); mm. */
export const FLATS = [
  { diameter_mm: 100, flat_mm: 32.5, distance_mm: 47.286 },
  { diameter_mm: 150, flat_mm: 57.5, distance_mm: 69.271 },
] as const

/** A flatted 200 mm wafer is given by its flat diameter: from the flat to the edge opposite, 195.5 mm. */
export const FLAT_DIAMETER_200_MM = 195.5

/** Notch: depth 1.00 +0.25/-0.00 mm, angle 90 +5/-1 degrees. M20: the primary fiducial lies on -y. */
export const NOTCH = { depth_mm: 1, angle_deg: 90 } as const
