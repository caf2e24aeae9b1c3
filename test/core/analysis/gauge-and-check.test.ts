import { describe, expect, it } from 'vitest'
import { resultObject } from '../../../core/analysis/result-json'
import { siteWorking } from '../../../core/analysis/site-working'
import { explain } from '../../../core/problems/explain'
import { runLot, tryLot } from './trust-lots'

describe('a lot whose procedure names a gauge study and a check wafer', () => {
  const plain = runLot('TB-0417')
  const trusted = runLot('TB-0417-trust')

  it('carries the study’s components into the uncertainty of every site, repeatability as its own and the rest as shared', () => {
    const { budget } = siteWorking(trusted, 0)
    const kinds = Object.fromEntries(budget.map(({ component, shared, evaluation }) => [component, [shared, evaluation]]))
    expect(kinds).toMatchObject({ gaugeRepeatability: [false, 'A'], gaugeDay: [true, 'A'], gaugeRun: [true, 'A'], gaugeBias: [true, 'B'] })
    const { ownStandardDeviation, degreesOfFreedom } = trusted.gauge!.components.repeatability!
    const line = budget.find(({ component }) => component === 'gaugeRepeatability')!
    const level = trusted.gauge!.occasions.mean.reduce((sum, value) => sum + value, 0) / trusted.gauge!.occasions.count
    expect(line.relative).toBeCloseTo(ownStandardDeviation! / level, 12)
    expect(line.degreesOfFreedom).toBe(degreesOfFreedom)
    expect(trusted.sites.u[0]).toBeGreaterThan(plain.sites.u[0])
    expect([...trusted.sites.value]).toEqual([...plain.sites.value])
  })

  it('is marked where the check wafer raised an alarm before it, and keeps its verdict', () => {
    expect(trusted.check!.standing).toMatchObject({ state: 'alarm', byTime: true })
    const told = trusted.problems.find(({ kind }) => kind === 'check-wafer-alarm')!
    expect(explain(told)).toMatch(/raised an alarm on 2026-03-12 17:37, its last occasion before the lot .*measure the check wafer again/)
    expect(trusted.lot.verdict).toBe(plain.lot.verdict)
    const earlier = tryLot('TB-0417-trust', (p) => p).analysis
    expect(earlier!.problems.length).toBe(trusted.problems.length)
  })

  it('says in the result what the gauge and the check wafer are', () => {
    const object = resultObject(trusted, { program: 'Persquare', version: '0' }) as Record<string, Record<string, unknown>>
    expect(object['gauge']).toMatchObject({ format: 'persquare-gauge/1', probe: 'P7' })
    expect(object['checkWafer']).toMatchObject({ format: 'persquare-check/1', standing: { state: 'alarm' } })
    expect(object['uncertainty']).toMatchObject({ coverageProbability: 0.95 })
    const bare = resultObject(plain, { program: 'Persquare', version: '0' }) as Record<string, unknown>
    expect([bare['gauge'], bare['checkWafer']]).toEqual([null, null])
  })

  it('is not analysed without the files it names, or with one that is none', () => {
    const missing = tryLot('TB-0417-trust', (p) => p, [])
    expect(missing.analysis).toBeNull()
    expect(missing.problems).toMatchObject([{ kind: 'missing-file', key: 'gaugeStudy.file' }, { kind: 'missing-file', key: 'checkWafer.file' }])
    const wrong = tryLot('TB-0417-trust', (p) => ({ ...p, gaugeStudy: { file: 'station-2-gauge-study.csv', probe: 'P9' } }))
    expect(wrong.problems).toMatchObject([{ kind: 'bad-table', why: expect.stringMatching(/no probe "P9"/) as string }])
  })
}) // prettier-ignore
