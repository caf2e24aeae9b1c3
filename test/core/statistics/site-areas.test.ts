import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { siteAreas } from '../../../core/statistics/site-areas'
import type { UsableRegion } from '../../../core/statistics/usable-region'
import { cartesianPlan, concentricPlan, diameterPlan } from '../../../core/wafer/site-patterns'

const disc = (radius_mm: number): UsableRegion => ({ shape: 'disc', radius_mm })
const sum = (areas: Float64Array) => areas.reduce((a, b) => a + b, 0)

describe('exact ring areas', () => {
  it('SEMI MF1618 49 sites out to half a step beyond: every site stands for the same area', () => {
    const { method, area_mm2 } = siteAreas({ ...concentricPlan({ circles: 3, outerRadius_mm: 60 }), region: disc(70) })
    expect(method).toBe('rings')
    for (const area of area_mm2) expect(area).toBeCloseTo(Math.PI * 100, 9)
  })

  it.each([3, 5, 8])(
    '%d circles out to the edge: the outermost stand for (1 - 1 / (4 K)) / 2 of the others',
    (circles) => {
      const plan = concentricPlan({ circles, outerRadius_mm: 95 })
      const { area_mm2 } = siteAreas({ ...plan, region: disc(95) })
      const inner = (Math.PI * (95 / circles) ** 2) / 4
      area_mm2.forEach((area, i) => {
        const isOutermost = i >= plan.count - 8 * circles
        expect(area).toBeCloseTo(isOutermost ? (inner * (1 - 1 / (4 * circles))) / 2 : inner, 9)
      })
    },
  )

  it('a diameter scan weighs its sites as their radius, both of a pair alike', () => {
    const { method, area_mm2 } = siteAreas({
      ...diameterPlan({ count: 5, outerRadius_mm: 80, angle_deg: 30 }),
      region: disc(100),
    })
    expect(method).toBe('rings')
    const ring = (inner: number, outer: number) => (Math.PI * (outer ** 2 - inner ** 2)) / 2
    const expected = [ring(60, 100), ring(20, 60), Math.PI * 400, ring(20, 60), ring(60, 100)]
    area_mm2.forEach((area, i) => expect(area).toBeCloseTo(expected[i], 8))
  })

  it('a diameter scan of a thousand sites too', () => {
    const { method } = siteAreas({ ...diameterPlan({ count: 1001, outerRadius_mm: 97 }), region: disc(97) })
    expect(method).toBe('rings')
  })

  it('a lattice so dense that its sites fill all radii and angles is no circle', () => {
    const { method } = siteAreas({ ...cartesianPlan({ rows: 101, outerRadius_mm: 95 }), region: disc(97) })
    expect(method).toBe('cells')
  })

  it('coordinates rounded to 0.1 mm are still circles; with a site missing they are not', () => {
    const plan = concentricPlan({ circles: 3, outerRadius_mm: 95 })
    const rounded = (column: Float64Array) => column.map((v) => Math.round(10 * v) / 10)
    const places = { x_mm: rounded(plan.x_mm), y_mm: rounded(plan.y_mm), region: disc(97) }
    expect(siteAreas(places).method).toBe('rings')
    const fewer = { ...places, x_mm: places.x_mm.slice(1).slice(0, -1), y_mm: places.y_mm.slice(1).slice(0, -1) }
    expect(siteAreas(fewer).method).toBe('cells')
  })
})

