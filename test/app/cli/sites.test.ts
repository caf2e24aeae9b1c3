import { describe, expect, it } from 'vitest'
import { sitesCsv } from '../../../app/cli/sites'
import { readReadings } from '../../../core/ingest/read-files'
import { explain } from '../../../core/problems/explain'
import { CoreError } from '../../../core/problems/problem'
import { CARTESIAN_PLANS, CONCENTRIC_PLANS } from '../../reference/semi-mf1618'
import { persquare } from './command'

const WAFER = ['--diameter-mm', '200', '--edge-exclusion-mm', '5']

function plan(...args: readonly string[]) {
  const [header, ...lines] = sitesCsv(args).trimEnd().split('\n')
  expect(header).toBe('site,x_mm,y_mm,r_mm,theta_deg')
  return lines.map((line) => {
    const [site, x, y, r, theta] = line.split(',').map(Number)
    return { site, x, y, r, theta }
  })
}

describe('published values', () => {
  it.each(CONCENTRIC_PLANS)('SEMI MF1618: %d circles make %d sites', (circles, count) => {
    expect(plan('--circles', String(circles), ...WAFER)).toHaveLength(count)
  })

  it.each(CARTESIAN_PLANS.slice(0, 3))('SEMI MF1618: %d rows make %d sites', (rows, count) => {
    expect(plan('--rows', String(rows), ...WAFER)).toHaveLength(count)
  })

  it('SEMI MF1618: outermost radius by method B, and by method A with a spot', () => {
    const outermost = (...args: string[]) => Math.max(...plan('--circles', '3', ...WAFER, ...args).map(({ r }) => r))
    expect(outermost()).toBe(95)
    expect(outermost('--spot-mm', '1.5')).toBe(94.25)
  }) // prettier-ignore
})

describe('laws', () => {
  it('the centre first, numbered from 1, both coordinates of one place, to 1e-6 mm', () => {
    for (const args of [['--circles', '4'], ['--rows', '9'], ['--diameter-sites', '25', '--angle-deg', '-30']]) {
      const rows = plan(...args, ...WAFER)
      rows.forEach(({ site, x, y, r, theta }, i) => {
        expect(site).toBe(i + 1)
        expect(theta).toBeGreaterThanOrEqual(0)
        expect(theta).toBeLessThan(360)
        expect(Math.abs(r * Math.cos((theta * Math.PI) / 180) - x)).toBeLessThan(3e-6)
        expect(Math.abs(r * Math.sin((theta * Math.PI) / 180) - y)).toBeLessThan(3e-6)
        for (const value of [x, y, r, theta]) expect(value).toBe(Number(value.toFixed(6)))
      })
      if (args[0] !== '--diameter-sites') expect(rows[0]).toEqual({ site: 1, x: 0, y: 0, r: 0, theta: 0 })
    }
  }) // prettier-ignore

  it('circles begin at +x or at +y', () => {
    const third = 31.666667
    expect(plan('--circles', '3', ...WAFER)[1]).toMatchObject({ x: third, y: 0, theta: 0 })
    expect(plan('--circles', '3', ...WAFER, '--start', '+y')[1]).toMatchObject({ x: 0, y: third, theta: 90 })
  })

  it('a diameter runs from end to end along its direction', () => {
    const rows = plan('--diameter-sites', '25', '--angle-deg', '90', ...WAFER)
    expect([rows[0], rows[12], rows[24]].map(({ x, y }) => [x, y])).toEqual([[0, -95], [0, 0], [0, 95]])
  }) // prettier-ignore

  it('is read back with its positions once readings stand beside it', () => {
    const out = sitesCsv(['--circles', '3', ...WAFER])
    const measured = out.trimEnd().split('\n').map((line, i) => `${line},${i === 0 ? 'v_over_i_ohm' : '20.3'}`).join('\n')
    const { readings, problems } = readReadings([{ name: 'plan.csv', bytes: new TextEncoder().encode(measured), sha256: '' }])
    expect(problems).toEqual([])
    expect([readings?.count, readings?.x_mm?.[1], readings?.y_mm?.[1]]).toEqual([49, 31.666667, 0])
  }) // prettier-ignore
})

describe('refusals', () => {
  it.each([
    ['no plan', WAFER, /--circles K/],
    ['two plans', ['--circles', '3', '--rows', '7', ...WAFER], /one plan/],
    ['no wafer', ['--circles', '3'], /--diameter-mm/],
    ['no edge exclusion', ['--circles', '3', '--diameter-mm', '200'], /--edge-exclusion-mm/],
    ['half a circle', ['--circles', '2.5', ...WAFER], /whole number/],
    ['no circle', ['--circles', '0', ...WAFER], /circles is 0/],
    ['a word', ['--circles', 'three', ...WAFER], /not a number/],
    ['an even lattice', ['--rows', '8', ...WAFER], /odd number/],
    ['a negative wafer', ['--circles', '3', '--diameter-mm', '-200', '--edge-exclusion-mm', '5'], /diameter is -200/],
    ['a negative exclusion', ['--circles', '3', '--diameter-mm', '200', '--edge-exclusion-mm', '-5'], /exclusion is -5/],
    ['nothing left', ['--circles', '3', '--diameter-mm', '200', '--edge-exclusion-mm', '100'], /outermost/],
    ['a spot wider than what is left', ['--circles', '3', ...WAFER, '--spot-mm', '191'], /outermost/],
    ['no spot', ['--circles', '3', ...WAFER, '--spot-mm', '0'], /spot/],
    ['a start elsewhere', ['--circles', '3', ...WAFER, '--start', '-x'], /\+x or \+y/],
    ['a start of a lattice', ['--rows', '7', ...WAFER, '--start', '+y'], /--start/],
    ['a direction of circles', ['--circles', '3', ...WAFER, '--angle-deg', '30'], /--angle-deg/],
    ['an unknown option', ['--circles', '3', ...WAFER, '--spiral'], /"--spiral"/],
  ])('%s', (_, args, sentence) => expect(refusalOf(...args)).toMatch(sentence)) // prettier-ignore
})

