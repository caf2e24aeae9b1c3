import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { joins_cm3 } from '../../../core/layer/doped-silicon'
import { junctionDepth_um } from '../../../core/layer/junction-depth'
import { meanNetDensity_cm3, sheetDepthProduct_ohm_um } from '../../../core/layer/profile-integral'
import { layerProfile, layerProfiles } from '../../../core/layer/profiles/registry'
import type { ProfileId } from '../../../core/layer/layer-kind'
import { DOPANTS } from '../../../core/silicon/dopants'
import type { Dopant } from '../../../core/silicon/dopants'
import { mobilityIds } from '../../../core/silicon/mobility/registry'
import type { MobilityId } from '../../../core/silicon/mobility/registry'
import { resistivity_ohm_cm } from '../../../core/silicon/resistivity'
import { erfc, erfcInverse } from '../../../core/numeric/erfc'
import { boronGaussianPoints, irvinLayers } from '../../reference/irvin-layers'
import { modelOf, tanhSinh } from './layer-fixtures'

interface Case {
  readonly dopant: Dopant
  readonly profile: ProfileId
  readonly mobility: MobilityId
  readonly surface_cm3: number
  readonly background_cm3: number
}

const siliconOf = ({ dopant, mobility }: Pick<Case, 'dopant' | 'mobility'>) => {
  return { dopant, mobility: modelOf(mobility), temperature_K: 300 }
}
const productOf = (layer: Case): number =>
  sheetDepthProduct_ohm_um({ ...layer, silicon: siliconOf(layer), profile: layerProfile(layer.profile) })

/** N over eta as each profile is written in the literature, from a second pen. */
const densityOf: Record<ProfileId, (ns: number, nb: number, eta: number) => number> = {
  uniform: (ns) => ns,
  gaussian: (ns, nb, eta) => ns * (nb / ns) ** (eta * eta),
  exponential: (ns, nb, eta) => ns * (nb / ns) ** eta,
  erfc: (ns, nb, eta) => ns * erfc(erfcInverse(nb / ns) * eta),
}

/** Depth at which the density has come down to a level, by bisection. */
function depthAt(layer: Case, level_cm3: number): number {
  let [low, high] = [0, 1]
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2
    if (densityOf[layer.profile](layer.surface_cm3, layer.background_cm3, middle) > level_cm3) low = middle
    else high = middle
  }
  return low
}

/** q mu(N + N_B) (N - N_B) over 0..1 by the tanh-sinh rule, cut only where the model itself jumps. */
function productByTanhSinh(layer: Case, impurityShare = 1): number {
  const { dopant, profile, surface_cm3, background_cm3 } = layer
  const { mobility } = siliconOf(layer)
  const carrier = dopant === 'boron' ? 'hole' : 'electron'
  const conductivity = (eta: number): number => {
    const n = densityOf[profile](surface_cm3, background_cm3, eta)
    const impurity_cm3 = n + impurityShare * background_cm3
    const mu = mobility.mobility_cm2_per_Vs({ carrier, dopant, impurity_cm3, temperature_K: 300 })
    return 1.602176634e-19 * mu * (n - background_cm3)
  }
  const cuts = joins_cm3(siliconOf(layer))
    .map((join) => depthAt(layer, join - background_cm3))
    .filter((eta) => eta > 0 && eta < 1 && profile !== 'uniform')
  const ends = [0, ...cuts, 1]
  return 1e4 / ends.slice(1).reduce((sum, end, i) => sum + tanhSinh(conductivity, ends[i], end), 0)
}

const anyLayer = fc
  .record({
    dopant: fc.constantFrom(...DOPANTS),
    profile: fc.constantFrom(...layerProfiles.map(({ id }) => id)),
    mobility: fc.constantFrom(...mobilityIds),
    logBackground: fc.double({ min: 12, max: 18, noNaN: true }),
    share: fc.double({ min: 0, max: 1, noNaN: true }),
  })
  .map(({ logBackground, share, ...rest }): Case => {
    const background_cm3 = 10 ** logBackground
    const excess = 0.01 * (1e23 / background_cm3) ** share
    return { ...rest, background_cm3, surface_cm3: background_cm3 * (1 + excess) }
  })

/** Of all models: the arsenic fit of SEMI MF723 run on past its end implies a mobility that rises with doping. */
const fallingMobilities = mobilityIds.filter((id) => id !== 'mf723')

