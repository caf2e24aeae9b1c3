/** Hostile names stay names: in exports, in files' names, in pictures, in the report, in what is kept as JSON. */
import { execFileSync, spawnSync } from 'node:child_process'
import { readdirSync, writeFileSync } from 'node:fs'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join, sep } from 'node:path'
import { JSDOM } from 'jsdom'
import Papa from 'papaparse'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { attachmentNames } from '../../app/pdf/attachment-names'
import { parseSession } from '../../app/contract/session'
import { fileStem } from '../../app/renderer/formats/files'
import { compareResults } from '../../core/analysis/compare-results'
import { diesCsv, sitesCsv } from '../../core/analysis/export-csv'
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { resultJson } from '../../core/analysis/result-json'
import { run, type RunResult } from '../../core/analysis/run'
import { readReadings } from '../../core/ingest/read-files'
import { guardTextCell, readTextCell } from '../../core/ingest/text-cell'
import { writeCsv } from '../../core/ingest/write-csv'
import { parseProcedure } from '../../core/procedure/parse-procedure'
import type { Drawing } from '../../core/report/drawing'
import { lotReport } from '../../core/report/lot-report'
import { toSvg } from '../../core/report/to-svg'
import { makeReport, optionsOf } from '../app/pdf/reports'
import { exportOf, FORMULAS, MARKUP, PATHS, PROPERTIES } from './hostile-names'

const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text)
const PROCEDURE = { format: 'persquare-procedure/1', limits: { sheetResistanceOhmSq: { lower: 87, upper: 97 } } }
const WITH_DIES = {
  ...PROCEDURE,
  wafer: { diameterMm: 200 },
  probe: { spacingMm: 1 },
  dieGrid: { pitchXMm: 20, pitchYMm: 20 },
}

function runOf(csv: string, procedure: unknown = PROCEDURE, name = 'lot.csv'): RunResult {
  return run({
    readings: [{ name, bytes: utf8(csv), sha256: '00' }],
    procedure: { name: 'p.json', bytes: utf8(typeof procedure === 'string' ? procedure : JSON.stringify(procedure)) },
  })
}
function analyzed(names: readonly string[], procedure: unknown = PROCEDURE): LotAnalysis {
  const { analysis, problems } = runOf(exportOf(names, names[0], names[1]), procedure)
  if (!analysis) throw new Error(JSON.stringify(problems))
  return analysis
}
const ofReadings = ({ readings }: LotAnalysis) => ({
  wafers: Array.from(readings.wafer, (wafer) => readings.wafers[wafer].id),
  sites: Array.from(readings.site, (site) => readings.siteNames[site]),
})

