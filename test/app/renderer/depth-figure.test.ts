import { describe, expect, it } from 'vitest'
import { depthFigure } from '../../../app/renderer/figures/depth-figure'
import { lotPictures } from '../../../app/renderer/figures/lot-pictures'
import { run } from '../../../core/analysis/run'

const bytes = (text: string): Uint8Array => new TextEncoder().encode(text)
const csv = ['wafer,site,x_mm,y_mm,v_over_i_ohm', '1,1,0,0,20.3', '1,2,20,0,20.4', '1,3,40,0,20.2'].join('\n')
const background = { dopant: 'phosphorus', concentrationCm3: 1e15 }
const common = { kind: 'doped-layer', dopant: 'boron', background }

function figureOf(layer: object, profile = '') {
  const procedure = { format: 'persquare-procedure/1', wafer: { diameterMm: 200 }, probe: { spacingMm: 1 }, layer }
  const { analysis, problems } = run({
    readings: [{ name: 'a.csv', bytes: bytes(csv), sha256: '' }],
    procedure: { name: 'p.json', bytes: bytes(JSON.stringify(procedure)) },
    companions: profile === '' ? [] : [{ name: 'sims.csv', bytes: bytes(profile), sha256: '' }],
  })
  expect(problems).toEqual([])
  return depthFigure(lotPictures(analysis!), analysis!.wafers[0])!
}

describe('the concentration in depth', () => {
  const depths = Array.from({ length: 110 }, (_, k) => k * 0.005)
  const gaussian = depths.map((x) => 1e19 * Math.exp(-Math.log(1e4) * (x / 0.35) ** 2))
  const table = ['depth_um,concentration_cm3', ...depths.map((x, k) => `${x},${gaussian[k]}`)].join('\n')

  it('of a profile file is that file by a factor, and ends where the named profile of its shape ends', () => {
    const named = figureOf({ ...common, profile: 'gaussian', depthUm: 0.35 })
    const tabulated = figureOf({ ...common, profile: 'tabulated', profileFile: 'sims.csv' }, table)
    const [line] = tabulated.series
    expect(line.x).toEqual(depths)
    const factor = line.y[0] / gaussian[0]
    line.y.forEach((n, k) => expect(n / gaussian[k] / factor).toBeCloseTo(1, 12))
    const junction = tabulated.rules.find(({ name }) => name === 'junction')!
    expect(line.y[0]).toBeGreaterThan(1e18)
    // The same shape and nearly the same depth: a file keeps its own, so the junction moves as its scale does.
    expect(Math.abs(junction.at - 0.35)).toBeLessThan(0.08)
    expect(named.rules.map(({ name }) => name)).toEqual(tabulated.rules.map(({ name }) => name))
  })
})
