import { describe, expect, it } from 'vitest'
import { run } from '../../../core/analysis/run'
import { seededRandom } from '../../../core/numeric/random'

const bytes = (text: string): Uint8Array => new TextEncoder().encode(text)

function findingsOf(sites: number) {
  const random = seededRandom(4)
  const rows = ['wafer,site,x_mm,y_mm,current_A,voltage_V']
  for (let k = 0; k < sites; k++) {
    const [radius, angle] = [95 * Math.sqrt((k + 0.5) / sites), 2.4 * k]
    const place = [radius * Math.cos(angle), radius * Math.sin(angle)].map((mm) => mm.toFixed(4))
    rows.push(['W01', k + 1, ...place, 5e-4, (0.01015 * (1 + 1e-3 * random.normal())).toPrecision(7)].join(','))
  }
  const procedure = { format: 'persquare-procedure/1', wafer: { diameterMm: 200 }, probe: { spacingMm: 1 } }
  const { analysis } = run({
    readings: [{ name: 'a.csv', bytes: bytes(rows.join('\n')), sha256: '' }],
    procedure: { name: 'p.json', bytes: bytes(JSON.stringify(procedure)) },
  })
  return analysis!.health.filter(({ check }) => check === 'left-out')
}

describe('a wafer that is too long to be looked at', () => {
  it('is named, and one of just as many sites as are looked at is not', () => {
    expect(findingsOf(2000)).toEqual([])
    expect(findingsOf(2001)).toMatchObject([{ severity: 'note', wafers: ['W01'] }])
    expect(findingsOf(2001)[0].sentence).toMatch(/^Wafer W01 has more than 2000 sites: not looked at for stray sites/)
  })
})
