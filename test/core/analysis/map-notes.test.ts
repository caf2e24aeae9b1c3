import { describe, expect, it } from 'vitest'
import { lotTable } from '../../../app/cli/lot-table'
import { plainMethodFor, prepareInterpolator } from '../../../core/map/interpolator'
import { processFitter, whyNoProcess } from '../../../core/map/process-surface'
import { concentricPlan } from '../../../core/wafer/site-patterns'
import { runLot } from './trust-lots'

type Written = Record<string, unknown>
const byProcess = (procedure: Written): Written => ({ ...procedure, map: { interpolation: 'gaussian-process' } })
const wideEdge = (procedure: Written): Written => ({
  ...procedure,
  wafer: { ...(procedure.wafer as Written), edgeExclusionMm: 70 },
})
const notesOfMaps = (notes: readonly string[]): string[] => notes.filter((note) => note.includes('Gaussian process'))

describe('what is said where no Gaussian process can be fitted', () => {
  it('is why, to which wafers, and what stands in', () => {
    const analysis = runLot('TB-0417', (procedure) => wideEdge(byProcess(procedure)))
    // So wide an edge leaves the centre of each wafer alone.
    expect(notesOfMaps(analysis.notes)).toEqual([
      'No Gaussian process was fitted to 25 wafers: it needs sites in 9 places, and they are in 1. Maps and dies: mean of the sites: too few, or all on one line.',
    ])
    expect(lotTable(analysis)).toContain('the Gaussian process (or, where none could be fitted, the spline) through')
  })

  it('is nothing where it was fitted to all, or not asked for', () => {
    const fitted = runLot('TB-0417', byProcess)
    expect(notesOfMaps(fitted.notes)).toEqual([])
    expect(lotTable(fitted)).toContain('the Gaussian process through')
    expect(notesOfMaps(runLot('TB-0417', wideEdge).notes)).toEqual([])
  })
})

const NOWHERE = { x_mm: new Float64Array(0), y_mm: new Float64Array(0) }

describe('the reason and the stand-in', () => {
  const plan = concentricPlan({ circles: 17, outerRadius_mm: 95 })
  const few = { x_mm: plan.x_mm.slice(0, 8), y_mm: plan.y_mm.slice(0, 8), value: plan.x_mm.slice(0, 8) }
  const some = { x_mm: plan.x_mm.slice(0, 49), y_mm: plan.y_mm.slice(0, 49), value: plan.x_mm.slice(0, 49) }
  const cases = [
    ['too few', few, 'it needs sites in 9 places, and they are in 8'],
    ['too many', { ...plan, value: plan.x_mm }, 'it takes sites in 1000 places at most, and they are in 1225'],
    ['one line', { ...some, y_mm: some.x_mm }, 'all sites lie on one line'],
    ['one value', { ...some, value: new Float64Array(49).fill(90) }, 'all sites have one value'],
    ['none', some, null],
  ] as const

  it.each(cases)('%s: as the fit and the interpolation themselves', (_, { x_mm, y_mm, value }, why) => {
    expect(whyNoProcess(x_mm, y_mm, value)).toBe(why)
    expect(processFitter()(x_mm, y_mm, value, new Float64Array(value.length)) === null).toBe(why !== null)
    expect(plainMethodFor(x_mm, y_mm)).toBe(prepareInterpolator(x_mm, y_mm, NOWHERE).method)
  })
})
