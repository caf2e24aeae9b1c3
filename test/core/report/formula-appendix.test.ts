/** The appendix is what the registers say now, and no report cites what it doesn't hold. */
import { readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { formulaSources } from '../../../core/analysis/formula-sources'
import { reportSite } from '../../../core/analysis/report-site'
import { run } from '../../../core/analysis/run'
import { siteWorking } from '../../../core/analysis/site-working'
import { thicknessFactor } from '../../../core/geometry/thickness'
import { appendixAsMarkdown, formulaAppendix } from '../../../core/report/formula-appendix'
import { statisticsUses } from '../../../core/report/sections/statistics-sources'
import { mf723Resistivity_ohm_cm } from '../../../core/silicon/mf723'

const ROOT = join(import.meta.dirname, '../../..')
const PAGE = join(ROOT, 'build/formulas.md')
const chapters = formulaAppendix()
const formulas = chapters.flatMap((chapter) => chapter.formulas)

describe('the appendix of formulas', () => {
  const page = appendixAsMarkdown(chapters)
  if (process.env['PERSQUARE_WRITE']) writeFileSync(PAGE, page)

  it('is the page in the repository: PERSQUARE_WRITE=1 writes it anew', () =>
    expect(readFileSync(PAGE, 'utf8')).toBe(page))

  it('gives each formula a name of its own, a formula and a source', () => {
    expect(new Set(formulas.map(({ title }) => title)).size).toBe(formulas.length)
    expect(formulas.length).toBeGreaterThan(40)
    for (const { title, formula, source } of formulas)
      expect([title, formula, source].every((text) => text.length > 3)).toBe(true)
  })

  const text = page.replace(/\s+/g, ' ')
  it.each(['TB-0417', 'TB-0522', 'nist-wafer-map', 'nist-check-wafer-137'])(
    'holds every source that the report of %s cites',
    (name) => {
      const file = (suffix: string) => ({
        name: `${name}${suffix}`,
        bytes: new Uint8Array(readFileSync(join(ROOT, 'sample-data', `${name}${suffix}`))),
      })
      const { analysis } = run({ readings: [{ ...file('.csv'), sha256: '' }], procedure: file('.procedure.json') })
      const site = reportSite(analysis!)!
      const cited = [
        ...formulaSources(analysis!).map(({ reference }) => reference),
        ...statisticsUses(analysis!).map(({ reference }) => reference),
        ...siteWorking(analysis!, site).steps.flatMap(({ source }) => source.split('; ')),
      ]
      const missing = [...new Set(cited)].filter(
        (source) => source !== '' && !HOUSE.test(source) && !text.includes(source),
      )
      expect(missing).toEqual([])
    },
  )

  /** What is no published formula: the person's own figures, and definitions. */
  const HOUSE =
    /^(no correction|isolated layer|coefficient given|the file |the procedure|the readings file|product of the factors|form of SEMI MF1527)/
})

describe('as written, by a second hand', () => {
  it('the series of the thickness factor is what the program computes', () => {
    for (const back of ['insulating', 'conducting'] as const) {
      for (const ratio of [0.3, 0.5, 1, 2, 4]) {
        const s = 1 / ratio
        let sum = 0
        for (let n = 1; n <= 20_000; n++)
          sum +=
            (back === 'conducting' ? (-1) ** n : 1) * ((s * s + 4 * n * n) ** -0.5 - (4 * s * s + 4 * n * n) ** -0.5)
        const written = (2 * Math.LN2 * s) / (1 + 4 * s * sum)
        const { value } = thicknessFactor({ thickness_um: 1000 * ratio, spacing_mm: 1, back })
        expect(value / written).toBeCloseTo(1, 5)
      }
    }
  })

  it('the curves of SEMI MF723 evaluate to what the program computes', () => {
    const { where = '' } = formulas.find(({ title }) => title.includes('MF723'))!
    const [boron, phosphorus] = where.split('; ')
    const numbers = (line: string) =>
      [...line.matchAll(/(?:[−-] ?)?\d+(?:\.\d+)?(?:e[+-]?\d+)?/g)].map(([found]) =>
        Number(found.replace('− ', '-').replace('−', '-')),
      )
    const n = 3e17
    const [first, second, , scale, exponent] = numbers(boron.slice(boron.indexOf('=')))
    expect(first / n + second / (n * (1 + (scale * n) ** exponent))).toBeCloseTo(
      mf723Resistivity_ohm_cm({ dopant: 'boron', concentration_cm3: n }),
      12,
    )
    const [factor, ...rest] = numbers(phosphorus.slice(phosphorus.indexOf('='))).filter(
      (value) => ![10, 16].includes(Math.abs(value)),
    )
    expect(factor).toBe(6.242e18)
    expect(rest).toEqual(expect.arrayContaining([-3.0769, 2.2108, -0.62272, 0.057501, -0.68157, 0.19833, -0.018376]))
  })
})