describe('limits', () => {
  const lattice = cartesianPlan({ rows: 9, outerRadius_mm: 95 })

  it('one site has all, two halves, four corners of a plate a quarter each', () => {
    expect(
      siteAreas({ x_mm: Float64Array.of(7), y_mm: Float64Array.of(-3), region: disc(10) }).area_mm2[0],
    ).toBeCloseTo(100 * Math.PI, 9)
    const two = siteAreas({ x_mm: Float64Array.of(2, 8), y_mm: Float64Array.of(1, 1), region: disc(10) })
    expect(sum(two.area_mm2)).toBeCloseTo(100 * Math.PI, 4)
    const chord = 100 * Math.acos(0.5) - 5 * Math.sqrt(75)
    expect(two.area_mm2[1]).toBeCloseTo(chord, 4)
    const plate = siteAreas({
      x_mm: Float64Array.of(-20, 20, -20, 20),
      y_mm: Float64Array.of(-10, -10, 10, 10),
      region: { shape: 'rectangle', width_mm: 100, height_mm: 40 },
    })
    for (const area of plate.area_mm2) expect(area).toBeCloseTo(1000, 9)
  })

  it('a lattice has its squares, the same for all that the edge does not cut', () => {
    const { method, area_mm2 } = siteAreas({ ...lattice, region: disc(100) })
    expect(method).toBe('cells')
    const step = 190 / 9
    expect(area_mm2[0]).toBeCloseTo(step * step, 3)
    expect(sum(area_mm2)).toBeCloseTo(Math.PI * 1e4, 2)
  })

  it('sites on one line off the centre have strips', () => {
    const y_mm = Float64Array.of(-70, 10, 40)
    const { method, area_mm2 } = siteAreas({ x_mm: new Float64Array(3), y_mm, region: disc(100) })
    const above = (d: number) => 1e4 * Math.acos(d / 100) - d * Math.sqrt(1e4 - d * d)
    expect(method).toBe('cells')
    const strips = [above(-100) - above(-30), above(-30) - above(25), above(25)]
    area_mm2.forEach((area, i) => expect(area).toBeCloseTo(strips[i], 2))
  })

  it('a site measured three times shares its area', () => {
    const x_mm = Float64Array.of(...lattice.x_mm, lattice.x_mm[3], lattice.x_mm[3])
    const y_mm = Float64Array.of(...lattice.y_mm, lattice.y_mm[3], lattice.y_mm[3])
    const once = siteAreas({ ...lattice, region: disc(100) }).area_mm2
    const { area_mm2 } = siteAreas({ x_mm, y_mm, region: disc(100) })
    for (const i of [3, 69, 70]) expect(area_mm2[i]).toBeCloseTo(once[3] / 3, 6)
    expect(sum(area_mm2)).toBeCloseTo(Math.PI * 1e4, 2)
  })
})

describe('laws', () => {
  const at = fc.double({ min: -1, max: 1, noNaN: true })
  const places = fc.array(fc.tuple(at, at), { minLength: 1, maxLength: 40 })
  const columns = (sites: (readonly [number, number])[], width: number, height: number) => ({
    x_mm: Float64Array.from(sites, ([x]) => x * width),
    y_mm: Float64Array.from(sites, ([, y]) => y * height),
  })

  it('the areas make up the region', () => {
    fc.assert(
      fc.property(places, (sites) => {
        const box = siteAreas({
          ...columns(sites, 50, 30),
          region: { shape: 'rectangle', width_mm: 100, height_mm: 60 },
        })
        expect(sum(box.area_mm2) / 6000).toBeCloseTo(1, 5)
        const wafer = siteAreas({ ...columns(sites, 70, 70), region: disc(100) })
        expect(sum(wafer.area_mm2) / (Math.PI * 1e4)).toBeCloseTo(1, 5)
        for (const area of wafer.area_mm2) expect(area).toBeGreaterThanOrEqual(0)
      }),
    )
  })
})

describe('a second implementation: which site is nearest, over a fine lattice', () => {
  it.each(['disc', 'rectangle'] as const)('%s', (shape) => {
    const x_mm = Float64Array.from({ length: 23 }, (_, i) => 65 * Math.sin(7 * i * i + 1))
    const y_mm = Float64Array.from({ length: 23 }, (_, i) => 65 * Math.cos(5 * i * i + 2))
    const region: UsableRegion = shape === 'disc' ? disc(95) : { shape, width_mm: 140, height_mm: 160 }
    const { area_mm2 } = siteAreas({ x_mm, y_mm, region })
    const counted = new Float64Array(23)
    const step = 0.4
    for (let x = -95 + step / 2; x < 95; x += step) {
      for (let y = -95 + step / 2; y < 95; y += step) {
        if (shape === 'disc' ? x * x + y * y > 95 * 95 : Math.abs(x) > 70 || Math.abs(y) > 80) continue
        let nearest = 0
        for (let i = 1; i < 23; i++) {
          const closer = (x - x_mm[i]) ** 2 + (y - y_mm[i]) ** 2 < (x - x_mm[nearest]) ** 2 + (y - y_mm[nearest]) ** 2
          if (closer) nearest = i
        }
        counted[nearest] += step * step
      }
    }
    area_mm2.forEach((area, i) => expect(Math.abs(area - counted[i])).toBeLessThan(0.01 * area + 5))
  })
})

describe('refusals', () => {
  const one = Float64Array.of(1)
  it('no sites, one outside, one nowhere, no region', () => {
    expect(() => siteAreas({ x_mm: new Float64Array(0), y_mm: new Float64Array(0), region: disc(10) })).toThrow(
      CoreError,
    )
    expect(() => siteAreas({ x_mm: Float64Array.of(11), y_mm: one, region: disc(10) })).toThrow(CoreError)
    expect(() => siteAreas({ x_mm: Float64Array.of(NaN), y_mm: one, region: disc(10) })).toThrow(CoreError)
    expect(() => siteAreas({ x_mm: Float64Array.of(0), y_mm: Float64Array.of(0), region: disc(0) })).toThrow(CoreError)
  })
})
