import { describe, expect, it } from 'vitest'
import { SITE_FLAGS } from '../../../core/analysis/flags'
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import type { Decision } from '../../../core/report/decision'
import type { Block, KeyValuesBlock, TableBlock } from '../../../core/report/document'
import { lotReport } from '../../../core/report/lot-report'
import { sourceList } from '../../../core/report/source-list'
import { unitOfKey } from '../../../core/report/sections/procedure-section'
import { syntheticLot, syntheticSources, syntheticWorking } from '../../fixtures/report/synthetic-lot'

function blocksOf(analysis: LotAnalysis, decision: Decision | null = null): readonly Block[] {
  return lotReport({
    analysis,
    working: syntheticWorking,
    date: '2026-03-14T09:30:00+01:00',
    program: 'Persquare 0.1.0',
    paper: 'A4',
    sources: syntheticSources,
    decision,
  }).blocks
}

const lot = syntheticLot()
const blocks = blocksOf(lot)
const table = (start: string) =>
  blocks.find((block): block is TableBlock => block.kind === 'table' && block.summary.startsWith(start))!

describe('the lot report', () => {
  it('begins with the verdict by word, shape and sentence', () => {
    const verdict = blocks.find((block) => block.kind === 'verdict')
    expect(verdict).toMatchObject({ word: 'Out of spec', mark: 'above', sentence: lot.lot.sentence })
  })

  it('sets a person’s decision beside the verdict, which stays as it is', () => {
    const decision: Decision = { decision: 'hold', name: 'A. Tern', comment: 'Probe\nagain.', date: '2026-03-14T10:05:00+01:00' } // prettier-ignore
    const decided = blocksOf(lot, decision)
    const at = decided.findIndex((block) => block.kind === 'verdict')
    expect(decided[at]).toEqual(blocks[at])
    expect(decided[at + 1]).toEqual({
      kind: 'key-values',
      columns: 1,
      entries: [
        { key: 'Decision', value: 'Hold', note: 'A. Tern, 2026-03-14 10:05 +01:00' },
        { key: 'Comment', value: 'Probe again.' },
      ],
    })
    expect([...decided.slice(0, at + 1), ...decided.slice(at + 2)]).toEqual(blocks)
    expect(JSON.stringify(blocksOf(lot, { ...decision, name: ' ', comment: ' ' })[at + 1])).toContain('unnamed, 2026')
  })

  it('lists every wafer in slot order, also where the file has another', () => {
    const turned = { ...lot, wafers: [...lot.wafers].reverse() }
    const rows = blocksOf(turned).find((block): block is TableBlock => block.kind === 'table')!.rows
    expect(rows.map((row) => row.cells[0])).toEqual(lot.wafers.map((wafer) => wafer.id))
  })

  it('marks a wafer by the side it is out on', () => {
    const marks = table('Every wafer').rows.map((row) => row.mark)
    expect(marks[6]).toBe('above')
    expect(marks[19]).toBe('below')
    expect(marks[0]).toBeUndefined()
  })

  it('names problems, notes, defaults and cautions, and leaves room to sign', () => {
    const text = JSON.stringify(blocks)
    expect(text).toContain('TB-0417.csv, line 118')
    expect(text).toContain('No temperature correction')
    expect(text).toContain('layer.mobility = masetti')
    expect(text).toContain('hydrofluoric acid')
    expect(blocks.some((block) => block.kind === 'signature')).toBe(true)
  })

  it('cites the sources of the working by their numbers', () => {
    const steps = table('Steps from').rows
    const sources = table('Sources').rows
    const surface = steps.find((row) => row.cells[1] === 'Surface concentration')!
    const cited = sources.find((row) => row.cells[0] === surface.cells[4])!
    expect(cited.cells[1]).toContain('Masetti')
    expect(steps[0]!.cells[4]).toBe('')
  })

  it('tells given from default in the procedure', () => {
    const rows = table('Procedure keys').rows
    expect(rows.find((row) => row.cells[0] === 'layer.mobility')!.cells).toEqual(['layer.mobility', 'masetti', '', 'default']) // prettier-ignore
    expect(rows.find((row) => row.cells[0] === 'layer.depthUm')!.cells).toEqual(['layer.depthUm', '0.35', 'µm', 'given']) // prettier-ignore
  })

  it('sets the mobility models side by side, after the wafers and before the readings', () => {
    const models = table('Concentration and dose')
    expect(models.rows.map(({ cells }) => cells[0])).toHaveLength(6)
    const own = models.rows.filter(({ emphasis }) => emphasis === 'strong')
    expect(own.map(({ cells }) => [cells[3], cells[4]])).toEqual([['0.00', "the procedure's"]])
    const headings = blocks.flatMap((block) => (block.kind === 'heading' && block.level === 1 ? [block.text] : []))
    const at = headings.indexOf('Layer')
    expect(headings[at - 1]).toMatch(/^Wafer /)
    expect(headings[at + 1]).toBe('Readings')
    expect(JSON.stringify(blocks)).toMatch(/models valid here span .* from the least to the greatest, the dose by/)
  })

  it('says of a profile file what it is, and of a layer without silicon nothing', () => {
    const layer = { ...lot.procedure.layer, profile: 'tabulated', profileFile: 'tb-0417-profile.csv', depthUm: undefined } as const // prettier-ignore
    const profile = {
      file: 'tb-0417-profile.csv',
      bytes: 80,
      sha256: 'c0ffee',
      headers: { depth: 'depth_um', concentration: 'N_cm-3' },
      depth_um: Float64Array.of(0, 0.1, 0.2, 0.4),
      concentration_cm3: Float64Array.of(4e19, 3e19, 4e18, 1e15),
    }
    const text = JSON.stringify(blocksOf({ ...lot, profile, procedure: { ...lot.procedure, layer: layer as never } }))
    expect(text).toContain('boron, profile tb-0417-profile.csv, on phosphorus')
    expect(text).toContain('4 points to 0.4000 µm; columns depth_um and N_cm-3')
    expect(text).toContain('c0ffee')
    expect(text).toContain('Peak concentration')
    const film = { ...lot.procedure, layer: { kind: 'film', resistivityOhmCm: 1.7e-6 } } as const
    const headings = blocksOf({ ...lot, procedure: film }).flatMap((block) => (block.kind === 'heading' ? [block.text] : [])) // prettier-ignore
    expect(headings).not.toContain('Layer')
  })

  it('holds for a lot without positions, dies, values or limits', () => {
    const bare: LotAnalysis = {
      ...lot,
      readings: { ...lot.readings, x_mm: null, y_mm: null },
      dies: null,
      procedure: { ...lot.procedure, limits: { allowedSitesOut: 0 } },
      sites: {
        ...lot.sites,
        value: new Float64Array(lot.sites.count).fill(NaN),
        flags: new Uint32Array(lot.sites.count).fill(SITE_FLAGS.noReading.bit),
      },
    }
    const text = JSON.stringify(blocksOf(bare))
    expect(text).toContain('No map')
    expect(text).not.toMatch(/NaN|undefined|Infinity/)
  })

  it('holds no number that is not one, and gives the same for the same', () => {
    expect(JSON.stringify(blocks)).not.toMatch(/NaN|undefined|null,null|Infinity/)
    expect(JSON.stringify(blocksOf(syntheticLot()))).toBe(JSON.stringify(blocks))
  })

  it('states the formula of every non-uniformity', () => {
    const notes = blocks
      .flatMap((block) => (block.kind === 'columns' ? block.columns.flat() : []))
      .filter((block): block is KeyValuesBlock => block.kind === 'key-values')
      .flatMap(({ entries }) => entries.map((entry) => entry.note))
    for (const { formula } of lot.wafers[0]!.statistics.nonuniformity)
      expect(notes).toContain(formula.replaceAll('-', '−'))
  })
})

describe('the numbered sources', () => {
  it('gives one number to a reference, however often it is used', () => {
    const list = sourceList(syntheticSources, [
      { reference: 'masetti', use: 'Mobility again' },
      { reference: 'A new one', use: 'Step' },
      { reference: '', use: 'Nothing' },
    ])
    expect(list.entries).toHaveLength(5)
    expect(list.numberOf('masetti')).toBe(3)
    expect(list.entries[2]!.uses).toEqual(['Mobility', 'Mobility again'])
    expect(list.numberOf('A new one')).toBe(5)
    expect(list.numberOf('')).toBeNull()
  })
})

describe('units of procedure keys', () => {
  it.each([
    ['wafer.diameterMm', 'mm'],
    ['layer.background.concentrationCm3', 'cm⁻³'],
    ['limits.sheetResistanceOhmSq.lower', 'Ω/sq'],
    ['limits.uniformityPercent.upper', '%'],
    ['limits.uniformityPercent.definition', ''],
    ['temperature.coefficientPercentPerC', '%/°C'],
    ['temperature.referenceC', '°C'],
    ['probe.technique', ''],
  ])('%s is in "%s"', (key, unit) => expect(unitOfKey(key)).toBe(unit))
})
