import { readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { CHECK_WAFER_137, PROBE_2362 } from '../../reference/nist-gauge-study'
import { persquare, ROOT, scratchFolder } from './command'

const NIST = join(ROOT, 'test/reference/nist')
const folder = scratchFolder()

interface GaugeJson {
  readonly components: Readonly<Record<string, { standardDeviation: number; degreesOfFreedom: number }>>
  readonly biases: readonly { probe: string; bias: number; standardUncertainty: number }[]
  readonly tolerance: { sharePercent: number } | null
}

describe('persquare gauge', () => {
  it('gives the published components of probe 2362, and the biases of all, as JSON', () => {
    const { status, stdout } = persquare('gauge', join(NIST, 'gauge-study.csv'), '--probe', '2362', '--json')
    const found = JSON.parse(stdout) as GaugeJson
    expect(status).toBe(0)
    for (const level of ['repeatability', 'day', 'run'] as const) {
      const printed = PROBE_2362[level]
      expect(Math.abs(found.components[level].standardDeviation - printed.standardDeviation)).toBeLessThanOrEqual(printed.half)
      expect(found.components[level].degreesOfFreedom).toBe(printed.degreesOfFreedom)
    }
    expect(found.biases.map(({ probe }) => probe)).toEqual(['1', '281', '283', '2062', '2362'])
    expect(found.biases[4].bias).toBeCloseTo(-0.0393, 4)
    expect(Math.abs(found.biases[4].standardUncertainty - 0.0162 / Math.sqrt(10))).toBeLessThan(5e-5 / Math.sqrt(10))
  })

  it('is the same from the rows of that probe alone', () => {
    const rows = readFileSync(join(NIST, 'gauge-study.csv'), 'utf8').split('\n')
    const alone = join(folder, 'probe.csv')
    writeFileSync(alone, [rows[0], ...rows.filter((row) => row.split(',')[2] === '2362')].join('\n'))
    const components = (...args: string[]) => (JSON.parse(persquare('gauge', ...args, '--json').stdout) as GaugeJson).components
    expect(components(alone)).toEqual(components(join(NIST, 'gauge-study.csv'), '--probe', '2362'))
  })

  it('tells the study in words and tables', () => {
    const { status, stdout } = persquare('gauge', join(NIST, 'gauge-study.csv'), '--probe', '2362', '--tolerance', '94,102')
    expect(status).toBe(0)
    expect(stdout).toContain('300 occasions on 5 wafers with 5 probes in 2 runs; components of probe 2362')
    expect(stdout).toContain('uncertain by 0.07822 Ω·cm (k = 2.02, 42 degrees of freedom)')
    expect(stdout).toMatch(/Probe 2362 reads 0\.03927 Ω·cm low; add 0\.03927/)
    expect(stdout).toMatch(/take 5\.8 % of the tolerance from 94 to 102 Ω·cm/)
  })

  it.each([
    [['nothing.csv'], /no such file/],
    [[join(ROOT, 'LICENSE')], /can't be used/],
    [[join(NIST, 'gauge-study.csv'), '--probe', '7'], /no probe "7"/],
    [[join(NIST, 'gauge-study.csv'), '--tolerance', '95'], /two numbers/],
    [[join(NIST, 'gauge-study.csv'), '--tolerance', '95,94'], /no width/],
    [[], /name a CSV file/],
  ])('refuses %j', (args, why) => {
    const { status, stdout, stderr } = persquare('gauge', ...args)
    expect([status, stdout]).toEqual([2, ''])
    expect(stderr).toMatch(why)
  })
}) // prettier-ignore

describe('persquare check', () => {
  it('gives the published limits as JSON', () => {
    const { status, stdout } = persquare('check', join(NIST, 'check-wafer-137.csv'), '--json')
    const found = JSON.parse(stdout) as Record<string, number> & { alarms: { index: number; chart: string }[] }
    expect(status).toBe(0)
    for (const key of ['centerLine', 'lowerLimit', 'upperLimit', 'precisionUpperLimit'] as const) {
      expect(Math.abs(found[key] - CHECK_WAFER_137[key].value), key).toBeLessThanOrEqual(CHECK_WAFER_137[key].half)
    }
    expect(found.alarms.map(({ index, chart }) => [index, chart])).toEqual([[6, 'value'], [8, 'precision'], [20, 'value'], [20, 'precision']])
  })

  it('exits with 1 where the last occasion raises an alarm, and says what to do', () => {
    const path = join(folder, 'check.csv')
    writeFileSync(path, ['time,value', ...[90.1, 89.9, 90, 90.05, 89.95, 90.02, 91].map((value, k) => `2026-03-0${k + 1},${value}`)].join('\n'))
    const { status, stdout } = persquare('check', path, '--baseline', '6')
    expect(status).toBe(1)
    expect(stdout).toContain('raises an alarm: what was measured since is doubtful')
    expect(stdout).toContain('Measure the check wafer again')
  })

  it.each([
    [[join(ROOT, 'LICENSE')], /can't be used/],
    [[join(NIST, 'check-wafer-137.csv'), '--baseline', '2'], /at least 4/],
    [[join(NIST, 'check-wafer-137.csv'), '--baseline', 'x'], /not a number/],
    [[join(NIST, 'check-wafer-137.csv'), '--width', '0'], /between 0 and 10/],
  ])('refuses %j', (args, why) => {
    const { status, stdout, stderr } = persquare('check', ...args)
    expect([status, stdout]).toEqual([2, ''])
    expect(stderr).toMatch(why)
  })
}) // prettier-ignore
