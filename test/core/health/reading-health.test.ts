import { describe, expect, it } from 'vitest'
import type { HealthFinding } from '../../../core/health/finding'
import { HEALTH_CHECKS } from '../../../core/health/registry'
import { run } from '../../../core/analysis/run'
import { seededRandom } from '../../../core/numeric/random'
import { concentricPlan } from '../../../core/wafer/site-patterns'
import { runLot } from '../analysis/trust-lots'

const plan = concentricPlan({ circles: 3, outerRadius_mm: 95 })
const bytes = (text: string): Uint8Array => new TextEncoder().encode(text)

interface Site {
  readonly wafer: number
  readonly site: number
  readonly x: number
  readonly y: number
  /** V/I without a fault. */
  readonly ratio: number
  readonly current_A: number
}

interface Made {
  readonly seed?: number
  readonly wafers?: number
  /** What goes into a row in place of V, I and V reversed. */
  readonly fault?: (
    site: Site,
    values: { voltage: number; reverse: number },
  ) => { voltage?: number; reverse?: number; current?: number; x?: number; y?: number }
  /** Significant digits of the voltages. */
  readonly digits?: number
  /** The outermost part of every wafer higher by this share. */
  readonly edge?: number
  readonly procedure?: object
}

/** A clean lot but for the fault: 92 ohm/sq with a bowl and a tilt of its own for each wafer, noise of 0.1 %. */
function healthOf({ seed = 1, wafers = 10, fault = () => ({}), procedure = {}, digits = 7, edge = 0 }: Made): readonly HealthFinding[] {
  const random = seededRandom(seed)
  const rows = ['wafer,site,x_mm,y_mm,current_A,voltage_V,current_rev_A,voltage_rev_V']
  for (let wafer = 1; wafer <= wafers; wafer++) {
    const [level, bowl, tilt] = [92 * (1 + 0.004 * random.normal()), 0.01 * random.normal(), 0.004 * random.normal()]
    plan.x_mm.forEach((x, k) => {
      const y = plan.y_mm[k]
      const sheet = level * (1 + (bowl * (x * x + y * y)) / 9025 + (tilt * x) / 95 + edge * (Math.hypot(x, y) / 95) ** 12)
      const current_A = 5e-4
      const ratio = sheet / 4.53236
      const noisy = () => ratio * current_A * (1 + 1e-3 * random.normal())
      const clean = { voltage: noisy(), reverse: -noisy() }
      const made = { x, y, ...clean, current: current_A, ...fault({ wafer, site: k + 1, x, y, ratio, current_A }, clean) }
      rows.push([wafer, k + 1, made.x.toFixed(4), made.y.toFixed(4), made.current, made.voltage.toPrecision(digits), -made.current, made.reverse.toPrecision(digits)].join(','))
    })
  }
  const written = { format: 'persquare-procedure/1', wafer: { diameterMm: 200 }, probe: { spacingMm: 1 }, limits: { sheetResistanceOhmSq: { target: 92, lower: 80, upper: 104 } }, ...procedure }
  const { analysis, problems } = run({ readings: [{ name: 'a.csv', bytes: bytes(rows.join('\n')), sha256: '' }], procedure: { name: 'p.json', bytes: bytes(JSON.stringify(written)) } })
  if (!analysis) throw new Error(JSON.stringify(problems))
  return analysis.health
} // prettier-ignore

/** Wafers that differ by a tenth, so that a voltage can be told from a proportion. */
const spread =
  (change: (voltage: number) => number): NonNullable<Made['fault']> =>
  ({ wafer }, { voltage, reverse }) => {
    const scale = 0.88 + 0.03 * wafer
    return { voltage: change(scale * voltage), reverse: change(scale * reverse) }
  }

const seen = (found: readonly HealthFinding[]) => found.map(({ check, severity }) => `${check}:${severity}`)

