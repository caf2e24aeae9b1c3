/** Wafers and sites by name: "7" is wafer 07, "7 31" its site 31. */
import type { WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { waferTitle } from '../../../core/report/report-context'
import type { LotPictures } from './lot-pictures'
import { siteName } from './site-words'

export interface FoundPlace {
  readonly wafer: string
  /** Row of the site columns. */
  readonly site: number | null
  readonly words: string
}

const MOST = 12

/** The nearest names first. */
export function findPlaces({ wafers, analysis }: LotPictures, sought: string): readonly FoundPlace[] {
  const [name = '', site] = sought.trim().replace(/\b(wafer|site)\b/gi, ' ').trim().split(/[\s,/]+/) // prettier-ignore
  if (name === '') return []
  const meant = wafers
    .filter(({ id }) => bare(id).includes(bare(name)))
    .sort((a, b) => bare(a.id).length - bare(b.id).length)
  if (site === undefined)
    return meant.slice(0, MOST).map(({ id }) => ({ wafer: id, site: null, words: waferTitle(id) }))
  return meant.flatMap((wafer) => sitesNamed(wafer, site)).slice(0, MOST)

  function sitesNamed(wafer: WaferAnalysis, start: string): FoundPlace[] {
    const rows = Array.from(wafer.sites).filter((row) => bare(siteName(analysis, row)).startsWith(bare(start)))
    return rows.slice(0, MOST).map((row) => ({ wafer: wafer.id, site: row, words: `${waferTitle(wafer.id)}, site ${siteName(analysis, row)}` }))
  } // prettier-ignore
}

/** Without capitals and leading zeros. */
function bare(name: string): string {
  return name.toLowerCase().replace(/^0+(?=.)/, '')
}
