import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { siteWorking } from '../../../core/analysis/site-working'
import { SITE_FLAGS } from '../../../core/analysis/flags'
import type { ProcedureInput } from '../../../core/procedure/schema'
import { analyzeText, runText, sampleBytes, sampleLot, sampleText } from './lots'

const DISC = { diameterMm: 200, thicknessUm: 725 } as const
const PROBE = { spacingMm: 1 } as const
const PI_OVER_LN2 = Math.PI / Math.LN2

describe('what a site may bring', () => {
  it('V/I alone: on the infinite sheet times pi/ln 2 (Valdes 1954)', () => {
    const lot = analyzeText('site,v_over_i_ohm\n1,20\n', {})
    expect(lot.sites.sheetResistance_ohm_sq[0]).toBeCloseTo(20 * PI_OVER_LN2, 12)
    expect(lot.notes.join(' ')).toMatch(/no positions/)
  })

  it('a reported sheet resistance stands as it is', () => {
    const lot = analyzeText('x_mm,y_mm,sheet_resistance_ohm_sq\n95,0,92\n', { wafer: DISC, probe: PROBE })
    expect(lot.sites.sheetResistance_ohm_sq[0]).toBe(92)
    expect(lot.sites.flags[0] & SITE_FLAGS.reported.bit).toBeTruthy()
  })

  it('with the constant it was made with, it is corrected anew', () => {
    const csv = 'x_mm,y_mm,sheet_resistance_ohm_sq\n97,0,92\n'
    const lot = analyzeText(csv, { wafer: DISC, probe: PROBE, reported: { factor: 4.532 } })
    const again = analyzeText(`x_mm,y_mm,v_over_i_ohm\n97,0,${92 / 4.532}\n`, { wafer: DISC, probe: PROBE })
    expect(lot.sites.sheetResistance_ohm_sq[0]).toBe(again.sites.sheetResistance_ohm_sq[0])
    // 1.5 mm from the rim along a radius a single configuration reads 6.65 % high if not corrected.
    expect(((92 / 4.532) * PI_OVER_LN2) / lot.sites.sheetResistance_ohm_sq[0] - 1).toBeCloseTo(0.0665, 4)
  })

  it('a dual procedure over readings of configuration A alone is worked as single throughout, thickness and working too', () => {
    const csv = 'wafer,site,v_over_i_ohm\n1,1,10\n'
    const thick = { wafer: { thicknessUm: 1500 }, layer: { kind: 'bulk' as const, dopant: 'boron' as const } }
    const [dual, single] = (['dual', 'single'] as const).map((technique) =>
      analyzeText(csv, { ...thick, probe: { spacingMm: 1, technique } }),
    )
    expect(dual.sites.sheetResistance_ohm_sq[0]).toBe(single.sites.sheetResistance_ohm_sq[0])
    expect(siteWorking(dual, 0).steps).toEqual(siteWorking(single, 0).steps)
    expect(dual.notes.join()).toContain('treated as single')
  })

  it('both configurations: the exact dual relation, whatever the spacing of the pins', () => {
    // A thin infinite sheet of 92 ohm/sq under pins at 0, 0.93, 2.05, 3.01 mm.
    const [p1, p2, p3, p4] = [0, 0.93, 2.05, 3.01]
    const resistance = (i: number, o: number, a: number, b: number): number =>
      (92 / (2 * Math.PI)) * Math.log((Math.abs(o - a) * Math.abs(i - b)) / (Math.abs(i - a) * Math.abs(o - b)))
    const a = resistance(p1, p4, p2, p3)
    const b = resistance(p1, p3, p2, p4)
    const lot = analyzeText(`v_over_i_ohm,v_over_i_b_ohm\n${a},${b}\n`, { probe: { technique: 'dual' } })
    expect(lot.sites.sheetResistance_ohm_sq[0]).toBeCloseTo(92, 10)
  })
})