describe('formulas', () => {
  const analysis = analyzed(FORMULAS, WITH_DIES)
  const isFormula = (cell: string) => /^[=+\-@＝＋－＠\t\r\n]/.test(cell) && !/^-?\d+(\.\d+)?(e[+-]?\d+)?$/.test(cell)

  it.each([
    ['sites.csv', sitesCsv(analysis)],
    ['dies.csv', diesCsv(analysis)],
    ['any other table', writeCsv([{ name: '=name', cell: (row) => FORMULAS[row] }, { name: 'x', cell: (row) => -row }], FORMULAS.length)],
  ])('%s has no cell that a spreadsheet would run, and its numbers are numbers', (_, table) => {
    const rows = Papa.parse<string[]>(table.trimEnd()).data
    expect(rows.length).toBeGreaterThan(FORMULAS.length)
    expect(rows.flat().filter(isFormula)).toEqual([])
    expect(rows.flat().filter((cell) => /^'-?[\d.]+$/.test(cell))).toEqual([])
  }) // prettier-ignore

  it('sites.csv gives the names back, and the numbers to the last digit', () => {
    const { readings, problems } = readReadings([{ name: 'sites.csv', bytes: utf8(sitesCsv(analysis)), sha256: '00' }])
    expect(problems).toEqual([])
    expect(ofReadings({ ...analysis, readings: readings! })).toEqual(ofReadings(analysis))
    expect(readings!.sheetResistance_ohm_sq).toEqual(analysis.sites.sheetResistance_ohm_sq)
    expect(readings!.x_mm).toEqual(analysis.readings.x_mm)
  })

  it('the guard and its undoing are each other’s inverse', () => {
    for (const text of [...FORMULAS, ...MARKUP, ...PATHS, "'", "''", "'a", '=', "'''+"]) {
      expect(readTextCell(guardTextCell(text))).toBe(text.trim())
      expect(guardTextCell(text)).not.toMatch(/^[=+\-@＝＋－＠]/)
    }
  })
})

describe('markup', () => {
  const analysis = analyzed(MARKUP, WITH_DIES)
  const drawings: Drawing[] = []
  const collect = (value: unknown): void => {
    if (typeof value !== 'object' || value === null) return
    if ('shapes' in value) drawings.push(value as Drawing)
    else for (const entry of Object.values(value)) collect(entry)
  }
  collect(lotReport({ analysis, working: null, date: null, program: 'persquare 0', paper: 'A4', sources: [] }))

  it('is text in every picture: no element and no attribute of it comes to be', () => {
    expect(drawings.length).toBeGreaterThan(5)
    let shown = ''
    for (const [at, drawing] of drawings.entries()) {
      const svg = toSvg(drawing, { idPrefix: `figure-${at}` })
      for (const type of ['image/svg+xml', 'text/html'] as const) {
        const { document } = new JSDOM(svg, { contentType: type }).window
        expect([...document.querySelectorAll('script,img,a,b,foreignObject,iframe,use,animate,set')]).toEqual([])
        const attributes = [...document.querySelectorAll('*')].flatMap((element) => [...element.attributes])
        const unsafe = attributes.filter(({ name, value }) => /^on|href/i.test(name) || /javascript:/i.test(value))
        expect(unsafe.map(({ name }) => name)).toEqual([])
        shown += document.documentElement.textContent
      }
    }
    expect(shown).toContain(MARKUP[0])
  })

  it('is text in the report, which has no script, no action and no link of its own making', async () => {
    const csv = exportOf(MARKUP, MARKUP[0], MARKUP[1])
    const report = await makeReport(optionsOf([{ name: MARKUP[2], text: csv }]))
    expect(Buffer.from(report).toString('latin1')).not.toMatch(/\/(JavaScript|JS|Launch|OpenAction|AA|SubmitForm|RichMedia|URI)\b/)
    const text = spawnSync('pdftotext', ['-layout', '-', '-'], { input: report, encoding: 'utf8' })
    if (text.error) return
    expect(text.stdout.replace(/\s+/g, '')).toContain(MARKUP[0].replace(/\s+/g, ''))
  }) // prettier-ignore

  it('comes through result.json as it was', () => {
    const result = JSON.parse(resultJson(analysis, { program: 'p', version: '0' })) as { wafers: { id: string }[] }
    expect(result.wafers.map(({ id }) => id)).toEqual(expect.arrayContaining([...MARKUP]))
  })
})

describe('paths', () => {
  let folder: string
  beforeAll(async () => (folder = await mkdtemp(join(tmpdir(), 'persquare-'))))
  afterAll(() => rm(folder, { recursive: true }))

  it('name no file anywhere: analyze writes its four and no other', () => {
    const [readings, procedure] = [join(folder, 'lot.csv'), join(folder, 'p.json')]
    writeFileSync(readings, exportOf(PATHS.filter((name) => !name.includes('\u0000')), PATHS[0], PATHS[1]))
    writeFileSync(procedure, JSON.stringify(PROCEDURE))
    const program = join(import.meta.dirname, '..', '..', 'out', 'cli', 'persquare.js')
    const args = [program, 'analyze', readings, '--procedure', procedure, '--out', join(folder, 'out'), '--quiet']
    const { status, stderr } = spawnSync(process.execPath, args, { encoding: 'utf8', cwd: folder })
    expect([0, 1], stderr).toContain(status)
    expect(readdirSync(folder).sort()).toEqual(['lot.csv', 'out', 'p.json'])
    expect(readdirSync(join(folder, 'out')).sort()).toEqual(['dies.csv', 'report.pdf', 'result.json', 'sites.csv'])
  }) // prettier-ignore

  it('are no part of a suggested name or an attachment’s', () => {
    for (const path of [...PATHS, ...MARKUP, ...FORMULAS]) {
      for (const name of [fileStem(path), ...attachmentNames([path])]) {
        expect(name, path).toMatch(/^[A-Za-z0-9_][A-Za-z0-9 ._-]*$/)
        expect(join('folder', name), path).toBe(`folder${sep}${name}`)
      }
    }
  })

  it('are refused as the name of a file that a procedure brings', () => {
    const isOfFile = (problem: object) => 'key' in problem && /file$/i.test(String(problem.key))
    const named = (file: string) => [
      { ...PROCEDURE, gaugeStudy: { file } },
      { ...PROCEDURE, checkWafer: { file } },
      { ...PROCEDURE, layer: { kind: 'doped-layer', dopant: 'boron', profile: 'tabulated', profileFile: file, background: { dopant: 'phosphorus', concentrationCm3: 1e15 } } },
    ]
    for (const path of ['../x.csv', '/etc/passwd', '..\\x.csv', 'a/b.csv', 'a\\b.csv', 'C:x.csv', '..', '.', '', 'a\u0000.csv']) {
      for (const procedure of named(path)) {
        const { procedure: read, problems } = parseProcedure(JSON.stringify(procedure), 'p.json')
        expect(read, path).toBeNull()
        expect(problems.filter(isOfFile), path).toHaveLength(1)
      }
    }
    for (const procedure of named('study.csv')) {
      expect(parseProcedure(JSON.stringify(procedure), 'p.json').problems.filter(isOfFile)).toEqual([])
    }
  }) // prettier-ignore
})

describe('names of properties', () => {
  const clean = () => {
    expect(Object.keys(Object.prototype)).toEqual([])
    expect(({} as Record<string, unknown>)['polluted']).toBeUndefined()
    expect(Object.getOwnPropertyNames(Object.prototype)).toHaveLength(UNTOUCHED)
  }
  const UNTOUCHED = Object.getOwnPropertyNames(Object.prototype).length
  const POISON = '{"polluted":1,"toString":2}'
  const poisoned = (key: string) => [
    `{"${key}":${POISON},"format":"persquare-procedure/1"}`,
    `{"format":"persquare-procedure/1","wafer":{"${key}":${POISON}}}`,
    `{"format":"persquare-procedure/1","readings":{"columns":{"${key}":"Rs"}}}`,
    `{"format":"persquare-procedure/1","limits":{"sheetResistanceOhmSq":{"${key}":${POISON}}}}`,
    `{"format":"${key}"}`,
  ]

  it.each(PROPERTIES)('%s as a key of a procedure is refused by its name, and changes nothing', (key) => {
    for (const text of poisoned(key)) {
      const { procedure, problems } = parseProcedure(text, 'p.json')
      expect(procedure, text).toBeNull()
      expect(JSON.stringify(problems)).toContain(key)
      clean()
    }
  })

  it.each(PROPERTIES)('%s as a name of wafer, site, lot, header and column is a name like any other', (key) => {
    const { analysis } = runOf(exportOf([...PROPERTIES], key, key))
    expect(analysis!.wafers.map(({ id }) => id)).toEqual([...PROPERTIES])
    expect(new Set(ofReadings(analysis!).sites)).toEqual(new Set(PROPERTIES))
    runOf(`site,${key},V,I\n1,1,0.02,5e-4\n`)
    runOf(`site,V,I\n1,0.02,5e-4\n`, PROCEDURE, key)
    clean()
  })

  it.each(PROPERTIES)('%s as a key of a kept session or of a result to compare', (key) => {
    const decision = '"decision":{"decision":null,"name":"","comment":"","date":null}'
    const text = `{"format":"persquare-session/1","readings":[],"procedure":null,"excluded":[],${decision},"view":{"${key}":${POISON}},"${key}":${POISON}}`
    parseSession(text)
    for (const other of [`{"${key}":${POISON}}`, `{"a":{"${key}":[1]}}`, '{}']) {
      compareResults(JSON.parse(`{"${key}":${POISON},"a":{}}`), JSON.parse(other))
      const { count } = compareResults(JSON.parse(`{"${key}":1}`), JSON.parse('{}'))
      expect(count).toBeGreaterThan(0)
    }
    clean()
  })

  it.each(PROPERTIES)('%s as a header or a name in the files that a procedure brings', (key) => {
    const named = { ...PROCEDURE, gaugeStudy: { file: 'g.csv' }, checkWafer: { file: 'c.csv' } }
    const rows = Array.from({ length: 12 }, (_, n) => `${key},${n % 2 ? key : 'P1'},${(n % 3) + 1},${92 + n * 0.01},${key}`)
    const table = utf8([`wafer,probe,day,value,${key}`, ...rows].join('\n'))
    run({
      readings: [{ name: 'lot.csv', bytes: utf8('site,V,I\n1,0.02,5e-4\n'), sha256: '00' }],
      procedure: { name: 'p.json', bytes: utf8(JSON.stringify(named)) },
      companions: ['g.csv', 'c.csv'].map((name) => ({ name, bytes: table, sha256: '00' })),
    })
    clean()
  }) // prettier-ignore
})

it('pdftotext is there in CI, so that the report’s text was looked at', () => {
  if (process.env['CI']) execFileSync('pdftotext', ['-v'], { stdio: 'ignore' })
})
