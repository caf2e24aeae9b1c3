/** What the layer's settings do from file to result: junction depth, profile file, uncertainty, film. */
import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { companionsNamedIn } from '../../../core/analysis/companions'
import { formulaSources } from '../../../core/analysis/formula-sources'
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import { resultObject } from '../../../core/analysis/result-json'
import { run, type RunResult } from '../../../core/analysis/run'
import { siteWorking } from '../../../core/analysis/site-working'
import type { InputFile } from '../../../core/ingest/read-files'
import type { ProcedureInput } from '../../../core/procedure/schema'
import { analyzeText } from './lots'

const silicon = {
  dopant: 'boron',
  mobility: 'masetti',
  background: { dopant: 'phosphorus', concentrationCm3: 1e15 },
} as const
const byLength = { kind: 'doped-layer', ...silicon, profile: 'gaussian', diffusionLengthUm: 0.06 } as const
const byFile = { kind: 'doped-layer', ...silicon, profile: 'tabulated', profileFile: 'tb-0417-boron-profile.csv' } as const // prettier-ignore
const csv = `v_over_i_ohm\n${[18.9, 20.1, 20.4, 21.7].join('\n')}\n`

const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text)
const fixture: InputFile = {
  name: 'tb-0417-boron-profile.csv',
  bytes: new Uint8Array(readFileSync(new URL('../../fixtures/layer/tb-0417-boron-profile.csv', import.meta.url))),
  sha256: 'cd',
}

function runWith(procedure: Partial<ProcedureInput>, companions?: readonly InputFile[]): RunResult {
  const text = JSON.stringify({ format: 'persquare-procedure/1', ...procedure })
  return run({
    readings: [{ name: 'lot.csv', bytes: bytesOf(csv), sha256: '' }],
    procedure: { name: 'procedure.json', bytes: bytesOf(text) },
    ...(companions && { companions }),
  })
}

function tabulated(procedure: Partial<ProcedureInput> = {}): LotAnalysis {
  const { analysis, problems } = runWith({ layer: byFile, ...procedure }, [fixture])
  if (!analysis) throw new Error(JSON.stringify(problems))
  return analysis
}

describe('a diffusion length in place of the junction depth', () => {
  it('gives what the depth that it solves gives', () => {
    const lot = analyzeText(csv, { layer: byLength })
    const depthUm = siteWorking(lot, 1).steps.find(({ symbol }) => symbol === 'x_j')!.value
    const again = analyzeText(csv, { layer: { ...byLength, diffusionLengthUm: undefined, depthUm } })
    expect(lot.sites.concentration_cm3[1] / again.sites.concentration_cm3[1]).toBeCloseTo(1, 9)
    expect(lot.sites.dose_cm2[1] / again.sites.dose_cm2[1]).toBeCloseTo(1, 9)
    expect(lot.sites.resistivity_ohm_cm[1] / again.sites.resistivity_ohm_cm[1]).toBeCloseTo(1, 9)
    expect(formulaSources(lot).map(({ id }) => id)).toContain('junction')
  })

  it.each([
    ['the length', { depthUm: 0.001 }, { layer: { ...byLength, diffusionLengthUm: 0.061 } }],
    ['the current', { currentRel: 0.01 }, null],
  ])('carries the uncertainty of %s as a run with it moved does', (_, uncertainty, moved) => {
    const lot = analyzeText(csv, { layer: byLength, uncertainty })
    const other = moved
      ? analyzeText(csv, moved)
      : analyzeText(csv.replace(/\d\S+/g, (v) => String(Number(v) * 1.01)), { layer: byLength }) // prettier-ignore
    const { sites } = lot
    for (let i = 0; i < sites.count; i++) {
      const concentration = Math.abs(other.sites.concentration_cm3[i] - sites.concentration_cm3[i])
      expect(sites.uConcentration_cm3[i] / concentration).toBeCloseTo(1, 1)
      const resistivity = Math.abs(other.sites.resistivity_ohm_cm[i] - sites.resistivity_ohm_cm[i])
      expect(sites.uResistivity_ohm_cm[i] / resistivity).toBeCloseTo(1, 1)
    }
  })

  it('carries that of the mobility into the depth that is solved with it', () => {
    const constant = (scale: number) => ({ ...byLength, mobility: 'constant', constantMobility: { electronsCm2Vs: 1000, holesCm2Vs: 60 * scale } }) as const // prettier-ignore
    const { sites } = analyzeText(csv, { layer: constant(1), uncertainty: { mobilityRel: 0.01 } })
    const other = analyzeText(csv, { layer: constant(1.01) }).sites
    const resistivity = Math.abs(other.resistivity_ohm_cm[1] - sites.resistivity_ohm_cm[1])
    expect(sites.uResistivity_ohm_cm[1] / resistivity).toBeCloseTo(1, 1)
    const concentration = Math.abs(other.concentration_cm3[1] - sites.concentration_cm3[1])
    expect(sites.uConcentration_cm3[1] / concentration).toBeCloseTo(1, 1)
  })

  it('makes a budget that adds up to the uncertainty of the resistivity judged', () => {
    const uncertainty = { currentRel: 0.003, depthUm: 0.002, mobilityRel: 0.02 }
    const lot = analyzeText(csv, { layer: byLength, quantity: 'resistivity', uncertainty })
    const { budget } = siteWorking(lot, 0)
    const sum = Math.sqrt(budget.reduce((total, { relative }) => total + relative ** 2, 0))
    expect(sum / (lot.sites.u[0] / lot.sites.value[0])).toBeCloseTo(1, 12)
    expect(budget.map(({ title }) => title)).toContain('diffusion length')
  })
})

