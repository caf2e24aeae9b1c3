import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { persquare, ROOT } from './command'

const SAMPLES = join(ROOT, 'sample-data')
const LOT = [join(SAMPLES, 'TB-0417.csv'), '--procedure', join(SAMPLES, 'TB-0417-trust.procedure.json')]

interface Written {
  readonly wafer: string
  readonly site: string
  readonly relative: number
  readonly budget: readonly { readonly component: string; readonly relative: number; readonly varianceShare: number }[]
  readonly firstOrder: { readonly value: number; readonly standardUncertainty: number }
  readonly monteCarlo: { readonly trials: number; readonly seed: number; readonly standardUncertainty: number }
  readonly agreement: { readonly isFirstOrderEnough: boolean; readonly sentence: string }
}

describe('persquare uncertainty', () => {
  it('gives a site’s budget, whose parts make the whole, beside draws that agree with it', () => {
    const { status, stdout } = persquare('uncertainty', ...LOT, '--wafer', '19', '--site', '31', '--trials', '40000', '--json')
    const found = JSON.parse(stdout) as Written
    expect(status).toBe(0)
    expect([found.wafer, found.site, found.monteCarlo.trials]).toEqual(['19', '31', 40_000])
    const together = Math.sqrt(found.budget.reduce((sum, { relative }) => sum + relative ** 2, 0))
    expect(found.relative / together).toBeCloseTo(1, 9)
    expect(found.firstOrder.standardUncertainty / (found.relative * found.firstOrder.value)).toBeCloseTo(1, 9)
    // Two standard deviations of a standard deviation of so many draws, and a percent for what the first order leaves out.
    expect(Math.abs(found.monteCarlo.standardUncertainty / found.firstOrder.standardUncertainty - 1)).toBeLessThan(0.01 + 2 / Math.sqrt(2 * 40_000))
  })

  it('gives the same draws for the same seed, others for another', () => {
    const drawn = (seed: string): number =>
      (JSON.parse(persquare('uncertainty', ...LOT, '--trials', '2000', '--seed', seed, '--json').stdout) as Written).monteCarlo.standardUncertainty
    expect(drawn('7')).toBe(drawn('7'))
    expect(drawn('7')).not.toBe(drawn('8'))
  })

  it('says in words what it found, and refuses what is not there', () => {
    const { stdout } = persquare('uncertainty', ...LOT, '--trials', '2000')
    expect(stdout).toMatch(/^Site 1 of wafer 07: 91\.05 Ω\/sq ± 0\.95/)
    expect(stdout).toMatch(/each pin spacing .* 68\.2 /)
    const refused = persquare('uncertainty', ...LOT, '--wafer', '99')
    expect([refused.status, refused.stdout]).toEqual([2, ''])
    expect(refused.stderr).toContain('there is no wafer "99"')
    expect(persquare('uncertainty', ...LOT, '--trials', '10').status).toBe(2)
    expect(persquare('uncertainty', LOT[0]).stderr).toContain('--procedure')
  })
}) // prettier-ignore
