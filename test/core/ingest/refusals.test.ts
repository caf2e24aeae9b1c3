import { describe, expect, it } from 'vitest'
import { readReadings } from '../../../core/ingest/read-files'
import { MAX_LISTED_ROWS } from '../../../core/ingest/row-problems'
import { MAX_LINE_LENGTH } from '../../../core/ingest/split-rows'
import { readText, textFile } from './read'

function bytesFile(bytes: readonly number[] | Uint8Array) {
  return { name: 'TB-0417.csv', bytes: Uint8Array.from(bytes), sha256: '' }
}

describe('whole files', () => {
  it.each([
    ['', 'empty-file'],
    [' \n\r\n\t\n', 'empty-file'],
    ['1,2,3\n4,5,6\n', 'no-header'],
    ['just some words\nand more\n', 'no-header'],
    ['wafer,site,x_mm,y_mm,Rs\n', 'no-readings'],
    ['a,b,c\n1,2,3\n', 'missing-column'],
    ['site,V,temp\n1,2,3\n', 'missing-column'],
    ['site,x,Rs\n1,2,3\n', 'missing-column'],
    ['site,Rs,Rs\n1,2,3\n', 'ambiguous-column'],
    ['site,V [kV/m],I\n1,2,3\n', 'unknown-unit'],
    ['site,R (MOHM)\n1,2\n', 'unknown-unit'],
    ['site,x,y,resistance\n1,2,3,4\n', 'missing-column'],
  ])('%j is refused: %s', (text, kind) => {
    const { readings, problems } = readText(text)
    expect(readings).toBeNull()
    expect(problems.map((problem) => problem.kind)).toEqual([kind])
  })

  it.each([
    [[0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10, 0, 0], 'PNG'],
    [[...'%PDF-1.7\n'].map((sign) => sign.charCodeAt(0)), 'PDF'],
    [[0x50, 0x4b, 3, 4, ...[...'....[Content_Types].xml..xl/workbook.xml'].map((sign) => sign.charCodeAt(0))], 'XLSX'],
    [[0x50, 0x4b, 3, 4, 20, 0, 0, 0], 'ZIP'],
    [[0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1], 'XLS'],
    [Array.from({ length: 500 }, (_, at) => (at * 7) % 32), 'binary'],
  ])('%j is no text but looks like %s', (bytes, looksLike) => {
    const { readings, problems } = readReadings([bytesFile(bytes as number[])])
    expect(readings).toBeNull()
    expect(problems).toMatchObject([{ kind: 'not-text', looksLike: expect.stringContaining(looksLike) }])
  })

  it('a missing reading lists the headers found; a tie names both candidates', () => {
    expect(readText('site,Volts at probe,Comment\n1,2,3\n').problems).toMatchObject([
      { kind: 'missing-column', headers: ['site', 'Volts at probe', 'Comment'] },
    ])
    expect(readText('site,Measured voltage,Probe voltage,I\n1,2,2,3\n').problems).toEqual([
      {
        kind: 'ambiguous-column',
        file: 'TB-0417.csv',
        column: 'voltage_V',
        candidates: ['Measured voltage (column 2)', 'Probe voltage (column 3)'],
      },
    ])
  })

  it('a mapping to an absent header or with an unknown unit', () => {
    expect(readText('site,U1,I\n1,2,3\n', { columns: { voltage_V: 'U2' } }).problems).toMatchObject([
      { kind: 'missing-column', headers: ['site', 'U1', 'I'] },
    ])
    expect(
      readText('site,U1,I\n1,2,3\n', { columns: { voltage_V: { header: 'U1', unit: 'mm' } } }).problems,
    ).toMatchObject([{ kind: 'unknown-unit', unit: 'mm' }])
  })

  it('one line of 50 MB, within bounds', () => {
    const bytes = new Uint8Array(50e6).fill(65)
    bytes.set(new TextEncoder().encode('wafer,site,Rs\n1,1,92\n'))
    const { readings, problems } = readReadings([{ name: 'a.csv', bytes, sha256: '' }])
    expect(readings).toBeNull()
    expect(problems).toMatchObject([{ kind: 'line-too-long', line: 3, max: MAX_LINE_LENGTH }])
  })

  it.each([
    ['blanks inside a word', `site,Rs\n1,92\nx${' '.repeat(9e5)}y\n`],
    ['blanks in a preamble', `lot${' '.repeat(9e5)}x\nsite,Rs\n1,92\n`],
    ['brackets', `${'('.repeat(9e5)}\nsite,Rs\n1,92\n`],
    ['cells', `${'V,'.repeat(4e5)}\nsite,Rs\n1,92\n`],
    ['digits', `site,Rs\n1,92\n2,${'1'.repeat(9e5)}\n`],
  ])('a very long line of %s costs no more than its length', (_, text) => {
    const start = performance.now()
    readText(text)
    expect(performance.now() - start).toBeLessThan(10_000)
  })

  it('files of two lots, by preamble or column, are not one lot', () => {
    const { readings, problems } = readReadings([
      textFile('lot: TB-0417\nsite,Rs\n1,90\n', 'a.csv'),
      textFile('lot,wafer,site,Rs\nTB-0418,2,1,90\n', 'b.csv'),
    ])
    expect(readings).toBeNull()
    expect(problems).toEqual([
      { kind: 'mixed-files', file: 'b.csv', what: 'lot', first: 'TB-0417 (a.csv)', found: 'TB-0418' },
    ])
  })

  it('a refused file takes no good one with it', () => {
    const { readings, problems } = readReadings([textFile('', 'a.csv'), textFile('wafer,site,Rs\n1,1,90\n', 'b.csv')])
    expect(readings!.files.map(({ name }) => name)).toEqual(['b.csv'])
    expect(problems).toEqual([{ kind: 'empty-file', file: 'a.csv' }])
  })

  it('what a refused file says of lot, wafers and sites weighs on no other', () => {
    const { readings, problems, notes } = readReadings([
      textFile('lot: TB-0999\nslot: 9\nx,y,Rs\n0,0,1\n0,1,x\nx,y,Rs,Rs\n1,2,3,4\n', 'a.csv'),
      textFile('wafer,slot,Rs\n1,4,90\n1,9,x\nwafer,Rs,Rs\n1,2,3\n', 'b.csv'),
      textFile('lot: TB-0417\nwafer,Rs\n1,91\n', 'c.csv'),
    ])
    expect(problems.map(({ kind }) => kind)).toEqual(['ambiguous-column', 'ambiguous-column'])
    expect(readings).toMatchObject({ lot: 'TB-0417', wafers: [{ id: '1', slot: 1, rejectedRows: 0 }] })
    expect([...readings!.site].map((site) => readings!.siteNames[site])).toEqual(['1'])
    expect(notes.filter((note) => !note.startsWith('c.csv'))).toEqual([])
  })

  it('a second header that is ambiguous refuses the file and leaves nothing of it behind', () => {
    const { readings, problems } = readReadings([
      textFile('wafer,site,Rs\n1,1,90\nwafer,Rs,Rs\n1,2,3\n', 'a.csv'),
      textFile('wafer,site,Rs\n2,1,91\n', 'b.csv'),
    ])
    expect(problems.map(({ kind }) => kind)).toEqual(['ambiguous-column'])
    expect(readings!.wafers).toMatchObject([{ id: '2', slot: 2 }])
    expect([...readings!.sheetResistance_ohm_sq!]).toEqual([91])
  })
})