describe('a profile file', () => {
  it('is named by its procedure and matched by base name', () => {
    const procedure = { name: 'p.json', bytes: bytesOf(JSON.stringify({ format: 'persquare-procedure/1', layer: byFile })) } // prettier-ignore
    expect(companionsNamedIn(procedure)).toEqual(['tb-0417-boron-profile.csv'])
    expect(companionsNamedIn({ name: 'p.json', bytes: bytesOf('{') })).toEqual([])
    const elsewhere = { ...fixture, name: 'C:\\lots\\tb-0417-boron-profile.csv' }
    expect(runWith({ layer: byFile }, [{ ...fixture, name: 'other.csv' }, elsewhere]).analysis).not.toBeNull()
  })

  it('gives what the Gaussian it was made of gives, to the error of its lines', () => {
    const lot = tabulated()
    const exact = analyzeText(csv, { layer: byLength })
    for (let i = 0; i < lot.sites.count; i++) {
      expect(Math.abs(lot.sites.concentration_cm3[i] / exact.sites.concentration_cm3[i] - 1)).toBeLessThan(0.01)
      expect(Math.abs(lot.sites.dose_cm2[i] / exact.sites.dose_cm2[i] - 1)).toBeLessThan(0.01)
    }
  })

  it('stands in the result, the notes, the sources and the working', () => {
    const lot = tabulated({ uncertainty: { depthUm: 0.004 } })
    const { layer } = resultObject(lot, { program: 'p', version: '1' }) as { layer: { profile: object } }
    expect(layer.profile).toMatchObject({ name: fixture.name, sha256: 'cd', points: 26 })
    expect(lot.notes.join(' ')).toMatch(/The shape of the profile is that of tb-0417-boron-profile\.csv: 26 points down to 0\.4375 µm/) // prettier-ignore
    expect(formulaSources(lot).find(({ id }) => id === 'profile')?.reference).toMatch(/tb-0417-boron-profile\.csv/)
    const { steps } = siteWorking(lot, 0)
    expect(steps.map(({ symbol }) => symbol)).toEqual(expect.arrayContaining(['k', 'N_p', 'x_j']))
    // Depths wrong by one factor, at the deepest point by 4 nm: that much of R_s.
    const relative = lot.sites.uConcentration_cm3[0] / lot.sites.concentration_cm3[0]
    const slope = steps.find(({ symbol }) => symbol === 'd ln N_p / d ln R_s')!.value
    expect(relative).toBeCloseTo((0.004 / 0.4375) * Math.abs(slope), 8)
  })

  it('that ends above the background is said to', () => {
    const short = new TextDecoder().decode(fixture.bytes).split('\n').slice(0, 14).join('\n')
    const { analysis } = runWith({ layer: byFile }, [{ ...fixture, bytes: bytesOf(short) }])
    expect(analysis!.notes.join(' ')).toMatch(/At 4 sites the profile is still above the background where/)
  })

  it('that did not come is a problem that names it', () => {
    for (const companions of [undefined, [], [{ ...fixture, name: 'other.csv' }]]) {
      const { analysis, problems } = runWith({ layer: byFile }, companions)
      expect(analysis).toBeNull()
      expect(problems).toEqual([
        { kind: 'missing-file', file: 'procedure.json', key: 'layer.profileFile', name: 'tb-0417-boron-profile.csv' },
      ])
    }
  })

  it('that is none is a problem by line', () => {
    const bad = { ...fixture, bytes: bytesOf('depth_um,N_cm3\n0,1e18\n1,x\n') }
    expect(runWith({ layer: byFile }, [bad]).problems).toMatchObject([{ kind: 'bad-profile', file: fixture.name, line: 3 }]) // prettier-ignore
  })

  it('is passed over where the procedure names none', () => {
    const { analysis } = runWith({ layer: byLength }, [fixture])
    expect(analysis!.profile).toBeNull()
  })
})