describe('clean readings', () => {
  it('alarm hardly ever: in 40 made-up lots of ten wafers not once', () => {
    const alarms = Array.from({ length: 40 }, (_, k) => seen(healthOf({ seed: k + 1 }))).flat()
    expect(alarms).toEqual([])
  })

  it('of the sample lots bring up what was put into them, and nothing else', () => {
    expect(runLot('TB-0417').health.map(({ sentence }) => sentence)).toEqual([expect.stringMatching(/^Site 31 of wafer 19 reads 2\d\.\d % above/)])
    expect(runLot('TB-0522').health).toEqual([])
    expect(runLot('nist-check-wafer-137').health).toEqual([])
  })
}) // prettier-ignore

describe('what a clean lot may look like', () => {
  const looked = (made: Made) => Array.from({ length: 15 }, (_, k) => healthOf({ seed: 100 + k, ...made })).flat().filter(({ severity }) => severity !== 'note')

  it.each<[string, Made]>([
    ['an edge that every wafer shares', { edge: 0.1 }],
    ['a display of four digits', { digits: 4 }],
    ['a single wafer', { wafers: 1 }],
    ['a lot of 25', { wafers: 25 }],
  ])('%s alarms nobody', (_, made) => {
    expect(seen(looked(made))).toEqual([])
  })

  it('a coarse display is told as that, not as readings that hang or stray', () => {
    expect(seen(healthOf({ digits: 3, seed: 101 }))).toEqual(['stuck-readings:note'])
  })
}) // prettier-ignore

const scaled =
  (factor: (site: Site) => number): NonNullable<Made['fault']> =>
  (site, { voltage, reverse }) => ({ voltage: voltage * factor(site), reverse: reverse * factor(site) })

/** Wafer 7 bears the readings of wafer 2. */
function copying(): NonNullable<Made['fault']> {
  const kept = new Map<number, { voltage: number; reverse: number }>()
  return ({ wafer, site }, values) => {
    if (wafer === 2) kept.set(site, values)
    return (wafer === 7 && kept.get(site)) || {}
  }
}

