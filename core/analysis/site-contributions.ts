/** The components that act on one site of a lot, for whoever looks at their sum in another way. */
import { CoreError } from '../problems/problem'
import { correct } from './corrections'
import { layerResults } from './layer-results'
import type { LotAnalysis } from './lot-analysis'
import { measuringSetUp } from './measuring-set-up'
import { oneSite } from './one-site'
import { prepareLayer } from './prepare-layer'
import { sitePositions } from './site-positions'
import { contributions, type Contribution } from './contributions'
import { onResistivity } from './uncertainty'
import { ratios } from './v-over-i'

export interface SiteContributions {
  /** Those that move the judged quantity. */
  readonly parts: readonly Contribution[]
  /** Their root sum of squares, relative to the judged quantity. */
  readonly relative: number
}

/** @throws CoreError not-applicable where nothing that moves the site's value is uncertain */
export function siteContributions(analysis: LotAnalysis, site: number): SiteContributions {
  const { readings: all, procedure, profile, quantity, repeatability, gauge } = analysis
  const readings = oneSite(all, site)
  const flags = new Uint32Array(1)
  const vOverI = ratios(readings, flags)
  const setUp = measuringSetUp(procedure, { hasConfigurationB: vOverI.b_ohm !== null })
  const corrections = correct(readings, procedure, setUp, sitePositions(readings, procedure), vOverI, flags)
  const layer = layerResults(procedure, prepareLayer(procedure, profile), corrections, new Uint32Array(1))
  const sensitivity = layer.resistivitySensitivity[0]
  const effect = (part: Contribution): number =>
    quantity.id === 'resistivity' ? onResistivity(part, part.sheetResistance(0), sensitivity) : part.sheetResistance(0)
  const every = contributions({ procedure, profile, corrections, readings, flags, repeatability, gauge })
  const parts = every.filter((part) => effect(part) !== 0)
  if (parts.length === 0) {
    const why = 'nothing that moves the value has an uncertainty'
    throw new CoreError({ kind: 'not-applicable', what: 'the uncertainty of this site', why })
  }
  return { parts, relative: Math.hypot(...parts.map(effect)) }
}
