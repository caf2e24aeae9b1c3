/** Which published formulas an analysis used, for the report's list of sources. */
import { DUAL_SOURCE } from '../geometry/dual'
import { outlineGeometry } from '../geometry/registry'
import { THICKNESS_SOURCE } from '../geometry/thickness'
import { JUNCTION_SOURCE } from '../layer/junction-depth'
import { layerKind } from '../layer/registry'
import { layerProfile } from '../layer/profiles/registry'
import { GAUSSIAN_PROCESS_SOURCE } from '../map/gaussian-process'
import { METHOD_TITLES } from '../map/interpolator'
import type { Procedure } from '../procedure/schema'
import { TEMPERATURE_SOURCE } from '../silicon/temperature'
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
  const entry = (id: string, title: string, reference: string): FormulaSource => ({ id, title, reference })
  return [
    entry('geometry', `Geometry factor: ${geometry.title}`, geometry.source),
    ...(procedure.probe.technique === 'dual' && sites.vOverIB_ohm
      ? [entry('dual', 'Dual configuration', DUAL_SOURCE)]
      : []),
    ...(layer.kind === 'bulk' ? [entry('thickness', 'Thickness factor', THICKNESS_SOURCE)] : []),
    ...(layer.kind === 'bulk' ? [entry('temperature', 'Temperature coefficient', TEMPERATURE_SOURCE)] : []),
    ...kind.sources.map((reference, k) => entry(`${kind.id}-${k}`, kind.title, reference)),
    ...(layer.kind === 'doped-layer' ? [entry('profile', `Profile: ${layer.profile}`, profileSource(layer))] : []),
    ...(layer.kind === 'doped-layer' && layer.diffusionLengthUm !== undefined
      ? [entry('junction', 'Junction depth from the diffusion length', JUNCTION_SOURCE)]
      : []),
    ...(mobility ? [entry(mobility.id, `Mobility model: ${mobility.title}`, mobility.source)] : []),
    entry('uniformity', 'Non-uniformity figures SUP and HLV', 'SEMI MF1618-1104'),
    entry('uncertainty', 'Propagation of uncertainty', 'JCGM 100:2008, 5.1.2'),
    entry('conformance', 'Probability to conform', 'JCGM 106:2012, clause 7'),
    ...(analysis.dies
      ? [
          entry(
            'dies',
            `Dies between sites: ${METHOD_TITLES[procedure.map.interpolation]}`,
            SURFACE_SOURCES[procedure.map.interpolation],
          ),
        ]
      : []),
  ]
}

function profileSource({ profile, profileFile }: Extract<Procedure['layer'], { kind: 'doped-layer' }>): string {
  return profile === 'tabulated' ? `the file ${profileFile}` : layerProfile(profile).source
}

const SURFACE_SOURCES = {
  'thin-plate-spline':
    'J. Duchon, in: Constructive Theory of Functions of Several Variables, Springer (1977) 85 (from memory)',
  'gaussian-process': GAUSSIAN_PROCESS_SOURCE,
} as const
