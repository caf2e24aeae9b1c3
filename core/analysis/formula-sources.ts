/** Which published formulas an analysis used, for the report's list of sources. */
import { CONFORMANCE_PROBABILITY } from '../conformity/formulas'
import { DUAL, THICKNESS } from '../geometry/formulas'
import { outlineGeometry } from '../geometry/registry'
import { JUNCTION_DEPTH } from '../layer/formulas'
import { layerKind } from '../layer/registry'
import { layerProfile } from '../layer/profiles/registry'
import { GAUSSIAN_PROCESS, THIN_PLATE_SPLINE } from '../map/formulas'
import { METHOD_TITLES } from '../map/interpolator'
import type { Procedure } from '../procedure/schema'
import { TEMPERATURE_COEFFICIENT } from '../silicon/formulas'
import type { Formula } from '../units/formula'
import { PROPAGATION } from './formulas'
import type { LotAnalysis } from './lot-analysis'
import { layerMobility } from './prepare-layer'
import { sitePositions } from './site-positions'

export interface FormulaSource {
  readonly id: string
  readonly title: string
  readonly reference: string
}

export function formulaSources(analysis: LotAnalysis): FormulaSource[] {
  const { procedure, outline, readings, sites } = analysis
  const { layer } = procedure
  const hasPlaces = sitePositions(readings, procedure) !== null
  const geometry = outlineGeometry(hasPlaces ? outline : { shape: 'infinite' })
  const kind = layerKind(layer.kind)
  const mobility = layerMobility(layer)
  const isDual = procedure.probe.technique === 'dual' && sites.vOverIB_ohm !== null
  const { interpolation } = procedure.map
  const entry = (id: string, title: string, reference: string): FormulaSource => ({ id, title, reference })
  const formula = (id: string, { title, source }: Formula): FormulaSource => entry(id, title, source)
  return [
    entry('geometry', `Geometry factor: ${geometry.title}`, geometry.source),
    ...(isDual ? [formula('dual', DUAL)] : []),
    ...(layer.kind === 'bulk'
      ? [formula('thickness', THICKNESS), formula('temperature', TEMPERATURE_COEFFICIENT)]
      : []),
    ...kind.sources.map((reference, k) => entry(`${kind.id}-${k}`, kind.title, reference)),
    ...(layer.kind === 'doped-layer' ? [entry('profile', `Profile: ${layer.profile}`, profileSource(layer))] : []),
    ...(layer.kind === 'doped-layer' && layer.diffusionLengthUm !== undefined
      ? [formula('junction', JUNCTION_DEPTH)]
      : []),
    ...(mobility ? [entry(mobility.id, `Mobility model: ${mobility.title}`, mobility.source)] : []),
    entry('uniformity', 'Non-uniformity figures SUP and HLV', 'SEMI MF1618-1104'),
    formula('uncertainty', PROPAGATION),
    formula('conformance', CONFORMANCE_PROBABILITY),
    ...(analysis.dies
      ? [entry('dies', `Dies between sites: ${METHOD_TITLES[interpolation]}`, SURFACES[interpolation].source)]
      : []),
  ]
}

function profileSource({ profile, profileFile }: Extract<Procedure['layer'], { kind: 'doped-layer' }>): string {
  return profile === 'tabulated' ? `the file ${profileFile}` : layerProfile(profile).source
}

const SURFACES = { 'thin-plate-spline': THIN_PLATE_SPLINE, 'gaussian-process': GAUSSIAN_PROCESS } as const
