/** Dies judged from the sites: from those that lie in them, else interpolated from all of the wafer's. */
import { fillConformanceProbability } from '../conformity/conformance-probability'
import { fillVerdictsBy } from '../conformity/judge-sites'
import type { Limits } from '../conformity/limits'
import { interpolatorsFor, type Interpolator } from '../map/interpolator'
import { processFitter, type ProcessSurface } from '../map/process-surface'
import type { Procedure } from '../procedure/schema'
import { dieAt, dieLookup, usableDies, type DieGrid, type Dies } from '../wafer/die-grid'
import type { Outline } from '../wafer/outline'
import type { DieColumns } from './lot-analysis'
import type { SitePositions } from './site-positions'

/** The judged quantity at the sites, as dies need it. */
export interface SiteValues {
  readonly value: Float64Array
  readonly uShared: Float64Array
  readonly uIndependent: Float64Array
}

export interface WaferSites {
  /** The sites that count, as indices into the site columns. */
  readonly counting: Uint32Array
}

const MEASURED = 0
const INTERPOLATED = 1

export function dieGridOf(procedure: Procedure): DieGrid | null {
  const { dieGrid } = procedure
  if (!dieGrid) return null
  const { pitchXMm: pitchX_mm, pitchYMm: pitchY_mm, offsetXMm: offsetX_mm, offsetYMm: offsetY_mm } = dieGrid
  return { pitchX_mm, pitchY_mm, offsetX_mm, offsetY_mm }
}

/**
 * Every whole die of every wafer. A die between sites is interpolated (thin-plate spline); its uncertainty adds that
 * of the sites through their weights, the part common to all sites whole, and the root mean square leave-one-out
 * error of the wafer. A die whose centre lies outside the hull of the sites is not assessed, nor one that the surface
 * puts below zero.
 *
 * @returns null without a die grid, without positions or without a known outline
 */
export function analyzeDies(
  procedure: Procedure,
  outline: Outline,
  positions: SitePositions | null,
  wafers: readonly WaferSites[],
  sites: SiteValues,
  limits: Limits | undefined,
): DieColumns | null {
  const grid = dieGridOf(procedure)
  if (!grid || !positions || outline.shape === 'infinite') return null
  const dies = usableDies({ outline, edgeExclusion_mm: procedure.wafer.edgeExclusionMm }, grid)
  const columns = emptyColumns(dies, wafers.length)
  const interpolatorAt = interpolatorsFor(dies)
  const fitAt = procedure.map.interpolation === 'gaussian-process' ? processFitter() : null
  const rowOf = dieLookup(dies)
  wafers.forEach(({ counting }, wafer) => {
    const start = wafer * dies.count
    const x_mm = pick(positions.x_mm, counting)
    const y_mm = pick(positions.y_mm, counting)
    if (counting.length > 0) {
      const interpolator = interpolatorAt(x_mm, y_mm)
      const surface = fitAt?.(x_mm, y_mm, pick(sites.value, counting), pick(sites.uIndependent, counting)) ?? null
      if (surface) predictDies(surface, dies, interpolator, counting, sites, columns, start)
      else interpolate(interpolator, counting, sites, columns, start)
    }
    measure(grid, rowOf, counting, { x_mm, y_mm }, sites, columns, start)
  })
  const { value, u } = columns
  fillConformanceProbability({ value, u, limits: limits ?? {} }, columns.conformanceProbability)
  fillVerdictsBy({ value, u }, limits, procedure.acceptance, columns.verdict)
  return columns
}

