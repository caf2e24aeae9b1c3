/** A wafer's values along its radius and round its centre: the patterns by which a process step gives itself away. */
export interface RadialProfile {
  /** Ascending. */
  readonly r_mm: Float64Array
  readonly value: Float64Array
  /** Row of the columns that each point came from. */
  readonly site: Uint32Array
}

export interface AzimuthalProfile {
  /** Ascending, 0 to below 360, anticlockwise from +x; the fiducial lies at 270. */
  readonly theta_deg: Float64Array
  readonly r_mm: Float64Array
  readonly value: Float64Array
  readonly site: Uint32Array
}

export interface SiteColumnsOfWafer {
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  readonly value: Float64Array
  /** Rows that belong; absent: all. A row without a value or a place is left out. */
  readonly sites?: Uint32Array | undefined
}

/** Values by distance from the centre, nearest first. */
export function radialProfile(columns: SiteColumnsOfWafer): RadialProfile {
  const radius = (site: number) => Math.hypot(columns.x_mm[site]!, columns.y_mm[site]!)
  const site = usableSites(columns).sort((a, b) => radius(a) - radius(b) || a - b)
  return { r_mm: Float64Array.from(site, radius), value: Float64Array.from(site, (i) => columns.value[i]!), site }
}

/** Values by angle; sites nearer to the centre than `innermost_mm` have no direction to speak of and are left out. */
export function azimuthalProfile(columns: SiteColumnsOfWafer, innermost_mm: number): AzimuthalProfile {
  const radius = (site: number) => Math.hypot(columns.x_mm[site]!, columns.y_mm[site]!)
  const angle = (site: number) => angle_deg(columns.x_mm[site]!, columns.y_mm[site]!)
  const site = usableSites(columns)
    .filter((i) => radius(i) > 0 && radius(i) >= innermost_mm)
    .sort((a, b) => angle(a) - angle(b) || a - b)
  return {
    theta_deg: Float64Array.from(site, angle),
    r_mm: Float64Array.from(site, radius),
    value: Float64Array.from(site, (i) => columns.value[i]!),
    site,
  }
}

function angle_deg(x_mm: number, y_mm: number): number {
  const angle = (Math.atan2(y_mm, x_mm) * 180) / Math.PI
  // A hair below zero would round up to a full 360.
  return angle < 0 ? (angle + 360) % 360 : angle
}

/** Rows with a place and a value. */
export function usableSites({ x_mm, y_mm, value, sites }: SiteColumnsOfWafer): Uint32Array {
  const rows = sites ?? Uint32Array.from(value.keys())
  return rows.filter((i) => !Number.isNaN(x_mm[i]!) && !Number.isNaN(y_mm[i]!) && !Number.isNaN(value[i]!))
}