function refusalOf(...args: readonly string[]): string {
  try {
    return sitesCsv(args)
  } catch (error) {
    if (error instanceof CoreError) return explain(error.problem)
    throw error
  }
}

describe('run as a program', () => {
  it('prints the CSV alone, with status 0', () => {
    const args = ['--rows', '7', ...WAFER, '--spot-mm', '1.5']
    expect(persquare('sites', ...args)).toEqual({ status: 0, stdout: sitesCsv(args), stderr: '' })
  })

  it('refuses in one sentence, with status 2', () => {
    const { status, stdout, stderr } = persquare('sites', '--rows', '8', ...WAFER)
    expect([status, stdout]).toEqual([2, ''])
    expect(stderr).toMatch(/^persquare: .*odd number.*\n$/)
  })

  it('--help tells every option', () => {
    const { status, stdout } = persquare('sites', '--help')
    expect(status).toBe(0)
    for (const option of ['--circles', '--rows', '--diameter-sites', '--spot-mm', '--start', '--angle-deg']) {
      expect(stdout).toContain(option)
    }
  })
})

describe('plans beside those of the standard', () => {
  it('equal areas, dies with their numbers, and what lies on a flat left out and said', () => {
    expect(plan('--equal-area', '3', ...WAFER)).toHaveLength(49)
    const dies = sitesCsv(['--dies', '9', '--pitch-mm', '10,8', ...WAFER])
      .trimEnd()
      .split('\n')
    expect(dies[0]).toBe('site,x_mm,y_mm,r_mm,theta_deg,die_x,die_y')
    expect(dies).toHaveLength(10)
    const { status, stdout, stderr } = persquare('sites', '--circles', '3', '--diameter-mm', '150', '--edge-exclusion-mm', '1', '--flat-mm', '57.5') // prettier-ignore
    expect(status).toBe(0)
    expect(stderr).toMatch(/^! \d+ sites? lies? on the flat/)
    expect(stdout.trimEnd().split('\n').length - 1).toBeLessThan(49)
  })

  it('recommend the smallest that sees an effect, as a table and as JSON', () => {
    const asked = ['--effect', 'edge', '--size-percent', '1', '--repeatability-percent', '0.2', ...WAFER]
    const { status, stdout } = persquare('sites', ...asked)
    expect(status).toBe(0)
    expect(stdout).toMatch(/\(9 sites\) sees it\./)
    const json = JSON.parse(persquare('sites', ...asked, '--json').stdout) as { recommended: string; plans: { id: string; power: number; enough: boolean }[] } // prettier-ignore
    const best = json.plans.find(({ id }) => id === json.recommended)!
    expect(best.power).toBeGreaterThanOrEqual(0.9)
    expect(persquare('sites', '--circles', '1', '--effect', 'tilt', '--size-percent', '0.01', '--repeatability-percent', '1', ...WAFER).status).toBe(1) // prettier-ignore
  })

  it('a pattern that only a size beyond the value itself would show is seen not at all', () => {
    const { stdout } = persquare('sites', '--circles', '1', '--effect', 'spot', '--size-percent', '1', '--repeatability-percent', '90', ...WAFER) // prettier-ignore
    expect(stdout).toContain('not at all')
    expect(stdout).not.toMatch(/\d{3,} +/)
  })

  it.each([
    [['--effect', 'wave', '--size-percent', '1', '--repeatability-percent', '1'], /tilt, bowl, edge/],
    [['--effect', 'tilt', '--repeatability-percent', '1'], /give the size/],
    [['--effect', 'tilt', '--size-percent', '-1', '--repeatability-percent', '1'], /above 0/],
    [['--dies', '9'], /--pitch-mm/],
    [['--dies', '9', '--pitch-mm', '10'], /two numbers/],
    [['--dies', '9000', '--pitch-mm', '10,8'], /dies lie whole in the usable area, not 9000/],
    [['--circles', '3', '--size-percent', '1'], /only together with --effect/],
    [['--circles', '3', '--json'], /only together with --effect/],
    [['--equal-area', '3', '--spot-mm', '1.5'], /no outermost circle/],
    [['--circles', '3', '--pitch-mm', '10,8'], /only --dies/],
    [['--circles', '2.5'], /not a whole number/],
    [['--circles', '3', '--flat-mm', '300'], /shorter than the wafer is wide/],
  ])('refuse %j', (args, why) => {
    const { status, stdout, stderr } = persquare('sites', ...args, ...WAFER)
    expect([status, stdout]).toEqual([2, ''])
    expect(stderr).toMatch(why)
  })
})
