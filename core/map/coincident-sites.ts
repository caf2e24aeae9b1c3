/** Sites measured more than once become one site at their mean: two different values at one place fit no surface. */
export interface DistinctSites {
  readonly count: number
  /** Places of the distinct sites, in the order of the sites as given. */
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
  const firstOf = firstOfPlace(x_mm, y_mm, SAME_PLACE_SHARE * extent_mm(x_mm, y_mm))
  const labels = new Map<number, number>()
  const distinctOf = firstOf.map((first) => {
    const label = labels.get(first) ?? labels.size
    labels.set(first, label)
    return label
  })
  const multiplicity = new Uint32Array(labels.size)
  for (const distinct of distinctOf) multiplicity[distinct]!++
  const firsts = [...labels.keys()]
  return {
    count: firsts.length,
    x_mm: Float64Array.from(firsts, (i) => x_mm[i]!),
    y_mm: Float64Array.from(firsts, (i) => y_mm[i]!),
    distinctOf,
    multiplicity,
  }
}

/**
 * For each site, one that stands for its place. Sites are met in order along a slanted line, where those of a lattice
 * or a diameter scan don't fall together, so that only a few before each need comparing.
 */
function firstOfPlace(x_mm: Float64Array, y_mm: Float64Array, tolerance_mm: number): Uint32Array {
  const along = x_mm.map((x, i) => x * Math.cos(1) + y_mm[i]! * Math.sin(1))
  const order = Uint32Array.from(along.keys()).sort((a, b) => along[a]! - along[b]! || a - b)
  const firstOf = new Uint32Array(x_mm.length)
  for (let k = 0; k < order.length; k++) {
    const site = order[k]!
    firstOf[site] = site
    for (let j = k - 1; j >= 0 && along[site]! - along[order[j]!]! <= tolerance_mm; j--) {
      const other = firstOf[order[j]!]!
      if (Math.hypot(x_mm[other]! - x_mm[site]!, y_mm[other]! - y_mm[site]!) > tolerance_mm) continue
      firstOf[site] = other
      break
    }
  }
  return firstOf
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