describe('bulk silicon', () => {
  it('takes thickness and temperature as SEMI MF43 and MF1527 print them', () => {
    const csv = 'x_mm,y_mm,v_over_i_ohm,temperature_C\n0,0,10,25\n'
    const layer = { kind: 'bulk', dopant: 'phosphorus', mobility: 'mf723' } as const
    const lot = analyzeText(csv, { wafer: { diameterMm: 200, thicknessUm: 1000 }, probe: PROBE, layer })
    // MF43 Table 1: F(1.0) = .921; F2 of S/D = .005: 4.531.
    expect(lot.sites.thicknessFactor[0]).toBeCloseTo(0.921, 3)
    expect(lot.sites.geometryFactor[0]).toBeCloseTo(4.531, 3)
    // MF1527: near 4.1 ohm.cm between .7680 (2) and .7912 (5) %/C; 2 degrees.
    expect(lot.sites.temperatureFactor[0]).toBeCloseTo(1 - 0.00785 * 2, 3)
    const rho = lot.sites.resistivity_ohm_cm[0]
    expect(rho).toBeCloseTo(10 * 4.531 * 0.9215 * 0.1 * lot.sites.temperatureFactor[0], 2)
    // EMIS 1999, phosphorus: 4.48 ohm.cm at 1e15; so 4.11 ohm.cm is near 1.09e15.
    expect(lot.sites.concentration_cm3[0] / 1e15).toBeCloseTo(1.09, 1)
  })

  it('without a thickness is refused by key, unless resistivity is reported', () => {
    const layer = { kind: 'bulk', dopant: 'boron' } as const
    const refused = runText('v_over_i_ohm\n10\n', { layer })
    expect(refused.analysis).toBeNull()
    expect(refused.problems).toMatchObject([{ kind: 'missing-key', key: 'wafer.thicknessUm', file: 'procedure.json' }])
    expect(analyzeText('resistivity_ohm_cm\n10\n', { layer }).quantity.id).toBe('resistivity')
  })
})

describe('laws', () => {
  const [header, ...rows] = sampleText('TB-0417.csv').trim().split('\n').slice(5)
  const some = rows.filter((_, k) => k % 11 === 0 || (k > 6 * 49 && k < 7 * 49))

  it('shuffled rows give the same verdicts', () => {
    const procedure = sampleBytes('TB-0417.procedure.json')
    const told = (csv: string) => {
      const { lot, wafers } = analyzeText(csv, procedure)
      return {
        verdict: lot.verdict,
        sentence: lot.sentence,
        wafers: wafers.map(({ id, verdict, sitesOut }) => ({ id, verdict, sitesOut })),
      }
    }
    const inOrder = told([header, ...some].join('\n'))
    fc.assert(
      fc.property(fc.shuffledSubarray(some, { minLength: some.length }), (shuffled) => {
        expect(told([header, ...shuffled].join('\n'))).toEqual(inOrder)
      }),
      { numRuns: 20 },
    )
  })

  it('turning wafer and probe together changes nothing', () => {
    fc.assert(
      fc.property(
        fc.record({
          r: fc.double({ min: 0, max: 97, noNaN: true }),
          theta: fc.double({ min: 0, max: 360, noNaN: true }),
          turn: fc.double({ min: -180, max: 180, noNaN: true }),
        }),
        ({ r, theta, turn }) => {
          const at = (angle: number, angleDeg: number) =>
            analyzeText(`r_mm,theta_deg,v_over_i_ohm\n${r},${angle},20\n`, {
              wafer: DISC,
              probe: { pinSpacingsMm: [1.01, 0.99, 1.02], orientation: { angleDeg } },
            }).sites.sheetResistance_ohm_sq[0]
          expect(at(theta + turn, turn)).toBeCloseTo(at(theta, 0), 9)
        },
      ),
      { numRuns: 50 },
    )
  })

  it('scaling every voltage scales every value and leaves the relative spread', () => {
    const lot = sampleLot('TB-0417')
    const doubled = sampleText('TB-0417.csv')
      .replace(/,(5\.\d+e-4|4\.\d+e-4),(?=.*,-)/g, (_, current: string) => `,${Number(current) / 2},`)
      .replace(/,-(5\.\d+e-4|4\.\d+e-4),/g, (_, current: string) => `,-${Number(current) / 2},`)
    const scaled = analyzeText(doubled, sampleBytes('TB-0417.procedure.json'))
    lot.wafers.forEach(({ statistics }, k) => {
      expect(scaled.wafers[k].statistics.mean / statistics.mean).toBeCloseTo(2, 10)
      expect(scaled.wafers[k].statistics.nonuniformityPercent).toBeCloseTo(statistics.nonuniformityPercent, 8)
    })
  })
})

