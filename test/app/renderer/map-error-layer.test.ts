import { describe, expect, it } from 'vitest'
import { mapLayer, mapLayers } from '../../../app/renderer/figures/layers'
import { lotPictures } from '../../../app/renderer/figures/lot-pictures'
import { runLot } from '../../core/analysis/trust-lots'

describe('the standard error of the map as a layer', () => {
  const pictures = lotPictures(runLot('TB-0417-trust'))
  const layer = mapLayer(pictures, 'map-error')!

  it('is there where the procedure chooses the Gaussian process, and only there', () => {
    const plain = lotPictures(runLot('TB-0417'))
    expect(mapLayers(pictures).map(({ id }) => id)).toContain('map-error')
    expect(mapLayers(plain).map(({ id }) => id)).not.toContain('map-error')
  })

  it('has an error at every site, and more of it at the edge than at the centre', () => {
    expect(layer.column.every((error) => error > 0)).toBe(true)
    const { positions, wafers } = pictures
    const [wafer] = wafers
    const radius = (row: number): number => Math.hypot(positions!.x_mm[row], positions!.y_mm[row])
    const byRadius = [...wafer.sites].sort((a, b) => radius(a) - radius(b))
    expect(layer.column[byRadius.at(-1)!]).toBeGreaterThan(layer.column[byRadius[0]])
  })

  it('has a surface for every wafer, and a scale that a stray site does not flatten', () => {
    for (const wafer of pictures.wafers) expect(layer.betweenSites!(wafer.sites[0], 'small'), wafer.id).not.toBeNull()
    const nineteen = pictures.wafers.find(({ id }) => id === '19')!
    const last = layer.scale.edges.at(-1)!
    expect(layer.column[nineteen.sites[0]]).toBeGreaterThan(last)
    expect(layer.scale.goesOn?.above).toBe(true)
  })
})
