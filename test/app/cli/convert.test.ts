import { describe, expect, it } from 'vitest'
import { converted } from '../../../app/cli/convert'
import { explain } from '../../../core/problems/explain'
import { CoreError } from '../../../core/problems/problem'
import { HAND_CALCULATION } from '../../reference/intrinsic-density'
import { mf1527DiscFactor } from '../../reference/semi-mf1527'
import { MF723_DECADES } from '../../reference/semi-mf723'
import { persquare } from './command'

const json = (...args: readonly string[]) => JSON.parse(converted([...args, '--json']))

function refusalOf(...args: readonly string[]): string {
  try {
    return converted(args)
  } catch (error) {
    if (error instanceof CoreError) return explain(error.problem)
    throw error
  }
}

const KEYS = [
  'sheet_resistance_ohm_sq', 'resistivity_ohm_cm', 'conductivity_S_per_cm', 'concentration_cm3', 'mobility_cm2_per_Vs',
  'electrons_cm3', 'holes_cm3', 'intrinsic_density_cm3', 'temperature_K', 'model', 'working',
] // prettier-ignore

describe('as JSON', () => {
  it('V/I to carriers on a 200 mm disc: SEMI MF1527 eq. R2-5, keys in order', () => {
    const found = json(
      '--v-over-i', '20.3', '--diameter-mm', '200', '--spacing-mm', '1.59', '--thickness-um', '380', '--dopant', 'boron',
    ) // prettier-ignore
    expect(Object.keys(found)).toEqual(KEYS)
    // w/S = 0.239: the thickness factor is 1 within 2e-6.
    expect(Math.abs(found.sheet_resistance_ohm_sq / (20.3 * mf1527DiscFactor(200 / 1.59)) - 1)).toBeLessThan(2e-6)
    expect(found.resistivity_ohm_cm).toBeCloseTo(found.sheet_resistance_ohm_sq * 0.038, 12)
    expect(found.conductivity_S_per_cm).toBe(1 / found.resistivity_ohm_cm)
    expect(Math.abs(found.holes_cm3 / found.concentration_cm3 - 1)).toBeLessThan(1e-9)
    expect([found.model, found.temperature_K]).toEqual(['masetti', 296.15])
    const [first] = found.working
    expect(Object.keys(first)).toEqual(['symbol', 'title', 'value', 'unit', 'formula', 'source'])
    expect(found.working.map(({ symbol }: { symbol: string }) => symbol)).toEqual(
      ['V/I', 'C', 'F', 'R_s', 'ρ', 'σ', 'N', 'n_i', 'n', 'p', 'μ_n', 'μ_p'],
    ) // prettier-ignore
  })

  it('SEMI MF723: each decade of boron, either way', () => {
    const [concentration, , boron] = MF723_DECADES[4]
    const material = ['--dopant', 'boron', '--mobility', 'mf723']
    const forth = json('--concentration', String(concentration), ...material)
    expect(Math.abs(forth.resistivity_ohm_cm / boron - 1)).toBeLessThan(5e-4)
    const back = json('--resistivity', String(forth.resistivity_ohm_cm), ...material)
    expect(Math.abs(back.concentration_cm3 / concentration - 1)).toBeLessThan(1e-12)
  })

  it('common practice, no source: intrinsic silicon by hand numbers', () => {
    const found = json(
      '--concentration', '0', '--mobility', 'constant', '--electron-mobility', '1300', '--hole-mobility', '500',
      '--intrinsic-density', '1.5e10',
    ) // prettier-ignore
    expect(Math.abs(found.resistivity_ohm_cm / HAND_CALCULATION.intrinsicResistivity_ohm_cm - 1)).toBeLessThan(0.003)
    expect([found.electrons_cm3, found.holes_cm3, found.intrinsic_density_cm3]).toEqual([1.5e10, 1.5e10, 1.5e10])
    expect([found.concentration_cm3, found.mobility_cm2_per_Vs, found.model]).toEqual([0, null, 'constant'])
  })

  it('a resistor: its resistance, the doping for a wanted one, and over temperature', () => {
    const size = ['--length-um', '200', '--width-um', '10', '--thickness-um', '1', '--dopant', 'boron']
    const forth = json('--concentration', '1e17', '--mobility', 'klaassen', ...size)
    expect(Object.keys(forth)).toEqual([...KEYS, 'resistance_ohm'])
    const table = ['--mobility', 'klaassen', '--temperatures', '-50,150,50', ...size]
    const back = json('--resistance', String(forth.resistance_ohm), ...table)
    expect(Object.keys(back)).toEqual([...KEYS, 'resistance_ohm', 'temperatures'])
    expect(Math.abs(back.concentration_cm3 / 1e17 - 1)).toBeLessThan(1e-11)
    const rows: readonly { temperature_K: number; intrinsic_density_extrapolated: boolean }[] = back.temperatures
    expect(rows.map(({ temperature_K }) => temperature_K)).toEqual([223.15, 273.15, 323.15, 373.15, 423.15])
    expect(rows.map((row) => row.intrinsic_density_extrapolated)).toEqual([false, false, false, true, true])
  })

  it('what is not determined is null', () => {
    const found = json('--sheet-resistance', '92.4', '--dopant', 'boron')
    expect(KEYS.slice(1, 8).map((key) => found[key])).toEqual([null, null, null, null, null, null, null])
    expect(found.model).toBeNull()
    expect(found.working.at(-1)).toMatchObject({ symbol: 'ρ', value: null })
  })
})

