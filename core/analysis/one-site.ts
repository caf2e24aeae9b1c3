import type { Readings } from '../ingest/readings'

/** The readings of one site alone, to be taken through the same steps as the whole lot. */
export function oneSite(readings: Readings, site: number): Readings {
  const one = <T extends Float64Array | Uint16Array | Uint32Array | null>(column: T): T =>
    (column ? column.slice(site, site + 1) : null) as T
  const columns = Object.entries(readings).map(([name, column]) => [name, isColumn(column) ? one(column) : column])
  return { ...(Object.fromEntries(columns) as Readings), count: 1 }
}

function isColumn(value: unknown): value is Float64Array | Uint16Array | Uint32Array {
  return value instanceof Float64Array || value instanceof Uint16Array || value instanceof Uint32Array
}
