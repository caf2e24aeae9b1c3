import { createHash } from 'node:crypto'
import { mkdirSync, readFileSync, readdirSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import Papa from 'papaparse'
import { beforeAll, describe, expect, it } from 'vitest'
import { persquare, ROOT, scratchFolder, type Ran } from './command'

const folder = scratchFolder()
const lot = 'sample-data/TB-0417.csv'
const procedure = 'sample-data/TB-0417.procedure.json'
const text = (path: string): string => readFileSync(path, 'utf8')

function file(name: string, content: string | Uint8Array): string {
  const path = join(folder, name)
  writeFileSync(path, content)
  return path
}

/** One clear message, the status of a lot that was not analysed, and nothing of the program's inside. */
function expectRefusal({ status, stdout, stderr }: Ran, message: RegExp): void {
  expect(stderr).toMatch(message)
  expect(status).toBe(2)
  expect(stdout).toBe('')
  expect(stderr).not.toMatch(/\n\s+at |internal error|undefined|NaN/)
}

describe('persquare analyze', () => {
  const out = join(folder, 'out')
  let ran: Ran
  beforeAll(() => {
    ran = persquare('analyze', lot, '--procedure', procedure, '--out', out)
  })

  it('prints the lot and says by its status that something is out of spec', () => {
    expect(ran.status).toBe(1)
    expect(ran.stdout).toMatch(/^TB-0417 is out of spec: wafer 07 reads high at the edge/)
    expect(ran.stdout.match(/ in-spec$/gm)).toHaveLength(22)
    expect(ran.stderr).toMatch(/TB-0417\.csv, line 171, column voltage_V/)
  })

  it('writes the four files and nothing else', () => {
    expect(readdirSync(out).sort()).toEqual(['dies.csv', 'report.pdf', 'result.json', 'sites.csv'])
  })

  it('result.json holds the outward names', () => {
    const result = JSON.parse(text(join(out, 'result.json')))
    expect(result.format).toBe('persquare-result/1')
    const bytes = readFileSync(join(ROOT, lot))
    expect(result.inputs).toMatchObject([
      { name: 'TB-0417.csv', sha256: createHash('sha256').update(bytes).digest('hex') },
    ])
    expect(result.lot.verdict).toBe('out-of-spec')
    expect(result.wafers).toHaveLength(25)
    expect(Object.keys(result.wafers[0].statistics)).toEqual(
      expect.arrayContaining([
        'count',
        'mean',
        'median',
        'standardDeviation',
        'min',
        'max',
        'nonuniformityPercent',
        'rangePercent',
      ]),
    )
    expect(result.lot.varianceComponents).not.toBeNull()
    expect(result.procedure.wafer.back).toBe('insulating')
    expect(result.defaultsUsed.map(({ key }: { key: string }) => key)).toContain('wafer.back')
  })

  it('sites.csv has the documented columns and reads back to the numbers of the result', () => {
    const { data, meta } = Papa.parse<Record<string, string>>(text(join(out, 'sites.csv')).trim(), { header: true })
    expect(meta.fields!.join(', ')).toBe(
      'wafer, site, x_mm, y_mm, v_over_i_ohm, geometry_factor, thickness_factor, temperature_factor, sheet_resistance_ohm_sq, u_sheet_resistance_ohm_sq, resistivity_ohm_cm, concentration_cm3, dose_cm2, thickness_um, conformance_probability, verdict, flags',
    )
    expect(data).toHaveLength(25 * 49 - 1)
    const first = data.slice(0, 49).map((row) => Number(row['sheet_resistance_ohm_sq']))
    const mean = first.reduce((sum, value) => sum + value, 0) / 49
    expect(mean).toBeCloseTo(JSON.parse(text(join(out, 'result.json'))).wafers[0].statistics.mean, 10)
    for (const row of data) {
      const product =
        Number(row['v_over_i_ohm']) *
        Number(row['geometry_factor']) *
        Number(row['thickness_factor']) *
        Number(row['temperature_factor'])
      expect(product / Number(row['sheet_resistance_ohm_sq'])).toBeCloseTo(1, 12)
    }
  })

  it('dies.csv has the documented columns', () => {
    expect(text(join(out, 'dies.csv')).split('\n')[0]).toBe(
      'wafer,die_x,die_y,x_mm,y_mm,sheet_resistance_ohm_sq,u_sheet_resistance_ohm_sq,conformance_probability,verdict,basis',
    )
  })

  it('writes the same bytes again', () => {
    const again = join(folder, 'again')
    persquare('analyze', lot, '--procedure', procedure, '--out', again)
    for (const name of readdirSync(out))
      expect(readFileSync(join(again, name)).equals(readFileSync(join(out, name))), name).toBe(true)
  })

  it('--write chooses, --json prints the result, --quiet prints nothing', () => {
    const some = join(folder, 'some')
    const json = persquare('analyze', lot, '--procedure', procedure, '--out', some, '--write', 'sites,json', '--json')
    expect(readdirSync(some).sort()).toEqual(['result.json', 'sites.csv'])
    expect(json.stdout).toBe(text(join(some, 'result.json')))
    expect(persquare('analyze', lot, '--procedure', procedure, '--quiet')).toMatchObject({
      stdout: '',
      stderr: '',
      status: 1,
    })
  })

  it('a lot in spec ends in status 0', () => {
    const csv = file('good.csv', 'v_over_i_ohm\n20\n20.1\n')
    const limits = file(
      'good.json',
      JSON.stringify({ format: 'persquare-procedure/1', limits: { sheetResistanceOhmSq: { lower: 80, upper: 100 } } }),
    )
    expect(persquare('analyze', csv, '--procedure', limits)).toMatchObject({ status: 0, stderr: '' })
  })

  it('several files of one lot are one lot', () => {
    const rows = text(join(ROOT, lot)).split('\n')
    const part = (name: string, from: number, to: number) =>
      file(name, [...rows.slice(2, 6), ...rows.slice(6 + 49 * from, 6 + 49 * to)].join('\n'))
    const { stdout } = persquare('analyze', part('a.csv', 0, 12), part('b.csv', 12, 25), '--procedure', procedure)
    expect(stdout).toBe(ran.stdout.replace(/\nWritten.*\n/, '\nNothing written: no folder was given (--out DIR).\n'))
  })
})

describe('bad input', () => {
  const analyze = (csv: string, ...more: readonly string[]): Ran =>
    persquare('analyze', csv, '--procedure', procedure, ...more)
  const withLimits = (limits: object): string =>
    file('limits.json', JSON.stringify({ ...JSON.parse(text(join(ROOT, procedure))), limits }))
  const header = 'wafer,site,x_mm,y_mm,current_A,voltage_V\n'

  it('an empty file', () => expectRefusal(analyze(file('empty.csv', '')), /empty\.csv.*empty/i))

  it('a file of words', () =>
    expectRefusal(analyze(file('words.csv', 'dear all\nplease find the lot attached\n')), /words\.csv/))

  it('a file with a header and no row', () => expectRefusal(analyze(file('headonly.csv', header)), /headonly\.csv/))

  it('a PNG named .csv', () => {
    const png = new Uint8Array([
      0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13, 0x49, 0x48, 0x44, 0x52, 0, 0, 0, 1,
    ])
    expectRefusal(analyze(file('picture.csv', png)), /picture\.csv.*PNG/i)
  })

  it('a line of 5 MB', () => {
    expectRefusal(analyze(file('long.csv', header + '1,'.repeat(2.5e6))), /long\.csv.*line/i)
  })

  it('zero and negative current, NaN and a doubled site are listed, row by row, and the rest is analysed', () => {
    const rows = [
      '1,1,0,0,5e-4,0.0101',
      '1,2,5,0,0,0.0101',
      '1,3,10,0,-5e-4,0.0101',
      '1,4,15,0,5e-4,NaN',
      '1,1,0,0,5e-4,0.0101',
      '1,5,20,0,5e-4,0.0102',
    ]
    const { status, stderr, stdout } = analyze(file('rows.csv', header + rows.join('\n')), '--json')
    const result = JSON.parse(stdout)
    expect(status).toBe(0)
    expect(result.wafers[0].statistics.count).toBe(2)
    expect(result.problems.map(({ line }: { line: number }) => line).sort()).toEqual([3, 4, 5, 6])
    for (const line of [3, 4, 5, 6]) expect(stderr).toMatch(new RegExp(`rows\\.csv, line ${line}\\b`))
  })

  it('a site off the wafer', () => {
    const { status, stderr } = analyze(
      file('off.csv', `${header}1,1,0,0,5e-4,0.0101\n1,2,130,0,5e-4,0.0101\n1,3,9,0,5e-4,0.0101\n`),
    )
    expect(status).toBe(0)
    expect(stderr).toMatch(/off\.csv, line 3.*130/)
  })

  it('voltage and current swapped', () => {
    const { status, stderr } = analyze(
      file('swap.csv', 'wafer,site,x_mm,y_mm,voltage_V,current_A\n1,1,0,0,5e-4,0.0101\n1,2,9,0,5e-4,0.0102\n'),
    )
    expect(status).toBe(1)
    expect(stderr).toMatch(/swap/i)
  })

  it('a misspelt key is named with the nearest one', () => {
    const misspelt = file('key.json', text(join(ROOT, procedure)).replace('"diameterMm"', '"diametreMm"'))
    expectRefusal(persquare('analyze', lot, '--procedure', misspelt), /wafer\.diametreMm.*diameterMm/s)
  })

  it('limits the wrong way round', () => {
    const reversed = withLimits({ sheetResistanceOhmSq: { lower: 97, upper: 87 } })
    expectRefusal(persquare('analyze', lot, '--procedure', reversed), /limits\.sheetResistanceOhmSq/)
  })

  it('a procedure that is no JSON, is missing, or is no file', () => {
    expectRefusal(persquare('analyze', lot, '--procedure', file('p.json', '{ "format": ')), /p\.json/)
    expectRefusal(persquare('analyze', lot, '--procedure', join(folder, 'nowhere.json')), /nowhere\.json.*no such file/)
    expectRefusal(persquare('analyze', lot, '--procedure', folder), /it is a folder/)
    expectRefusal(persquare('analyze', lot), /--procedure/)
  })

  it('arguments that are not known', () => {
    expectRefusal(persquare('analyse', lot), /analyse/)
    expectRefusal(persquare('analyze', lot, '--procedure', procedure, '--colour'), /--colour/)
    expectRefusal(persquare('analyze', lot, '--procedure', procedure, '--write', 'xls'), /xls/)
    expectRefusal(persquare('analyze', lot, '--procedure', procedure, '--date', 'yesterday'), /yesterday/)
    expectRefusal(persquare('analyze', '--procedure', procedure), /FILE/)
  })

  it('a folder that cannot be written leaves the old files whole', () => {
    const notFolder = file('a-file', 'kept')
    const { status, stderr } = analyze(lot, '--out', join(notFolder, 'out'))
    expect(status).toBe(2)
    expect(stderr).toMatch(/not a folder|no plain file/)
    expect(text(notFolder)).toBe('kept')

    const blocked = join(folder, 'blocked')
    mkdirSync(join(blocked, 'report.pdf'), { recursive: true })
    writeFileSync(join(blocked, 'result.json'), 'old')
    const again = analyze(lot, '--out', blocked)
    expect(again.status).toBe(2)
    expect(again.stderr).toMatch(/report\.pdf/)
    expect(text(join(blocked, 'result.json'))).toBe('old')
    expect(readdirSync(blocked).sort()).toEqual(['report.pdf', 'result.json'])
  })
})