describe('for people', () => {
  it('a step a line, units and superscripts, the model beside N, the sources below', () => {
    const out = converted(['--resistivity', '1.4', '--dopant', 'boron'])
    const lines = out.split('\n')
    expect(lines[0]).toBe('At 23 °C')
    expect(lines.find((line) => line.includes(' N = '))).toMatch(/\d\.\d+ × 10¹⁶ {2}cm⁻³ .*Masetti, Severi and Solmi, made at 300 K/)
    // The equals signs stand in one column.
    const columns = lines.filter((line) => /^\S.* = /.test(line) && !line.startsWith('[')).map((line) => line.search(/\S+ =/))
    expect(columns).toHaveLength(8)
    expect(new Set(columns).size).toBe(1)
    expect(out).toMatch(/^\[\d\] G\. Masetti/m)
  }) // prettier-ignore

  it('stops at resistivity without a dopant and says why', () => {
    const out = converted(['--sheet-resistance', '92.4', '--thickness-um', '500'])
    expect(out).toMatch(/ρ = .*4\.6200 {2}Ω·cm/)
    expect(out).toMatch(/N = .*no dopant is given/)
  })

  it('tabulates over temperature and says where intrinsic density is carried on', () => {
    const out = converted([
      '--concentration', '1e15', '--dopant', 'phosphorus', '--mobility', 'arora', '--temperatures', '0,100,25',
    ]) // prettier-ignore
    expect(out).toMatch(/^ *0 °C .*\n *25 °C .*\n *50 °C .*\n *75 °C .*\n100 °C /m)
    expect(out).toMatch(/carried on beyond the 340 K/)
  })
})

describe('run as a program', () => {
  it('prints the answer alone, with status 0', () => {
    const args = ['--concentration', '1e16', '--dopant', 'phosphorus', '--json']
    expect(persquare('convert', ...args)).toEqual({ status: 0, stdout: converted(args), stderr: '' })
  })

  it('refuses in one sentence, with status 2', () => {
    const stderr = 'persquare: The resistivity is -1 ohm cm; it must be from 1e-9 to 1000000000000 ohm cm.\n'
    expect(persquare('convert', '--resistivity', '-1')).toEqual({ status: 2, stdout: '', stderr })
  })

  it('--help tells every option', () => {
    const { status, stdout } = persquare('convert', '--help')
    expect(status).toBe(0)
    for (const option of ['--v-over-i', '--resistance', '--temperatures', '--json', 'klaassen', 'arsenic']) {
      expect(stdout).toContain(option)
    }
  })
})

describe('refusals', () => {
  it.each([
    ['nothing to convert', [], /one of --v-over-i/],
    ['two values', ['--resistivity', '1', '--concentration', '1e15'], /exactly one value/],
    ['a value twice', ['--resistivity', '1', '--resistivity', '2'], /given twice/],
    ['a negative resistivity', ['--resistivity', '-1'], /resistivity is -1 ohm cm; it must be/],
    ['no resistivity', ['--resistivity', '0'], /resistivity is 0/],
    ['not a number', ['--resistivity', 'NaN'], /not a number/],
    ['infinity', ['--concentration', 'Infinity', '--dopant', 'boron'], /not a number/],
    ['an empty value', ['--resistivity', ''], /not a number/],
    ['a negative concentration', ['--concentration', '-1e15', '--dopant', 'boron'], /concentration is -1/],
    ['a negative thickness', ['--resistivity', '1', '--thickness-um', '-5'], /thickness is -5/],
    ['an unknown option', ['--resistivity', '1', '--colour', 'red'], /"--colour"/],
    ['a missing value', ['--resistivity', '--json'], /"--resistivity".*needs a value/],
    ['an argument without a name', ['5'], /"5"/],
    ['an unknown dopant', ['--resistivity', '1', '--dopant', 'gallium'], /none of boron, phosphorus, arsenic/],
    ['an unknown model', ['--resistivity', '1', '--mobility', 'drude'], /none of masetti/],
    ['a concentration without a dopant', ['--concentration', '1e15'], /--dopant/],
    ['constant without its numbers', ['--resistivity', '1', '--mobility', 'constant'], /--electron-mobility/],
    ['numbers for a model that has its own', ['--resistivity', '1', '--mobility', 'arora', '--hole-mobility', '500'], /of its own/],
    ['a thick wafer without a spacing', ['--v-over-i', '1', '--thickness-um', '725'], /--spacing-mm/],
    ['a place on no wafer', ['--v-over-i', '1', '--x-mm', '-5'], /--diameter-mm/],
    ['a probe of no V/I', ['--resistivity', '1', '--spacing-mm', '1'], /not V\/I/],
    ['a resistance of no size', ['--resistance', '100'], /--length-um/],
    ['half a size', ['--resistivity', '1', '--width-um', '5'], /--length-um/],
    ['a table by a model at one temperature', ['--concentration', '1e15', '--dopant', 'boron', '--temperatures', '0,50,10'], /arora, klaassen/],
    ['a table of two numbers', ['--concentration', '1e15', '--dopant', 'boron', '--temperatures', '0,50'], /LOW,HIGH,STEP/],
    ['a strange back', ['--v-over-i', '1', '--thickness-um', '50', '--back', 'wooden'], /insulating or conducting/],
  ])('%s', (_, args, sentence) => expect(refusalOf(...args)).toMatch(sentence)) // prettier-ignore
})