describe('uncertainty by first derivatives', () => {
  // At the reference temperature; elsewhere the published coefficient changes with resistivity, 1e-2 of u at most.
  const csv = 'x_mm,y_mm,v_over_i_ohm,temperature_C\n94,20,10,23\n'
  const base: Partial<ProcedureInput> = {
    wafer: { diameterMm: 200, thicknessUm: 725 },
    probe: { pinSpacingsMm: [1, 1, 1], orientation: { angleDeg: 30 } },
    layer: { kind: 'bulk', dopant: 'boron', mobility: 'masetti' },
  }
  const rsOf = (procedure: Partial<ProcedureInput>, text = csv): number =>
    analyzeText(text, procedure).sites.sheetResistance_ohm_sq[0]
  const uOf = (uncertainty: ProcedureInput['uncertainty']): number => {
    const { sites } = analyzeText(csv, { ...base, uncertainty })
    return sites.uSheetResistance_ohm_sq[0]
  }
  /** Half the change between two runs of the whole pipeline, the quantity moved up and down by u. */
  const half = (up: number, down: number): number => Math.abs(up - down) / 2

  it('spacing: each of three pins moved by itself, in quadrature', () => {
    const u = 0.002
    const moved = [0, 1, 2].map((k) => {
      const spacings = (sign: number) => [0, 1, 2].map((j) => 1 + (j === k ? sign * u : 0)) as [number, number, number]
      const probe = (sign: number) => ({ ...base.probe, pinSpacingsMm: spacings(sign) })
      return half(rsOf({ ...base, probe: probe(1) }), rsOf({ ...base, probe: probe(-1) }))
    })
    expect(uOf({ spacingMm: u }) / Math.hypot(...moved)).toBeCloseTo(1, 3)
  })

  it('thickness, diameter, temperature and place, each against a pipeline run with it moved', () => {
    const wafer = (change: object) => rsOf({ ...base, wafer: { diameterMm: 200, thicknessUm: 725, ...change } })
    expect(uOf({ thicknessUm: 2 }) / half(wafer({ thicknessUm: 727 }), wafer({ thicknessUm: 723 }))).toBeCloseTo(1, 3)
    expect(uOf({ diameterMm: 0.1 }) / half(wafer({ diameterMm: 200.1 }), wafer({ diameterMm: 199.9 }))).toBeCloseTo(
      1,
      3,
    )
    const at = (x: number, y: number, t: number) =>
      rsOf(base, `x_mm,y_mm,v_over_i_ohm,temperature_C\n${x},${y},10,${t}\n`)
    expect(uOf({ temperatureC: 0.1 }) / half(at(94, 20, 23.1), at(94, 20, 22.9))).toBeCloseTo(1, 2)
    const place = Math.hypot(half(at(94.05, 20, 23), at(93.95, 20, 23)), half(at(94, 20.05, 23), at(94, 19.95, 23)))
    expect(uOf({ positionMm: 0.05 }) / place).toBeCloseTo(1, 3)
  })

  it('current and voltage relative, shared and independent kept apart', () => {
    const { sites } = analyzeText(csv, { ...base, uncertainty: { currentRel: 0.003, voltageRel: 0.004 } })
    const rs = sites.sheetResistance_ohm_sq[0]
    expect(sites.uSheetResistance_ohm_sq[0] / rs).toBeCloseTo(0.005, 12)
    expect(sites.uShared[0] / rs).toBeCloseTo(0.003, 12)
    expect(sites.uIndependent[0] / rs).toBeCloseTo(0.004, 12)
  })

  it('thickness moves resistivity through w and F, as SEMI MF1527 eq. R2-14 has it, and so the concentration', () => {
    const rhoOf = (thicknessUm: number) => {
      const { sites } = analyzeText(csv, { ...base, wafer: { diameterMm: 200, thicknessUm } })
      return { rho: sites.resistivity_ohm_cm[0], n: sites.concentration_cm3[0] }
    }
    const [up, down] = [rhoOf(727), rhoOf(723)]
    const { sites } = analyzeText(csv, { ...base, uncertainty: { thicknessUm: 2 } })
    expect(sites.uResistivity_ohm_cm[0] / half(up.rho, down.rho)).toBeCloseTo(1, 3)
    expect(sites.uConcentration_cm3[0] / half(up.n, down.n)).toBeCloseTo(1, 3)
  })

  it('what is shared does not average away in a wafer mean', () => {
    const rows = Array.from({ length: 100 }, (_, k) => `${k + 1},20`).join('\n')
    const { wafers, sites } = analyzeText(`site,v_over_i_ohm\n${rows}\n`, {
      uncertainty: { currentRel: 0.003, voltageRel: 0.004 },
    })
    const relative = wafers[0].uMean / sites.value[0]
    expect(relative).toBeCloseTo(Math.hypot(0.003, 0.004 / 10), 10)
  })
})

