/** One wafer against another: what a process step, or a week, has changed, place by place. */
import { CoreError } from '../problems/problem'
import { prepareInterpolator } from './interpolator'
import { matchSites } from './matching-sites'
import type { SiteColumnsOfWafer } from './profiles'
import type { Targets } from './thin-plate-spline'

/** Where two wafers are compared. */
export type CommonPlaces = 'common-sites' | 'common-grid'

export const COMMON_PLACES_TITLES: Readonly<Record<CommonPlaces, string>> = {
  'common-sites': 'at the sites, which lie at the same places',
  'common-grid': 'interpolated to a common grid, since the sites lie at different places',
}

export interface WaferComparison {
  readonly places: CommonPlaces
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  readonly first: Float64Array
  readonly second: Float64Array
  /** first - second. */
  readonly difference: Float64Array
  /** first / second; NaN where the second is 0. */
  readonly ratio: Float64Array
  /** 1 where either wafer is extrapolated beyond the hull of its sites; never at common sites. */
  readonly extrapolated: Uint8Array
  /** At common sites the rows of the two wafers' columns; null on a grid. */
  readonly sites: { readonly first: Uint32Array; readonly second: Uint32Array } | null
  /** Common places left out because one of the wafers has no value there. */
  readonly withoutValue: number
}

/**
 * At the sites where both wafers have them at the same places (to 1e-6 mm, in any order), else both interpolated to
 * the grid.
 *
 * @throws CoreError not-applicable where a wafer has no value at all
 */
export function compareWafers(first: SiteColumnsOfWafer, second: SiteColumnsOfWafer, grid: Targets): WaferComparison {
  const [placedFirst, placedSecond] = [placed(first), placed(second)]
  const partner = matchSites(placedFirst, placedSecond)
  return partner ? atSites(placedFirst, placedSecond, partner) : onGrid(placedFirst, placedSecond, grid)
}

/** The sites of a wafer that have a place, whether or not they have a value. */
export interface PlacedSites extends Targets {
  readonly value: Float64Array
  /** Row of the columns. */
  readonly site: Uint32Array
}

export function placed({ x_mm, y_mm, value, sites }: SiteColumnsOfWafer): PlacedSites {
  const rows = sites ?? Uint32Array.from(value.keys())
  const site = rows.filter((i) => Number.isFinite(x_mm[i]) && Number.isFinite(y_mm[i]))
  if (!site.some((i) => Number.isFinite(value[i]))) {
    throw new CoreError({ kind: 'not-applicable', what: 'wafer arithmetic', why: 'a wafer has no site with a value' })
  }
  return pickRows({ x_mm, y_mm, value }, site)
}

/** The sites that have a value too. */
export function valued(wafer: PlacedSites): PlacedSites {
  const keep = Uint32Array.from(wafer.value.keys()).filter((i) => Number.isFinite(wafer.value[i]))
  return { ...pickRows(wafer, keep), site: keep.map((i) => wafer.site[i]) }
}

function atSites(first: PlacedSites, second: PlacedSites, partner: Uint32Array): WaferComparison {
  const both = Uint32Array.from(partner.keys()).filter(
    (i) => Number.isFinite(first.value[i]) && Number.isFinite(second.value[partner[i]]),
  )
  const partners = both.map((i) => partner[i])
  const { x_mm, y_mm, value } = pickRows(first, both)
  return {
    places: 'common-sites',
    x_mm,
    y_mm,
    ...combined(value, pickRows(second, partners).value),
    extrapolated: new Uint8Array(both.length),
    sites: { first: both.map((i) => first.site[i]), second: partners.map((j) => second.site[j]) },
    withoutValue: partner.length - both.length,
  }
}

function onGrid(first: PlacedSites, second: PlacedSites, grid: Targets): WaferComparison {
  const [a, b] = [valued(first), valued(second)]
  const toGrid = [a, b].map((wafer) => prepareInterpolator(wafer.x_mm, wafer.y_mm, grid))
  return {
    places: 'common-grid',
    x_mm: grid.x_mm,
    y_mm: grid.y_mm,
    ...combined(toGrid[0].evaluate(a.value), toGrid[1].evaluate(b.value)),
    extrapolated: toGrid[0].inside.map((inside, t) => (inside === 1 && toGrid[1].inside[t] === 1 ? 0 : 1)),
    sites: null,
    withoutValue: 0,
  }
}

function combined(
  first: Float64Array,
  second: Float64Array,
): Pick<WaferComparison, 'first' | 'second' | 'difference' | 'ratio'> {
  return {
    first,
    second,
    difference: first.map((value, i) => value - second[i]),
    ratio: first.map((value, i) => (second[i] === 0 ? NaN : value / second[i])),
  }
}

function pickRows(columns: Targets & { readonly value: Float64Array }, rows: Uint32Array): PlacedSites {
  const pick = (column: Float64Array) => Float64Array.from(rows, (i) => column[i])
  return { x_mm: pick(columns.x_mm), y_mm: pick(columns.y_mm), value: pick(columns.value), site: rows }
}
