/** Sites measured more than once become one site at their mean: two different values at one place fit no surface. */
export interface DistinctSites {
  readonly count: number
  /** Places of the distinct sites, in order of first appearance. */
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  /** For every site as given, which distinct site it belongs to. */
  readonly distinctOf: Uint32Array
  /** How many sites as given each distinct site stands for. */
  readonly multiplicity: Uint32Array
}

/** Sites nearer than this share of the pattern's extent are the same place: 0.2 um on a 200 mm wafer. */
const SAME_PLACE_SHARE = 1e-6

export function distinctSites(x_mm: Float64Array, y_mm: Float64Array): DistinctSites {
  const cell_mm = SAME_PLACE_SHARE * extent_mm(x_mm, y_mm) || 1
  const rows = new Map<string, number[]>()
  const firsts: number[] = []
  const distinctOf = new Uint32Array(x_mm.length)
  for (let i = 0; i < x_mm.length; i++) {
    const [column, row] = [Math.floor(x_mm[i]! / cell_mm), Math.floor(y_mm[i]! / cell_mm)]
    const known = neighbour(rows, column, row, (d) => {
      return Math.hypot(x_mm[firsts[d]!]! - x_mm[i]!, y_mm[firsts[d]!]! - y_mm[i]!) < cell_mm
    })
    distinctOf[i] = known ?? firsts.length
    if (known !== null) continue
    const key = `${column} ${row}`
    rows.set(key, [...(rows.get(key) ?? []), firsts.length])
    firsts.push(i)
  }
  const multiplicity = new Uint32Array(firsts.length)
  for (const distinct of distinctOf) multiplicity[distinct]!++
  return {
    count: firsts.length,
    x_mm: Float64Array.from(firsts, (i) => x_mm[i]!),
    y_mm: Float64Array.from(firsts, (i) => y_mm[i]!),
    distinctOf,
    multiplicity,
  }
}

/** Mean of the values at each distinct site. */
export function meansAtDistinctSites(sites: DistinctSites, values: Float64Array): Float64Array {
  const means = new Float64Array(sites.count)
  for (let i = 0; i < values.length; i++) {
    const distinct = sites.distinctOf[i]!
    means[distinct]! += values[i]! / sites.multiplicity[distinct]!
  }
  return means
}

/** A place near a cell's border may have its twin in the next cell. */
function neighbour(
  rows: ReadonlyMap<string, readonly number[]>,
  column: number,
  row: number,
  isSame: (distinct: number) => boolean,
): number | null {
  for (let dx = -1; dx <= 1; dx++) {
    for (let dy = -1; dy <= 1; dy++) {
      const found = rows.get(`${column + dx} ${row + dy}`)?.find(isSame)
      if (found !== undefined) return found
    }
  }
  return null
}

function extent_mm(x_mm: Float64Array, y_mm: Float64Array): number {
  let [left, right, bottom, top] = [Infinity, -Infinity, Infinity, -Infinity]
  for (let i = 0; i < x_mm.length; i++) {
    left = Math.min(left, x_mm[i]!)
    right = Math.max(right, x_mm[i]!)
    bottom = Math.min(bottom, y_mm[i]!)
    top = Math.max(top, y_mm[i]!)
  }
  return x_mm.length > 0 ? Math.max(right - left, top - bottom) : 0
}