describe('dies', () => {
  const plane = (x: number, y: number): number => 20 + 0.01 * x - 0.02 * y
  const sites = [0, 30, 60, 90].flatMap((r) =>
    Array.from({ length: r === 0 ? 1 : 12 }, (_, k) => [
      r * Math.cos((k * Math.PI) / 6),
      r * Math.sin((k * Math.PI) / 6),
    ]),
  )
  const csv = ['x_mm,y_mm,sheet_resistance_ohm_sq', ...sites.map(([x, y]) => `${x},${y},${plane(x, y)}`)].join('\n')
  const lot = analyzeText(csv, {
    wafer: { diameterMm: 200, edgeExclusionMm: 5 },
    dieGrid: { pitchXMm: 12, pitchYMm: 9 },
    limits: { sheetResistanceOhmSq: { upper: 21 } },
  })

  it('between sites lie on the plane that the sites lie on; measured dies take their sites', () => {
    const { dies } = lot
    for (let i = 0; i < dies!.count; i++) {
      if (dies!.basis[i] === 1 && !Number.isNaN(dies!.value[i]))
        expect(dies!.value[i]).toBeCloseTo(plane(dies!.x_mm[i], dies!.y_mm[i]), 9)
    }
    expect(dies!.basis.filter((basis) => basis === 0).length).toBeGreaterThan(20)
  })

  it('beyond the outermost sites are not assessed', () => {
    const { dies } = lot
    const outside = Array.from(dies!.value.keys()).filter((i) => Number.isNaN(dies!.value[i]))
    expect(outside.length).toBeGreaterThan(0)
    for (const i of outside) expect(dies!.verdict[i]).toBe(3)
  })
})

describe('what cannot be judged', () => {
  it('a site off the wafer, and one with a pin off it, are named and have no value', () => {
    const lot = analyzeText('x_mm,y_mm,v_over_i_ohm\n0,0,20\n103,0,20\n99,0,20\n', { wafer: DISC, probe: PROBE })
    expect(lot.problems.map(({ kind }) => kind)).toEqual(['site-off-wafer', 'pin-off-wafer'])
    expect(Array.from(lot.sites.sheetResistance_ohm_sq, Number.isNaN)).toEqual([false, true, true])
    expect(lot.wafers[0].statistics.count).toBe(1)
  })

  it('a site in the edge exclusion is shown and not judged', () => {
    const lot = analyzeText('x_mm,y_mm,v_over_i_ohm\n0,0,20\n96,0,90\n', {
      wafer: { ...DISC, edgeExclusionMm: 5 },
      probe: PROBE,
      limits: { sheetResistanceOhmSq: { lower: 80, upper: 100 } },
    })
    expect(lot.lot.verdict).toBe('in-spec')
    expect(lot.sites.value[1]).toBeGreaterThan(300)
    expect(lot.problems).toMatchObject([{ kind: 'flagged-sites', flag: 'in-edge-exclusion', count: 1 }])
  })

  it('swapped voltage and current are suspected where a target says what to expect', () => {
    const swapped = sampleText('TB-0417.csv').replace(
      'current_A,voltage_V,current_rev_A,voltage_rev_V',
      'voltage_V,current_A,voltage_rev_V,current_rev_A',
    )
    const lot = analyzeText(swapped, sampleBytes('TB-0417.procedure.json'))
    expect(lot.problems).toContainEqual(expect.objectContaining({ kind: 'swapped-columns' }))
    expect(sampleLot('TB-0417').problems).not.toContainEqual(expect.objectContaining({ kind: 'swapped-columns' }))
  })

  it('a lot without limits is not assessed, and says so', () => {
    expect(analyzeText('v_over_i_ohm\n20\n', {}).lot).toMatchObject({
      verdict: 'not-assessed',
      reasons: ['the procedure sets no limits'],
    })
  })
})

describe('a wafer without a usable row', () => {
  const csv = 'wafer,site,v_over_i_ohm\n1,1,20\n1,2,20.1\n2,1,---\n2,2,---\n3,1,20\n3,2,bad\n3,3,20\n'
  const lot = analyzeText(csv, { limits: { sheetResistanceOhmSq: { lower: 80, upper: 100 } } })

  it('stays in the lot, is not assessed, and leaves the lot undecided', () => {
    expect(lot.wafers.map(({ id, verdict, rejectedRows }) => ({ id, verdict, rejectedRows }))).toEqual([
      { id: '1', verdict: 'in-spec', rejectedRows: 0 },
      { id: '2', verdict: 'not-assessed', rejectedRows: 2 },
      { id: '3', verdict: 'in-spec', rejectedRows: 1 },
    ])
    expect(lot.lot.verdict).toBe('undecided')
    expect(lot.lot.sentence).toMatch(/wafer 2 has no usable reading/)
  })
})
