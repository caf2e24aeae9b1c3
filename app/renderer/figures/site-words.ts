/** What is said of a single site where the pointer rests, and in the ledger. */
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import { SITE_FLAGS } from '../../../core/analysis/flags'
import { formatQuantity, formatWithUncertainty } from '../../../core/units/format'
import { MARK_WORDS } from '../formats/words'
import type { MapLayer } from './map-layer'
import { siteMark, type LotPictures } from './lot-pictures'

export function flagSentences(flags: number): readonly string[] {
  return Object.values(SITE_FLAGS)
    .filter(({ bit }) => (flags & bit) !== 0)
    .map(({ sentence }) => sentence)
}

export function siteName({ readings }: LotAnalysis, site: number): string {
  return readings.siteNames[readings.site[site]]
}

/** "site 31: 98.41 Ω/sq, above its limit". */
export function siteWords(pictures: LotPictures, site: number, layer: MapLayer): string {
  const { analysis } = pictures
  const value = layer.isJudged
    ? formatWithUncertainty(analysis.sites.value[site], analysis.sites.u[site], layer.unit)
    : formatQuantity(layer.column[site], layer.unit)
  const kind = siteMark(pictures, site)
  return `site ${siteName(analysis, site)}: ${value}${kind === 'in-spec' ? '' : `, ${MARK_WORDS[kind]}`}`
}