describe('a metal film', () => {
  // Copper: 1.68e-6 ohm cm and 0.39 %/K near room temperature (handbook values, from memory).
  const copper = { layer: { kind: 'film', resistivityOhmCm: 1.68e-6 }, temperature: { coefficientPercentPerC: 0.39 } } as const // prettier-ignore

  it('is referred to the reference temperature by the coefficient given, thickness and all', () => {
    // 0.5 um of it, probed at 27 C: warmer, so 1.56 % more resistive.
    const sheet = 1.68e-6 / 0.5e-4
    const vOverI = ((sheet * (1 + 0.0039 * 4)) / Math.PI) * Math.LN2
    const lot = analyzeText(`v_over_i_ohm,temperature_C\n${vOverI},27\n`, copper)
    const { sites } = lot
    expect(sites.temperatureFactor[0]).toBeCloseTo(1 - 0.0039 * 4, 12)
    // Times 1 - C dT, as the standard has it, not divided by 1 + C dT: apart by (C dT)^2.
    expect(sites.sheetResistance_ohm_sq[0] / sheet).toBeCloseTo(1 - 0.0156 ** 2, 9)
    expect(sites.thickness_um[0]).toBeCloseTo(0.5 / (1 - 0.0156 ** 2), 9)
    expect(lot.notes.join(' ')).toContain('Corrected to 23 °C with the coefficient given, 0.39 %/°C.')
    const step = siteWorking(lot, 0).steps.find(({ symbol }) => symbol === 'F_T')!
    expect(step.formula).toBe('27.00 °C to 23 °C at 0.390 %/°C')
  })

  it('carries the uncertainty of its temperature', () => {
    const text = 'v_over_i_ohm,temperature_C\n0.0075,25\n'
    const { sites } = analyzeText(text, { ...copper, uncertainty: { temperatureC: 0.5 } })
    const warmer = analyzeText(text.replace(',25', ',25.5'), copper).sites
    const moved = Math.abs(warmer.sheetResistance_ohm_sq[0] - sites.sheetResistance_ohm_sq[0])
    expect(sites.uSheetResistance_ohm_sq[0] / moved).toBeCloseTo(1, 6)
  })

  it('without a coefficient is not corrected, and says what is missing', () => {
    const lot = analyzeText('v_over_i_ohm,temperature_C\n0.0075,27\n', { layer: copper.layer })
    expect(lot.sites.temperatureFactor[0]).toBe(1)
    expect(lot.notes.join(' ')).toContain('temperature.coefficientPercentPerC')
  })
})