describe('sheet resistance times depth', () => {
  it.each(
    irvinLayers.map((row) => [`${row.dopant} ${row.profile} ${row.surface_cm3} over ${row.background_cm3}`, row]),
  )('is the reference value to all its digits: %s', (_, row) => {
    expect(typeof row === 'object' && Math.abs(productOf(row) / row.product_ohm_um - 1)).toBeLessThan(1e-11)
  })

  it('would be the last column with mobility at N alone', () => {
    for (const row of irvinLayers) {
      expect(Math.abs(productByTanhSinh(row, 0) / row.productOfMobilityAtN_ohm_um - 1)).toBeLessThan(1e-7)
    }
  })

  it.each(boronGaussianPoints)('is the reference for boron gaussian $surface_cm3 over $background_cm3', (point) => {
    const product = productOf({ dopant: 'boron', profile: 'gaussian', mobility: 'masetti', ...point })
    expect(Math.abs(product / point.product_ohm_um - 1)).toBeLessThan(7e-4)
  })
})

describe('its limits', () => {
  it('is a bulk slab where the layer is uniform and the background negligible', () => {
    for (const dopant of DOPANTS) {
      const layer = {
        dopant,
        profile: 'uniform',
        mobility: 'masetti',
        surface_cm3: 1e17,
        background_cm3: 1e10,
      } as const
      const slab_ohm_um = 1e4 * resistivity_ohm_cm({ ...siliconOf(layer), concentration_cm3: 1e17 })
      expect(Math.abs(productOf(layer) / slab_ohm_um - 1)).toBeLessThan(3e-7)
    }
  })

  it('grows without limit as the surface comes down to the background', () => {
    const layer = { dopant: 'boron', profile: 'gaussian', mobility: 'masetti', background_cm3: 1e15 } as const
    const products = [1e-2, 1e-3, 1e-4].map((e) => productOf({ ...layer, surface_cm3: 1e15 * (1 + e) }))
    expect(products[1] / products[0]).toBeCloseTo(10, 0)
    expect(products[2] / products[1]).toBeCloseTo(10, 1)
  })
})

describe('its laws', () => {
  it('more dopant, less resistance: every model, every profile', () => {
    fc.assert(
      fc.property(anyLayer, (layer) => {
        const more = { ...layer, surface_cm3: layer.surface_cm3 * 1.001 }
        expect(productOf(more)).toBeLessThan(productOf(layer))
      }),
      { numRuns: 200 },
    )
  })

  it('the same diffusion in more background, more resistance', () => {
    fc.assert(
      fc.property(anyLayer, fc.constantFrom(...fallingMobilities), (drawn, mobility) => {
        const layer = { ...drawn, mobility }
        const resistance = (background_cm3: number): number => {
          const length = { ...layer, background_cm3, length_um: 1 }
          const depth_um = layer.profile === 'uniform' ? 1 : junctionDepth_um(length)
          return productOf({ ...layer, background_cm3 }) / depth_um
        }
        expect(resistance(layer.background_cm3)).toBeGreaterThan(resistance(layer.background_cm3 * 0.99))
      }),
      { numRuns: 150 },
    )
  })

  it('a fuller profile conducts better: uniform, gaussian, erfc, exponential', () => {
    fc.assert(
      fc.property(anyLayer, (layer) => {
        const [box, gauss, tail, straight] = (['uniform', 'gaussian', 'erfc', 'exponential'] as const).map((profile) =>
          productOf({ ...layer, profile }),
        )
        expect(box).toBeLessThan(gauss)
        expect(gauss).toBeLessThan(tail)
        expect(tail).toBeLessThan(straight)
      }),
      { numRuns: 100 },
    )
  })
})

describe('a second implementation', () => {
  it('agrees to 1e-10: tanh-sinh over the whole depth', () => {
    fc.assert(
      fc.property(anyLayer, (layer) => {
        // Next to the background N - N_B loses its digits in the plain formula of the test.
        const digits = 1e-10 + (1e-15 * layer.surface_cm3) / (layer.surface_cm3 - layer.background_cm3)
        expect(Math.abs(productOf(layer) / productByTanhSinh(layer) - 1)).toBeLessThan(digits)
      }),
      { numRuns: 150 },
    )
  })

  it('agrees on the mean net density: integral of N - N_B', () => {
    fc.assert(
      fc.property(anyLayer, (layer) => {
        const { surface_cm3: ns, background_cm3: nb } = layer
        const mean = meanNetDensity_cm3({ ...layer, profile: layerProfile(layer.profile) })
        const integral = tanhSinh((eta) => densityOf[layer.profile](ns, nb, eta) - nb, 0, 1)
        expect(Math.abs(mean / integral - 1)).toBeLessThan(1e-11)
      }),
      { numRuns: 100 },
    )
  })
})
