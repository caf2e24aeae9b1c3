/** What generated inputs once broke: each a small file, kept. `corpus/` holds the files, this table what they are about. */
import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { run, type RunResult } from '../../core/analysis/run'
import { explain } from '../../core/problems/explain'
import { inTime } from './fuzz-runs'
import { checkOutputs } from './sound-outputs'
import { checkResult, Words } from './sound-result'

interface Kept {
  readonly note: string
  readonly files: readonly string[]
  readonly procedure?: string
  readonly check: (result: RunResult, analysis: LotAnalysis) => void
}

const FOLDER = new URL('./corpus/', import.meta.url)
const PLAIN = 'plain.procedure.json'

const values = ({ sites }: LotAnalysis) => [...sites.sheetResistance_ohm_sq]
const lines = ({ problems }: RunResult) => problems.flatMap((problem) => ('line' in problem ? [problem.line] : []))
const kinds = ({ problems }: RunResult) => problems.map(({ kind }) => kind)

const KEPT: readonly Kept[] = [
  {
    note: 'the mean under the readings, behind a blank, was taken for a site',
    files: ['statistics-behind-a-blank.csv'],
    check: (result, analysis) => {
      expect(values(analysis)).toEqual([92.1, 92.4])
      expect(lines(result)).toEqual([4])
    },
  },
  {
    note: 'the mean under the readings, in the wafer column behind a time, was taken for a wafer',
    files: ['statistics-under-the-wafer.csv'],
    check: (result, analysis) => {
      expect(analysis.wafers.map(({ id }) => id)).toEqual(['W-07'])
      expect(lines(result)).toEqual([4, 5])
    },
  },
  {
    note: '"5" and " 5 " were two sites',
    files: ['site-number-in-blanks.csv'],
    check: (result) => expect(kinds(result)).toEqual(['doubled-site']),
  },
  {
    note: '"V/I (A) (ohm)" was refused for its unit "A ohm"',
    files: ['two-bracketed-units.csv'],
    check: (_, { sites }) => {
      expect([...sites.vOverI_ohm]).toEqual([20.3])
      expect([...sites.vOverIB_ohm!]).toEqual([16.1])
    },
  },
  {
    note: 'one current of 9.9e-320 A made V/I infinite and lost the whole lot',
    files: ['current-next-to-nothing.csv'],
    check: (result, analysis) => {
      expect(values(analysis)).toHaveLength(2)
      expect(lines(result)).toEqual([3])
    },
  },
  {
    note: 'a configuration B without a current was told as "NaN A"',
    files: ['part-without-current.csv'],
    check: (result) => expect(result.problems.map(explain).join()).toContain('voltage has no current'),
  },
  {
    note: 'a place of 1e28 mm was looked up without end',
    files: ['place-without-end.csv'],
    check: (result, analysis) => {
      expect(values(analysis)).toEqual([92.1, 92.2])
      expect(lines(result)).toEqual([3])
    },
  },
  {
    note: 'a die index of 0.5 was taken as it stands',
    files: ['half-a-die.csv'],
    check: (result) => expect(lines(result)).toEqual([3]),
  },
  {
    note: 'a header named "constructor" threw, a polarity named so was forward',
    files: ['named-like-a-property.csv'],
    check: (result, analysis) => {
      expect(analysis.readings.files[0].ignoredHeaders).toEqual(['constructor'])
      expect(lines(result)).toEqual([3])
    },
  },
  {
    note: 'a dual procedure over configuration A alone took the thickness factor of dual',
    files: ['configuration-a-alone.csv'],
    procedure: 'configuration-a-alone.procedure.json',
    // 10 ohm x pi/ln 2 x F(1.5); F of the image series summed here, wafer on an insulator.
    check: (_, analysis) => expect(values(analysis)[0]).toBeCloseTo(10 * (Math.PI / Math.LN2) * slabFactor(1.5), 6),
  },
  {
    note: 'with three sites no die had an uncertainty, and none a probability',
    files: ['three-sites.csv'],
    procedure: 'dies.procedure.json',
    check: (_, { dies }) => {
      const assessed = [...dies!.value.keys()].filter((die) => dies!.value[die] > 0)
      expect(assessed.length).toBeGreaterThan(0)
      expect(assessed.every((die) => dies!.u[die] >= 0 && dies!.conformanceProbability[die] >= 0)).toBe(true)
    },
  },
  {
    note: 'beside a stray site dies came out below zero',
    files: ['stray-among-few.csv'],
    procedure: 'dies.procedure.json',
    check: (_, { dies }) => expect([...dies!.value].some((value) => value <= 0)).toBe(false),
  },
  {
    note: 'a constant of 5e-324 made V/I infinite',
    files: ['good.csv'],
    procedure: 'constant-next-to-nothing.procedure.json',
    check: (result) =>
      expect(result).toMatchObject({ analysis: null, problems: [{ kind: 'bad-value', key: 'reported.factor' }] }),
  },
  {
    note: 'the names over the second wafer, "Temp,Rs", were read as a preamble and their units as a reading',
    files: ['names-like-a-preamble.csv'],
    check: (result, analysis) => {
      expect(result.problems).toEqual([])
      expect(values(analysis)).toEqual([92.1, 92.4])
      expect([...analysis.readings.temperature_C!]).toEqual([23.1, 23.2])
      expect(analysis.notes.join()).not.toContain("can't be read")
    },
  },
  {
    note: 'a site named by a blank that is none in ASCII had no name at all',
    files: ['blank-beyond-ascii.csv'],
    check: (_, { readings }) => expect(readings.siteNames).toEqual(['1', 'line 3']),
  },
  {
    note: 'a film 5e-324 µm thick had a resistivity of nothing',
    files: ['good.csv'],
    procedure: 'film-of-nothing.procedure.json',
    check: ({ problems }) => expect(problems[0]).toMatchObject({ kind: 'bad-value', key: 'layer.thicknessUm' }),
  },
  {
    note: 'limits of 1e-300 and 1e300 threw where their digits were counted',
    files: ['good.csv'],
    procedure: 'limits-beyond-all.procedure.json',
    check: (_, { lot }) => expect(lot.verdict).toBe('in-spec'),
  },
  {
    note: 'a diameter of 1e999 was told as "null"',
    files: ['good.csv'],
    procedure: 'larger-than-any.procedure.json',
    check: ({ problems }) =>
      expect(problems).toMatchObject([{ kind: 'bad-value', found: '"a number larger than any"' }]),
  },
  {
    note: 'the lot, slot and rejected rows of a refused file weighed on the good one',
    files: ['refused-after-rows.csv', 'good.csv'],
    check: (result, { readings }) => {
      expect(kinds(result)).toEqual(['ambiguous-column'])
      expect(readings).toMatchObject({ lot: 'TB-0417', wafers: [{ id: '1', slot: 1, rejectedRows: 0 }] })
    },
  },
]

