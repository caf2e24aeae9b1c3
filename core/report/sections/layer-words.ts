/** How a layer is named, and which of its quantities stands first. */
import type { LotAnalysis, WaferAnalysis } from '../../analysis/lot-analysis'
import { layerProfile } from '../../layer/profiles/registry'
import type { Procedure } from '../../procedure/schema'

export type LayerSettings = Procedure['layer']
type DopedLayer = Extract<LayerSettings, { kind: 'doped-layer' }>

export interface LayerQuantityColumn {
  readonly title: string
  readonly unit: string
  readonly mean: (wafer: WaferAnalysis) => number
}

/** In one phrase: "boron, gaussian layer 0.35 µm deep on phosphorus (masetti)". */
export function layerWords(layer: LayerSettings): string {
  switch (layer.kind) {
    case 'sheet':
      return 'sheet resistance only'
    case 'bulk':
      return `bulk, ${layer.dopant} (${layer.mobility})`
    case 'doped-layer':
      return `${layer.dopant}, ${profileWords(layer)}, on ${layer.background.dopant} (${layer.mobility})`
    case 'implant':
      return `${layer.dopant} implant, range ${layer.rangeUm} µm, straggle ${layer.straggleUm} µm (${layer.mobility})`
    case 'film':
      return layer.thicknessUm !== undefined
        ? `film, ${layer.thicknessUm} µm`
        : layer.resistivityOhmCm !== undefined
          ? `film, ${layer.resistivityOhmCm} Ω·cm`
          : 'film'
  }
}

/** "gaussian, 0.35 µm deep"; of a diffusion length "gaussian, √(D t) = 0.06 µm"; of a table "profile NAME". */
function profileWords({ profile, depthUm, diffusionLengthUm, profileFile }: DopedLayer): string {
  if (profile === 'tabulated') return `profile ${profileFile}`
  if (depthUm !== undefined) return `${profile}, ${depthUm} µm deep`
  return `${profile}, ${layerProfile(profile).lengthSymbol} = ${diffusionLengthUm} µm`
}

/** What a concentration of this layer means. */
export function concentrationTitle(layer: LayerSettings): string {
  if (layer.kind === 'doped-layer' && layer.profile === 'tabulated') return 'Peak concentration'
  if (layer.kind === 'doped-layer') return layer.profile === 'uniform' ? 'Mean concentration' : 'Surface concentration'
  if (layer.kind === 'implant') return 'Peak concentration'
  return 'Dopant concentration'
}

/** Everything the layer gave, in the order of a person's interest; what it didn't give is left out. */
export function layerColumns({ procedure, wafers, quantity }: LotAnalysis): LayerQuantityColumn[] {
  const all: LayerQuantityColumn[] = [
    { title: concentrationTitle(procedure.layer), unit: 'cm⁻³', mean: ({ means }) => means.concentration_cm3 },
    { title: 'Active dose', unit: 'cm⁻²', mean: ({ means }) => means.dose_cm2 },
    { title: 'Film thickness', unit: 'µm', mean: ({ means }) => means.thickness_um },
    { title: 'Resistivity', unit: 'Ω·cm', mean: ({ means }) => means.resistivity_ohm_cm },
  ]
  return all.filter(
    ({ title, mean }) =>
      !(title === 'Resistivity' && quantity.id === 'resistivity') &&
      wafers.some((wafer) => Number.isFinite(mean(wafer))),
  )
}

const SHORT_TITLES: Readonly<Record<string, string>> = {
  'Mean concentration': 'Mean N', 'Surface concentration': 'Surface N', 'Peak concentration': 'Peak N',
  'Dopant concentration': 'N', 'Active dose': 'Dose', 'Film thickness': 'Thickness',
} // prettier-ignore

/** The first of them under a title short enough for a narrow column. */
export function layerColumnOf(analysis: LotAnalysis): LayerQuantityColumn | null {
  const first = layerColumns(analysis)[0]
  return first ? { ...first, title: SHORT_TITLES[first.title] ?? first.title } : null
}
