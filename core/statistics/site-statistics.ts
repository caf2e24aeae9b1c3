/** All that one wafer's sites say beyond the plain summary, as one record without a NaN: what is not defined is null, and said why. */
import type { Outline } from '../wafer/outline'
import { areaWeighted, type AreaWeighted } from './area-weighted'
import { capability, type Capability } from './capability'
import { meanInterval, requireLevel, standardDeviationInterval, type ConfidenceInterval } from './intervals'
import { andersonDarling, NORMALITY_MIN_COUNT, type Normality } from './normality'
import { generalizedEsd, type OutlierTest } from './outliers'
import { radialVariation, type RadialVariation } from './radial-variation'
import { siteAreas, type SiteAreas } from './site-areas'
import { summarize } from './summarize'
import { isInRegion, usableRegion } from './usable-region'

export interface SiteStatistics {
  readonly count: number
  readonly mean: number | null
  /** Sample standard deviation, divisor n - 1. */
  readonly standardDeviation: number | null
  readonly meanInterval: ConfidenceInterval | null
  readonly standardDeviationInterval: ConfidenceInterval | null
  readonly areaWeighted: (AreaWeighted & { readonly method: SiteAreas['method'] }) | null
  readonly radialVariation: RadialVariation | null
  /** Rows are those of the columns given. Nothing is removed. */
  readonly outliers: OutlierTest | null
  readonly capability: Capability | null
  readonly normality: Normality | null
  /** One entry for each of the above that is null. */
  readonly missing: readonly { readonly figure: SiteFigure; readonly why: string }[]
}

export type SiteFigure = Exclude<keyof SiteStatistics, 'count' | 'missing'>

export interface SitesToDescribe {
  /** Finite where they count. */
  readonly values: Float64Array
  /** Rows that count; absent: all. */
  readonly indices?: Uint32Array | undefined
  /** Places from the wafer's centre, rows as `values`; null where none are known. */
  readonly x_mm: Float64Array | null
  readonly y_mm: Float64Array | null
  readonly outline: Outline
  readonly edgeExclusion_mm: number
  /** Limits of a single site. */
  readonly limits?: { readonly lower?: number | undefined; readonly upper?: number | undefined } | undefined
  /** Level of all intervals; 0.95 if absent. */
  readonly confidence?: number | undefined
}

const OUTLIER_ALPHA = 0.05
/** One candidate for every so many sites, at least one. */
const SITES_PER_CANDIDATE = 10
/** So many outliers are no longer outliers; and the test's time grows with the candidates. */
const MAX_CANDIDATES = 100

/** @throws CoreError out-of-range for a value that counts and isn't finite, or a confidence outside 0.5 to 0.999999 */
export function siteStatistics(sites: SitesToDescribe): SiteStatistics {
  const { values, indices, confidence: level = 0.95, limits = {} } = sites
  requireLevel(level)
  const { count, mean, standardDeviation } = summarize(values, indices)
  const missing: { figure: SiteFigure; why: string }[] = []
  const unless = <T>(figure: SiteFigure, why: string | null, compute: () => T): T | null => {
    if (why === null) return compute()
    missing.push({ figure, why })
    return null
  }
  const none = count === 0 ? 'no site has a value' : null
  const single = none ?? (count === 1 ? 'one site has no spread' : null)
  const equal = single ?? (standardDeviation === 0 ? 'all sites have one value' : null)
  const radial = none ?? whyNotRadial(sites) ?? radially(sites)
  return {
    count,
    mean: unless('mean', none, () => mean),
    standardDeviation: unless('standardDeviation', single, () => standardDeviation),
    meanInterval: unless('meanInterval', single, () => meanInterval({ mean, standardDeviation, count, level })),
    standardDeviationInterval: unless('standardDeviationInterval', single, () =>
      standardDeviationInterval({ standardDeviation, degreesOfFreedom: count - 1, level }),
    ),
    areaWeighted: unless('areaWeighted', none ?? whyNoAreas(sites), () => byArea(sites)),
    radialVariation: typeof radial === 'string' ? unless('radialVariation', radial, () => null) : radial,
    outliers: unless('outliers', equal ?? tooFew(count, 3), () => outliersOf(values, indices, count)),
    capability: unless('capability', equal ?? whyNoLimits(limits), () =>
      capability({ mean, standardDeviation, count, limits, level }),
    ),
    normality: unless('normality', equal ?? tooFew(count, NORMALITY_MIN_COUNT), () => andersonDarling(values, indices)),
    missing,
  }
}

function outliersOf(values: Float64Array, indices: Uint32Array | undefined, count: number): OutlierTest {
  const atMost = Math.min(MAX_CANDIDATES, Math.max(1, Math.floor(count / SITES_PER_CANDIDATE)))
  return generalizedEsd({ values, indices, atMost, alpha: OUTLIER_ALPHA })
}

function byArea(sites: SitesToDescribe): SiteStatistics['areaWeighted'] {
  const { values, x_mm, y_mm, outline, edgeExclusion_mm } = sites
  const region = usableRegion(outline, edgeExclusion_mm)
  if (!x_mm || !y_mm || !region) return null
  const rows = rowsOf(sites)
  const chosen = (column: Float64Array) => Float64Array.from(rows, (i) => column[i])
  const { method, area_mm2 } = siteAreas({ x_mm: chosen(x_mm), y_mm: chosen(y_mm), region })
  return { method, ...areaWeighted({ values: chosen(values), weights: area_mm2 }) }
}

/** Or why there is none. */
function radially({ values, indices, x_mm, y_mm, outline }: SitesToDescribe): RadialVariation | string {
  const why = 'it needs values above 0 at the centre, and at half the radius or near the edge'
  if (!x_mm || !y_mm || outline.shape !== 'disc') return why
  return radialVariation({ values, x_mm, y_mm, radius_mm: outline.diameter_mm / 2, indices }) ?? why
}

function whyNotRadial(sites: SitesToDescribe): string | null {
  return whyNoPlaces(sites) ?? (sites.outline.shape === 'disc' ? null : 'only a round wafer has a radius')
}

function whyNoAreas(sites: SitesToDescribe): string | null {
  const { x_mm, y_mm, outline, edgeExclusion_mm } = sites
  const region = usableRegion(outline, edgeExclusion_mm)
  const unplaced = whyNoPlaces(sites)
  if (unplaced !== null || !x_mm || !y_mm) return unplaced
  if (!region) return outline.shape === 'infinite' ? 'the edges are not known' : 'the edge exclusion leaves no area'
  const isOutside = rowsOf(sites).some((i) => !isInRegion(region, x_mm[i], y_mm[i]))
  return isOutside ? 'a site lies outside the usable area' : null
}

function whyNoPlaces(sites: SitesToDescribe): string | null {
  const { x_mm, y_mm } = sites
  if (!x_mm || !y_mm) return 'the places of the sites are not known'
  return rowsOf(sites).every((i) => Number.isFinite(x_mm[i]) && Number.isFinite(y_mm[i])) ? null : 'a site has no place'
}

function whyNoLimits({ lower, upper }: NonNullable<SitesToDescribe['limits']>): string | null {
  return lower === undefined && upper === undefined ? 'there are no limits' : null
}

function tooFew(count: number, least: number): string | null {
  return count < least ? `it needs ${least} sites or more, not ${count}` : null
}

function rowsOf({ values, indices }: SitesToDescribe): Uint32Array {
  return indices ?? Uint32Array.from(values.keys())
}
