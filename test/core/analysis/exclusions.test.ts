import { describe, expect, it } from 'vitest'
import type { Exclusion } from '../../../core/analysis/exclusions'
import { flagNames } from '../../../core/analysis/flags'
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import { resultObject } from '../../../core/analysis/result-json'
import { explain } from '../../../core/problems/explain'
import { runText, sampleBytes, sampleText } from './lots'

const procedure = sampleBytes('TB-0417.procedure.json')
const csv = sampleText('TB-0417.csv')

function lot(excluded: readonly Exclusion[]): LotAnalysis {
  const { analysis } = runText(csv, procedure, 'TB-0417.csv', excluded)
  if (!analysis) throw new Error('not analysed')
  return analysis
}

const whole = lot([])
const [wafer] = whole.wafers.filter(({ sitesOut }) => sitesOut > 1)
const worst = [...wafer.sites].sort((a, b) => whole.sites.value[b] - whole.sites.value[a])[0]
const named = (row: number, reason = 'scratch under a pin'): Exclusion => ({
  wafer: whole.readings.wafers[whole.readings.wafer[row]].id,
  site: whole.readings.siteNames[whole.readings.site[row]],
  reason,
})

describe('an excluded site', () => {
  const without = lot([named(worst)])
  const after = without.wafers.find(({ id }) => id === wafer.id)!

  it('keeps its value and counts nowhere', () => {
    expect(without.sites.value[worst]).toBe(whole.sites.value[worst])
    expect(flagNames(without.sites.flags[worst])).toBe('excluded-by-person')
    expect(without.sites.verdict[worst]).toBe(3)
    expect(after.sites).toEqual(wafer.sites)
    expect(after.statistics.count).toBe(wafer.statistics.count - 1)
    expect(after.sitesOut).toBe(wafer.sitesOut - 1)
    const kept = [...wafer.sites].filter((row) => row !== worst && whole.sites.flags[row] === 0)
    const mean = kept.reduce((sum, row) => sum + whole.sites.value[row], 0) / kept.length
    expect(after.statistics.mean).toBeCloseTo(mean, 10)
  })

  it('leaves every other wafer as it was', () => {
    const others = (analysis: LotAnalysis) => analysis.wafers.filter(({ id }) => id !== wafer.id)
    expect(others(without)).toEqual(others(whole))
  })

  it('is told with its reason, in the notes and in the result', () => {
    const { wafer, site } = named(worst)
    const note = `Wafer ${wafer}, site ${site} was excluded by a person and counts nowhere: scratch under a pin`
    expect(without.notes).toContain(note)
    expect(without.problems.map(explain).join()).toContain('was excluded by a person and is shown but not judged')
    const result = resultObject(without, { program: 'Persquare', version: '0' })
    expect(result).toMatchObject({ excluded: [{ wafer, site, reason: 'scratch under a pin' }] })
    expect(resultObject(whole, { program: 'Persquare', version: '0' })).toMatchObject({ excluded: [] })
  })

  it('may have a reason of several lines, or none', () => {
    expect(lot([named(worst, ' two\n lines ')]).notes.join()).toContain('counts nowhere: two lines')
    expect(lot([named(worst, ' ')]).notes.join()).toContain('counts nowhere: no reason given')
  })
})

it('a wafer whose every site is excluded is not assessed', () => {
  const { wafers } = lot([...wafer.sites].map((row) => named(row)))
  const after = wafers.find(({ id }) => id === wafer.id)!
  expect(after.verdict).toBe('not-assessed')
  expect(after.statistics.count).toBe(0)
})

it('an exclusion that names no site of these readings is a problem, not a silence', () => {
  const { problems } = lot([{ wafer: wafer.id, site: '999', reason: '' }])
  expect(problems).toContainEqual({ kind: 'no-such-site', wafer: wafer.id, site: '999' })
})