describe('rows', () => {
  it.each([
    ['1.2.3', 'not a number'],
    ['--', 'dash'],
    ['NaN', 'NaN'],
    ['inf', 'infinite'],
    ['OVLD', 'overload'],
    ['9.9E37', 'overload'],
    ['0x10', 'not a number'],
    ['1,5', 'decimal mark'],
    ['1,234.5', 'thousands'],
    ['', 'empty'],
    ['0', 'zero'],
    ['5 mV', 'not a number'],
  ])('a voltage %j is refused, the others read', (cell, why) => {
    const { readings, problems } = readText(`site,I,V\n1,0.001,0.02\n2,0.001,"${cell}"\n3,0.001,0.02\n`)
    expect([...readings!.line]).toEqual([2, 4])
    expect(problems).toEqual([
      { kind: 'bad-cell', file: 'TB-0417.csv', line: 3, column: 'V', found: cell, why: expect.stringContaining(why) },
    ])
    expect(readings!.files[0]).toMatchObject({ rows: 3, rejectedRows: 1 })
  })

  it.each([
    ['2,0,0.02', 'bad-cell', 'zero'],
    ['2,,0.02', 'bad-cell', 'empty'],
    ['2,0.001,-0.02', 'bad-row', 'opposite signs'],
    ['2,0.001', 'bad-row', '2 fields'],
    ['2,0.001,0.02,7', 'bad-row', '4 fields'],
    ['2,"0.001,0.02', 'bad-row', 'quotation'],
    ['Std Dev,0.001,0.02', 'bad-row', 'statistics'],
    [' Mean ,0.001,0.02', 'bad-row', 'statistics'],
    ['3 sigma,0.001,0.02', 'bad-row', 'statistics'],
    ['Std. Dev.,0.001,0.02', 'bad-row', 'statistics'],
    ['end of data', 'bad-row', 'end mark'],
  ])('row %j: %s', (row, kind, why) => {
    const { readings, problems } = readText(`site,I,V\n1,0.001,0.02\n${row}\n3,0.001,0.02\n`)
    expect([...readings!.line]).toEqual([2, 4])
    expect(problems).toMatchObject([{ kind, line: 3, why: expect.stringContaining(why) }])
  })

  it.each(['constructor', '__proto__', 'toString', 'hasOwnProperty'])('a header or a cell may say %s', (word) => {
    expect(readText(`site,${word},Rs\n1,1,90\n`).readings!.files[0]!.ignoredHeaders).toEqual([word])
    expect(readText(`site,polarity,config,I,V\n1,${word},A,1,2\n2,+,${word},1,2\n`).problems).toMatchObject([
      { kind: 'no-readings' },
      { kind: 'bad-cell', line: 2, column: 'polarity' },
      { kind: 'bad-cell', line: 3, column: 'config' },
    ])
  })

  it('a place no wafer has, a reading next to nothing, half a die', () => {
    const { problems } = readText('site,x,y,die_x,die_y,I,V\n1,1e28,0,0,0,1,2\n2,0,0,0,0,1e-300,2\n3,0,0,0.5,0,1,2\n')
    expect(problems.slice(1)).toMatchObject([
      { kind: 'bad-cell', line: 2, column: 'x' },
      { kind: 'bad-cell', line: 3, column: 'I' },
      { kind: 'bad-cell', line: 4, column: 'die_x' },
    ])
  })

  it('statistics that stand under the wafer, behind another column', () => {
    const { readings, problems } = readText('time,wafer,site,Rs\n,W-07,1,90\n,W-07,2,91\n,Mean,,90.5\n')
    expect(readings!.wafers.map(({ id }) => id)).toEqual(['W-07'])
    expect(problems).toMatchObject([{ kind: 'bad-row', line: 4 }])
  })

  it('ready-made values must be above zero; an empty optional cell is NaN', () => {
    const { readings, problems } = readText('site,Rs,rho,temp\n1,-3,1,23\n2,92,0,23\n3,92,1,\n4,92,,23\n')
    expect([...readings!.line]).toEqual([4, 5])
    expect(readings!.temperature_C![0]).toBeNaN()
    expect(readings!.resistivity_ohm_cm![1]).toBeNaN()
    expect(problems.map((problem) => 'line' in problem && problem.line)).toEqual([2, 3])
  })

  it('an empty place in a file with places, an empty wafer, an unknown direction', () => {
    expect(readText('site,x,y,Rs\n1,,2,90\n2,1,2,90\n').problems).toMatchObject([
      { kind: 'bad-cell', line: 2, column: 'x', why: 'is empty' },
    ])
    expect(readText('wafer,site,Rs\n,1,90\n2,1,90\n').problems).toMatchObject([
      { kind: 'bad-cell', line: 2, column: 'wafer' },
    ])
    expect(readText('site,polarity,I,V\n1,sideways,1,2\n2,+,1,2\n').problems).toMatchObject([
      { kind: 'bad-cell', line: 2, column: 'polarity', found: 'sideways' },
    ])
  })

  it('so many bad rows that nobody reads them are counted', () => {
    const { readings, problems, notes } = readText(`site,Rs\n1,90\n${'2,x\n'.repeat(MAX_LISTED_ROWS + 50)}`)
    expect(problems).toHaveLength(MAX_LISTED_ROWS)
    expect(readings!.files[0]!.rejectedRows).toBe(MAX_LISTED_ROWS + 50)
    expect(notes).toContain('TB-0417.csv: 50 more rejected rows are counted but not listed one by one')
  })
})