/** F of a slab t spacings thick on an insulator: V/I is rho/(pi s) times the sum over all images, and rho = Rs t s. */
function slabFactor(t: number): number {
  let sum = 0
  const terms = 100_000
  for (let n = -terms; n <= terms; n++) sum += 1 / Math.hypot(1, 2 * n * t) - 1 / Math.hypot(2, 2 * n * t)
  return Math.LN2 / (t * sum)
}

function bytesOf(name: string): Uint8Array {
  return new Uint8Array(readFileSync(new URL(name, FOLDER)))
}

describe('kept inputs', () => {
  it.each(KEPT)('$note', ({ files, procedure = PLAIN, check }) => {
    const readings = files.map((name) => ({ name, bytes: bytesOf(name), sha256: '00' }))
    const words = new Words(...readings.map(({ bytes }) => bytes), bytesOf(procedure))
    const result = inTime(() => run({ readings, procedure: { name: procedure, bytes: bytesOf(procedure) } }))
    checkResult(result, words)
    if (result.analysis) checkOutputs(result.analysis, words)
    check(result, result.analysis!)
  })

  it('are all in the table', () => {
    const named = KEPT.flatMap(({ files, procedure = PLAIN }) => [...files, procedure])
    expect([...new Set(named)].sort()).toEqual(
      readdirSync(FOLDER)
        .filter((name) => name !== 'guided')
        .sort(),
    )
  })
})
