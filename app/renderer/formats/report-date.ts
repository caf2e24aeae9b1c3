/** The date that a report without one of its own carries: that of the latest reading, as the report's maker takes it. */
export function latestReading(time_ms: Float64Array | null): string | null {
  let latest = -Infinity
  for (const time of time_ms ?? []) if (time > latest) latest = time
  return Number.isFinite(latest) ? new Date(latest).toISOString().replace('.000Z', 'Z') : null
}