function emptyColumns(dies: Dies, wafers: number): DieColumns {
  const count = dies.count * wafers
  const repeat = <T extends Int32Array | Float64Array>(column: T, into: T): T => {
    for (let wafer = 0; wafer < wafers; wafer++) into.set(column, wafer * dies.count)
    return into
  }
  return {
    count,
    wafer: new Uint32Array(count).map((_, row) => Math.floor(row / dies.count)),
    dieX: repeat(dies.dieX, new Int32Array(count)),
    dieY: repeat(dies.dieY, new Int32Array(count)),
    x_mm: repeat(dies.x_mm, new Float64Array(count)),
    y_mm: repeat(dies.y_mm, new Float64Array(count)),
    value: new Float64Array(count).fill(NaN),
    u: new Float64Array(count).fill(NaN),
    conformanceProbability: new Float64Array(count),
    verdict: new Uint8Array(count),
    basis: new Uint8Array(count).fill(INTERPOLATED),
  }
}

function interpolate(
  interpolator: Interpolator,
  counting: Uint32Array,
  sites: SiteValues,
  columns: DieColumns,
  start: number,
): void {
  const values = pick(sites.value, counting)
  const estimate = interpolator.evaluate(values)
  const shared = interpolator.evaluate(pick(sites.uShared, counting))
  const independent = interpolator.propagate(pick(sites.uIndependent, counting))
  // NaN for a site without which the others lie on one line.
  const left = (interpolator.leaveOneOut(values) ?? new Float64Array(0)).filter((residual) => !Number.isNaN(residual))
  const squares = left.reduce((sum, residual) => sum + residual * residual, 0)
  const interpolation = Math.sqrt(squares / Math.max(1, left.length))
  for (let die = 0; die < estimate.length; die++) {
    // Beside a stray site the surface may overshoot below zero, where there is no resistance.
    if (!interpolator.inside[die] || !(estimate[die] > 0)) continue
    columns.value[start + die] = estimate[die]
    columns.u[start + die] = Math.hypot(shared[die], independent[die], interpolation)
  }
}

/** The likeliest surface with its standard error, and the part of the uncertainty that all sites share. */
function predictDies(
  surface: ProcessSurface,
  dies: Dies,
  { inside, evaluate }: Interpolator,
  counting: Uint32Array,
  sites: SiteValues,
  columns: DieColumns,
  start: number,
): void {
  const value = new Float64Array(dies.count)
  const standardError = new Float64Array(dies.count)
  surface.at(dies, { value, standardError })
  const shared = evaluate(pick(sites.uShared, counting))
  for (let die = 0; die < dies.count; die++) {
    if (!inside[die] || !(value[die] > 0)) continue
    columns.value[start + die] = value[die]
    columns.u[start + die] = Math.hypot(shared[die], standardError[die])
  }
}

/** A die with sites in it takes their mean. */
function measure(
  grid: DieGrid,
  rowOf: (dieX: number, dieY: number) => number,
  counting: Uint32Array,
  { x_mm, y_mm }: { readonly x_mm: Float64Array; readonly y_mm: Float64Array },
  sites: SiteValues,
  columns: DieColumns,
  start: number,
): void {
  const sums = new Map<number, { count: number; value: number; shared: number; independentSquared: number }>()
  counting.forEach((site, k) => {
    const { dieX, dieY } = dieAt(grid, x_mm[k], y_mm[k])
    const row = rowOf(dieX, dieY)
    if (row < 0) return
    const sum = sums.get(row) ?? { count: 0, value: 0, shared: 0, independentSquared: 0 }
    sum.count += 1
    sum.value += sites.value[site]
    sum.shared += sites.uShared[site]
    sum.independentSquared += sites.uIndependent[site] ** 2
    sums.set(row, sum)
  })
  for (const [row, { count, value, shared, independentSquared }] of sums) {
    columns.value[start + row] = value / count
    columns.u[start + row] = Math.hypot(shared / count, Math.sqrt(independentSquared) / count)
    columns.basis[start + row] = MEASURED
  }
}

function pick(column: Float64Array, rows: Uint32Array): Float64Array {
  const picked = new Float64Array(rows.length)
  for (let k = 0; k < rows.length; k++) picked[k] = column[rows[k]]
  return picked
}
