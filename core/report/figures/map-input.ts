/** What a map of a wafer is drawn from. */
import type { Outline } from '../../wafer/outline'
import type { BandScale } from './band-scale'
import type { SiteLimits } from './marks'

export interface MapSites {
  /** Standard uncertainty that each site has to itself; absent: none. */
  readonly u?: ArrayLike<number>
  readonly x_mm: ArrayLike<number>
  readonly y_mm: ArrayLike<number>
  readonly value: ArrayLike<number>
  /** Codes in the order of VERDICTS. */
  readonly verdict: ArrayLike<number>
  /** 1 where the site was taken or left out: it is shown, but shapes no surface. */
  readonly excluded?: ArrayLike<number>
}

/** The region where the interpolated value is at least `threshold`, in mm. */
export interface MapContour {
  readonly threshold: number
  readonly rings_mm: readonly (readonly number[])[]
}

export interface MapDies {
  readonly centreX_mm: readonly number[]
  readonly centreY_mm: readonly number[]
  readonly pitchX_mm: number
  readonly pitchY_mm: number
}

export interface MapQuantity {
  readonly title: string
  readonly symbol: string
  readonly unit: string
}

export interface WaferMapInput {
  readonly title: string
  readonly outline: Outline
  readonly edgeExclusion_mm: number
  readonly quantity: MapQuantity
  readonly sites: MapSites
  readonly limits: SiteLimits
  readonly scale: BandScale
  /** Ascending thresholds; null draws the sites alone. */
  readonly contours: readonly MapContour[] | null
  /** Dies out of spec; null without a die grid. */
  readonly diesOut: MapDies | null
  readonly width_pt: number
  readonly height_pt: number
}

/** Millimetres from the wafer's centre to points on the drawing. */
export interface Plane {
  readonly scale_pt_per_mm: number
  readonly x: (x_mm: number) => number
  readonly y: (y_mm: number) => number
}