describe('a fault is found', () => {
  it.each<[string, Made, string, RegExp]>([
    ['a stray voltage', { fault: spread((voltage) => voltage + 1e-4) }, 'polarity:note', /a voltage of (99|100|10[01])/],
    ['a rectifying contact', { fault: spread((voltage) => (voltage < 0 ? 0.93 * voltage : voltage)) }, 'polarity:look', /grows with the voltage/],
    ['one or the other, where the voltages are alike', { fault: (_, { reverse }) => ({ reverse: 0.97 * reverse }) }, 'polarity:note', /too alike to tell/],
    ['millivolts taken for volts', { fault: (_, { voltage, reverse }) => ({ voltage: voltage * 1000, reverse: reverse * 1000 }) }, 'units:stops', /factor of 10\^3/],
    ['a file in another unit among the others', { fault: ({ wafer }, { voltage, reverse }) => (wafer === 4 ? { voltage: voltage * 1000, reverse: reverse * 1000 } : {}) }, 'units:stops', /Wafer 4 reads a thousand times off/],
    ['V/I where a sheet resistance was expected', { procedure: { limits: { sheetResistanceOhmSq: { target: 20.3, lower: 19, upper: 22 } } } }, 'units:stops', /π\/ln 2/],
    ['positions in inches', { fault: ({ x, y }) => ({ x: x / 25.4, y: y / 25.4 }) }, 'units:look', /Read as inches they would fill it/],
    ['a meter that hangs', { fault: ({ wafer, site }) => (wafer === 3 && site > 20 && site <= 28 ? { voltage: 0.010149 } : {}) }, 'stuck-readings:look', /On wafer 3 8 readings in a row/],
    ['the end of a range', { fault: (_, { voltage }) => ({ voltage: Math.min(voltage, 0.010149) }) }, 'stuck-readings:look', /end of its range/],
    ['one stray site', { fault: ({ wafer, site }, { voltage, reverse }) => (wafer === 6 && site === 20 ? { voltage: voltage * 1.05, reverse: reverse * 1.05 } : {}) }, 'neighbours:look', /^Site 20 of wafer 6 reads [45]\.\d % above/],
    ['the same site off on every wafer', { fault: ({ site }, { voltage, reverse }) => (site === 33 ? { voltage: voltage * 1.01, reverse: reverse * 1.01 } : {}) }, 'repeated-site:look', /^Site 33 reads (0\.9|1\.\d) % high on 10 wafers/],
    ['a drift from wafer to wafer', { fault: ({ wafer }, { voltage, reverse }) => ({ voltage: voltage * (1 + 0.009 * wafer), reverse: reverse * (1 + 0.009 * wafer) }) }, 'drift:look', /From wafer to wafer the readings rise/],
    ['every fourth reading', { fault: scaled(({ site }) => (site % 4 === 0 ? 1.006 : 1)) }, 'every-nth:look', /^Every fourth reading, counted from reading 4 of a wafer, is 0.6 % high on 10 wafers/],
    ['a drift in the order of the plan', { fault: scaled(({ site }) => 1 + (0.01 * site) / plan.count) }, 'drift:look', /^Within the wafers the readings rise by (0\.[89]|1\.[01])/],
    ['a drift on one wafer', { fault: scaled(({ wafer, site }) => (wafer === 4 ? 1 - (0.02 * site) / plan.count : 1)) }, 'drift:look', /^On wafer 4 the readings fall by (1\.[789]|2\.[01])/],
    ['a step from one wafer to the next', { fault: scaled(({ wafer }) => (wafer > 5 ? 1.05 : 1)) }, 'drift:look', /^From wafer 6 on the readings are (4\.\d|5\.\d) % higher/],
    ['one wafer that rectifies', { fault: ({ wafer }, { reverse }) => (wafer === 3 ? { reverse: 0.97 * reverse } : {}) }, 'polarity:look', /^On wafer 3 forward and reverse readings differ by 3\.0 %, in the lot by 0\.0 %/],
    ['current and voltage exchanged', { fault: (_, { voltage }) => ({ voltage: 5e-4, reverse: -5e-4, current: voltage }) }, 'exchanged-columns:look', /current and voltage look exchanged/],
    ['one wafer at ten times the current', { fault: scaled(({ wafer }) => (wafer === 4 ? 10 : 1)) }, 'units:look', /^Wafer 4 reads ten times off the others/],
    ['one wafer reported as a sheet resistance', { fault: scaled(({ wafer }) => (wafer === 4 ? Math.PI / Math.LN2 : 1)) }, 'units:look', /^Wafer 4 reads π\/ln 2 off the others/],
    ['one of two wafers in another unit', { wafers: 2, fault: scaled(({ wafer }) => (wafer === 2 ? 1000 : 1)) }, 'units:stops', /^Wafer 2 reads a thousand times off the other /],
    ['one wafer measured at too little current', { fault: ({ wafer }, { voltage, reverse }) => (wafer === 4 ? { voltage: voltage / 50, reverse: reverse / 50, current: 1e-5 } : {}) }, 'current-level:look', /^Wafer 4 was measured at a voltage outside 5 to 20 mV/],
    ['a wafer that was copied', { fault: copying() }, 'stuck-readings:stops', /^Wafers 2 and 7 read the same to the last digit at all 49 sites/],
    ['the end of a range in reverse', { fault: (_, { reverse }) => ({ reverse: Math.max(reverse, -0.010149) }) }, 'stuck-readings:look', /largest reverse voltage/],
    ['too little current', { fault: (_, { voltage, reverse }) => ({ voltage: voltage / 20, reverse: reverse / 20 }), procedure: { limits: {} } }, 'current-level:look', /voltage is small/],
    ['too much current', { fault: (_, { voltage, reverse }) => ({ voltage: voltage * 20, reverse: reverse * 20 }), procedure: { limits: {} } }, 'current-level:look', /half the current/],
  ])('%s', (_, made, expected, words) => {
    const found = healthOf(made)
    expect(seen(found)).toContain(expected)
    const said = found.filter(({ check }) => check === expected.split(':')[0]).map(({ sentence, nextStep }) => `${sentence} ${nextStep}`)
    expect(said.some((sentence) => words.test(sentence)), said.join('\n')).toBe(true)
  })

  it('a drift within the wafers, told from their pattern', () => {
    // The rows of the plan run from the centre outwards, so that a drift along them looks like a bowl; read in another
    // order, with times to tell it, it stands out.
    const order = Array.from({ length: plan.count }, (_, k) => (k * 19) % plan.count)
    const random = seededRandom(2)
    const rows = ['wafer,site,x_mm,y_mm,v_over_i_ohm,time']
    for (let wafer = 1; wafer <= 6; wafer++) {
      plan.x_mm.forEach((x, k) => {
        const ratio = 20.3 * (1 + (0.01 * order[k]) / plan.count + 5e-4 * random.normal() + 0.004 * (x / 95))
        rows.push(`${wafer},${k + 1},${x.toFixed(3)},${plan.y_mm[k].toFixed(3)},${ratio},${new Date(Date.UTC(2026, 2, 1, wafer, 0, 6 * order[k])).toISOString()}`)
      })
    }
    const procedure = { format: 'persquare-procedure/1', wafer: { diameterMm: 200 }, probe: { spacingMm: 1 } }
    const { analysis } = run({ readings: [{ name: 'a.csv', bytes: bytes(rows.join('\n')), sha256: '' }], procedure: { name: 'p', bytes: bytes(JSON.stringify(procedure)) } })
    const found = analysis!.health.filter(({ check }) => check === 'drift')
    expect(found.map(({ sentence }) => sentence)).toEqual([expect.stringMatching(/^Within the wafers the readings rise by (0\.[89]|1\.0)/)])
  })

  it('exchanged configurations', () => {
    const rows = ['wafer,site,x_mm,y_mm,current_A,voltage_V,current_b_A,voltage_b_V', ...Array.from({ length: 12 }, (_, k) => `1,${k + 1},${10 * (k % 4)},${10 * Math.floor(k / 4)},0.001,0.0175,0.001,0.022`)]
    const procedure = { format: 'persquare-procedure/1', wafer: { diameterMm: 200 }, probe: { spacingMm: 1, technique: 'dual' } }
    const { analysis } = run({ readings: [{ name: 'a.csv', bytes: bytes(rows.join('\n')), sha256: '' }], procedure: { name: 'p', bytes: bytes(JSON.stringify(procedure)) } })
    const found = analysis ? analysis.health : []
    expect(seen(found)).toContain('configuration-ratio:stops')
  })
}) // prettier-ignore

describe('every finding', () => {
  it('says what to do next and where its threshold comes from', () => {
    const found = healthOf({ fault: ({ site }, { voltage, reverse }) => ({ voltage: voltage * (site === 9 ? 1.2 : 1) + 1e-4, reverse: reverse + 1e-4 }) })
    expect(found.length).toBeGreaterThan(1)
    for (const { sentence, nextStep, source } of found) {
      expect(sentence).toMatch(/^[A-Z].*[.?]$/)
      expect(nextStep).toMatch(/^[A-Z].*[.?]$/)
      expect(source.length).toBeGreaterThan(10)
    }
    expect(new Set(HEALTH_CHECKS.map(({ id }) => id)).size).toBe(HEALTH_CHECKS.length)
  })

  it('changes no number and no verdict, and is told with the problems', () => {
    const analysis = runLot('TB-0417')
    expect(analysis.problems.filter(({ kind }) => kind === 'suspicious-readings')).toEqual([])
    const flagged = analysis.problems.filter(({ kind }) => kind === 'flagged-sites')
    expect(flagged.length).toBeGreaterThan(0)
  })
}) // prettier-ignore
