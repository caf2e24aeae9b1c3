import { describe, expect, it } from 'vitest'
import { VERDICTS } from '../../../core/conformity/verdict'
import { SITE_FLAGS } from '../../../core/analysis/flags'
import { resultObject } from '../../../core/analysis/result-json'
import { sampleLot } from './lots'

describe('TB-0417, boron implant monitor (invented)', () => {
  const lot = sampleLot('TB-0417')
  const wafer = (id: string) => lot.wafers.find((entry) => entry.id === id)!

  it('has 25 wafers, one of them with 48 of 49 sites, and one row listed as unreadable', () => {
    expect(lot.wafers.map(({ statistics }) => statistics.count)).toEqual(
      Array.from({ length: 25 }, (_, k) => (k === 3 ? 48 : 49)),
    )
    expect(lot.problems.filter(({ kind }) => kind === 'bad-cell')).toMatchObject([
      { file: 'TB-0417.csv', column: 'voltage_V', found: '---' },
    ])
    expect(wafer('04').rejectedRows).toBe(1)
  })

  it('is out of spec for the three wafers that were made so', () => {
    expect(lot.lot.verdict).toBe('out-of-spec')
    expect(lot.wafers.filter(({ verdict }) => verdict !== 'in-spec').map(({ id }) => id)).toEqual(['07', '13', '19'])
    expect(wafer('07').sitesOut).toBe(24)
    expect(wafer('13').sitesOut).toBe(0)
    expect(wafer('19').sitesOut).toBe(1)
  })

  it('gives the centre site of the first wafer as worked by hand', () => {
    // The first row of the file; C of a centred disc from SEMI MF1527 eq. R2-5, D/s = 200.
    const forward = 1.01131e-2 / 5.00001e-4
    const reverse = -1.01065e-2 / -5.00001e-4
    const squared = 200 ** 2
    const c = Math.PI / (Math.LN2 + Math.log((squared + 3) / (squared - 3)))
    const temperature = 1 - 0.0012 * (22.91 - 23)
    expect(lot.sites.vOverI_ohm[0]).toBeCloseTo((forward + reverse) / 2, 12)
    expect(lot.sites.geometryFactor[0]).toBeCloseTo(c, 11)
    expect(lot.sites.thicknessFactor[0]).toBe(1)
    expect(lot.sites.sheetResistance_ohm_sq[0]).toBeCloseTo(((forward + reverse) / 2) * c * temperature, 10)
  })

  it('tells the stray site an outlier, which counts all the same, and what the wafers show', () => {
    const stray = wafer('19')
    expect(Array.from(stray.outliers, (site) => lot.readings.siteNames[lot.readings.site[site]])).toEqual(['31'])
    expect(stray.statistics.count).toBe(49)
    expect(stray.statisticsOtherwise!.count).toBe(48)
    const result = JSON.parse(JSON.stringify(resultObject(lot, { program: 'Persquare', version: '0' })))
    const shown = (id: string) => result.wafers.find((entry: { id: string }) => entry.id === id)
    expect(shown('19').flags).toContain('outlier')
    expect(JSON.stringify(shown('13').patterns)).toMatch(/tilt/)
    expect(shown('07').figures.meanInterval).not.toBeNull()
  })

  it('judges dies only where sites surround them', () => {
    const dies = lot.dies!
    expect(dies.count % 25).toBe(0)
    const verdicts = new Set(Array.from(dies.verdict, (code) => VERDICTS[code]))
    expect(verdicts).toEqual(new Set(['in-spec', 'out-of-spec']))
    expect(wafer('07').dieCounts!['out-of-spec']).toBeGreaterThan(10)
    expect(wafer('01').dieCounts!['out-of-spec']).toBe(0)
  })
})

describe('TB-0522, phosphorus-doped wafers measured out to the edge (invented)', () => {
  const lot = sampleLot('TB-0522')

  it('is judged by resistivity at 23 °C, found again from readings made by other formulas', () => {
    expect(lot.quantity.id).toBe('resistivity')
    // Along a wafer the generator put rho(x) = centre (1 + 0.035 (x/100)^2) with 0.2 % noise and 0.03 % of voltage.
    const rho = lot.sites.resistivity_ohm_cm
    for (const { sites } of lot.wafers) {
      const shape = (k: number) => 1 + 0.035 * ((-97 + (194 * k) / 28) / 100) ** 2
      const centre = sites.reduce((sum, site, k) => sum + rho[site] / shape(k), 0) / sites.length
      sites.forEach((site, k) => expect(Math.abs(rho[site] / centre / shape(k) - 1)).toBeLessThan(4 * 0.0021))
      expect(Math.abs(centre / 4.55 - 1)).toBeLessThan(4 * 0.0125)
    }
  })

  it('flags the sites whose edge and thickness factors no longer multiply', () => {
    const flagged = lot.sites.flags.filter((flags) => flags & SITE_FLAGS.thicknessNearEdge.bit).length
    // Outermost pins lie 1.5 mm from the rim at x = +-97 and no others within 8 mm: two sites a wafer.
    expect(flagged).toBe(10)
  })
})

describe('NIST check wafer 137, probe 2362 (e-Handbook 2.6.2)', () => {
  const lot = sampleLot('nist-check-wafer-137')

  it('has the published mean and standard deviation of its 25 occasions', () => {
    const [wafer] = lot.wafers
    expect(wafer).toMatchObject({ id: '137', verdict: 'in-spec' })
    expect(wafer.statistics.count).toBe(25)
    expect(wafer.statistics.mean).toBeCloseTo(97.06984, 10)
    // Published 0.02680; recomputed from the file 0.02679813426.
    expect(wafer.statistics.standardDeviation).toBeCloseTo(0.02679813426, 10)
  })

  it('takes the resistivity as reported and inverts it by the MF723 conversion', () => {
    expect(lot.sites.flags.every((flags) => flags & SITE_FLAGS.reported.bit)).toBe(true)
    expect(lot.sites.geometryFactor.every(Number.isNaN)).toBe(true)
    // Phosphorus near 97 ohm.cm: EMIS 1999 decade table, 4.4e13 cm^-3 by interpolation between 430 and 42.9 ohm.cm.
    expect(lot.sites.concentration_cm3[0]).toBeGreaterThan(4.3e13)
    expect(lot.sites.concentration_cm3[0]).toBeLessThan(4.5e13)
  })
})

describe('a 300-site map with 13 failed readings (NIST Dataplot, EHRSTEIN.DAT)', () => {
  const lot = sampleLot('nist-wafer-map')

  it('leaves the 10 negative and 3 zero readings out and lists each', () => {
    expect(lot.problems.filter(({ kind }) => kind === 'bad-cell' || kind === 'bad-row')).toHaveLength(13)
    const [wafer] = lot.wafers
    expect(wafer.statistics.count).toBe(287)
    expect(wafer.statistics.mean).toBeCloseTo(14.173557595818817, 12)
    expect(wafer.statistics.standardDeviation).toBeCloseTo(0.23043660126429935, 12)
    expect(wafer.statistics.median).toBe(14.12059)
    expect([wafer.statistics.min, wafer.statistics.max]).toEqual([13.90108, 16.24341])
    expect(wafer.rejectedRows).toBe(13)
  })
})
