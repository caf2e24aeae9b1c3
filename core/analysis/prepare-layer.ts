import type { DepthTable, PreparedLayer } from '../layer/layer-kind'
import { layerKind } from '../layer/registry'
import { CoreError } from '../problems/problem'
import type { Procedure } from '../procedure/schema'
import { mobilityModel } from '../silicon/mobility/registry'
import type { MobilityModel } from '../silicon/mobility-model'
import { CELSIUS_ZERO_K } from '../units/constants'
import { missingProfile } from './companions'

/**
 * The procedure's layer in the terms of layer/, at its reference temperature. Null for bulk silicon of unknown
 * thickness: only a reported resistivity can be inverted then.
 *
 * @param profile the file that a tabulated layer names; the others pass it over
 * @throws CoreError missing-file: a tabulated layer without it; those of the layer kind
 */
export function prepareLayer(
  { layer, wafer, temperature }: Procedure,
  profile: DepthTable | null,
): PreparedLayer | null {
  const temperature_K = temperature.referenceC + CELSIUS_ZERO_K
  switch (layer.kind) {
    case 'sheet':
      return layerKind('sheet').prepare()
    case 'bulk': {
      if (wafer.thicknessUm === undefined) return null
      const silicon = { dopant: layer.dopant, mobility: mobilityOf(layer), temperature_K }
      return layerKind('bulk').prepare({ ...silicon, thickness_um: wafer.thicknessUm })
    }
    case 'doped-layer':
      return layerKind('doped-layer').prepare({
        dopant: layer.dopant,
        mobility: mobilityOf(layer),
        temperature_K,
        profile: layer.profile,
        depth_um: layer.depthUm,
        diffusionLength_um: layer.diffusionLengthUm,
        table: tableOf(layer, profile),
        background: backgroundOf(layer.background),
      })
    case 'implant':
      return layerKind('implant').prepare({
        dopant: layer.dopant,
        mobility: mobilityOf(layer),
        temperature_K,
        range_um: layer.rangeUm,
        straggle_um: layer.straggleUm,
        background: layer.background && backgroundOf(layer.background),
      })
    case 'film':
      return layerKind('film').prepare({ resistivity_ohm_cm: layer.resistivityOhmCm, thickness_um: layer.thicknessUm })
  }
}

function tableOf(layer: Procedure['layer'], profile: DepthTable | null): DepthTable | undefined {
  if (layer.kind !== 'doped-layer' || layer.profile !== 'tabulated') return undefined
  if (!profile) throw new CoreError(missingProfile(layer.profileFile ?? '', ''))
  return profile
}

type DopedLayer = Extract<Procedure['layer'], { readonly dopant: unknown }>

/** Null for layers that have no silicon to speak of. */
export function layerMobility(layer: Procedure['layer']): MobilityModel | null {
  return 'dopant' in layer ? mobilityOf(layer) : null
}

function mobilityOf({ mobility, constantMobility }: DopedLayer): MobilityModel {
  const constants = constantMobility && {
    electrons_cm2_per_Vs: constantMobility.electronsCm2Vs,
    holes_cm2_per_Vs: constantMobility.holesCm2Vs,
  }
  return mobilityModel(mobility, constants)
}

function backgroundOf({ dopant, concentrationCm3 }: { dopant: DopedLayer['dopant']; concentrationCm3: number }) {
  return { dopant, concentration_cm3: concentrationCm3 }
}
