/** Sites that a person took out of the statistics and verdicts: kept and shown, flagged, and listed with the reason. */
import type { Readings } from '../ingest/readings'
import type { AnalysisProblem } from '../problems/problem'
import { SITE_FLAGS } from './flags'

/** By the names that the readings give; wafer and site together are one site of a lot. */
export interface Exclusion {
  readonly wafer: string
  readonly site: string
  readonly reason: string
}

/**
 * Flags what is excluded.
 *
 * @returns one problem for each exclusion that no site answers to: it may have been meant for other readings
 */
export function flagExcluded(
  readings: Readings,
  excluded: readonly Exclusion[],
  flags: Uint32Array,
): AnalysisProblem[] {
  if (excluded.length === 0) return []
  const rows = rowsByName(readings)
  const problems: AnalysisProblem[] = []
  for (const { wafer, site } of excluded) {
    const found = rows.get(nameOf(wafer, site)) ?? []
    for (const row of found) flags[row] |= SITE_FLAGS.excludedByPerson.bit
    if (found.length === 0) problems.push({ kind: 'no-such-site', wafer, site })
  }
  return problems
}

export function exclusionNotes(excluded: readonly Exclusion[]): string[] {
  return excluded.map(({ wafer, site, reason }) => {
    const why = reason.replace(/\s+/g, ' ').trim() || 'no reason given'
    return `Wafer ${wafer}, site ${site} was excluded by a person and counts nowhere: ${why}`
  })
}

function rowsByName({ count, wafer, wafers, site, siteNames }: Readings): Map<string, number[]> {
  const rows = new Map<string, number[]>()
  for (let row = 0; row < count; row++) {
    const name = nameOf(wafers[wafer[row]].id, siteNames[site[row]])
    const known = rows.get(name)
    if (known) known.push(row)
    else rows.set(name, [row])
  }
  return rows
}

/** Names hold no line breaks: a row of a file would have ended there. */
function nameOf(wafer: string, site: string): string {
  return `${wafer}\n${site}`
}
