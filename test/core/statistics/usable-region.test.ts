import { describe, expect, it } from 'vitest'
import { isInRegion, usableRegion } from '../../../core/statistics/usable-region'

describe('the usable region', () => {
  it('is the outline less the edge exclusion, or none', () => {
    const wafer = { shape: 'disc', diameter_mm: 200, fiducial: 'notch' } as const
    expect(usableRegion(wafer, 3)).toEqual({ shape: 'disc', radius_mm: 97 })
    expect(usableRegion(wafer, 100)).toBeNull()
    const plate = { shape: 'rectangle', width_mm: 100, height_mm: 20 } as const
    expect(usableRegion(plate, 5)).toEqual({ shape: 'rectangle', width_mm: 90, height_mm: 10 })
    expect(usableRegion(plate, 10)).toBeNull()
    expect(usableRegion({ shape: 'infinite' }, 3)).toBeNull()
  })
})

describe('a place', () => {
  it('is in the region with its rim, and a thousandth beyond', () => {
    const wafer = { shape: 'disc', radius_mm: 97 } as const
    expect([isInRegion(wafer, 97, 0), isInRegion(wafer, 97.05, 0), isInRegion(wafer, 97.2, 0)]).toEqual([
      true,
      true,
      false,
    ])
    const plate = { shape: 'rectangle', width_mm: 90, height_mm: 10 } as const
    expect([isInRegion(plate, 45, -5), isInRegion(plate, 46, 0), isInRegion(plate, 0, 5.1)]).toEqual([
      true,
      false,
      false,
    ])
    expect(isInRegion(wafer, NaN, 0)).toBe(false)
  })
})
