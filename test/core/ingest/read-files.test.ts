import { describe, expect, it } from 'vitest'
import { readReadings } from '../../../core/ingest/read-files'
import { fixture, list, readClean, readText, textFile } from './read'

describe('files as they come', () => {
  it('two wafers in one file, each with its preamble and header; statistics and end mark are listed', () => {
    const { readings, problems, notes } = readReadings([fixture('two-wafer-blocks.csv')])
    expect(readings!.lot).toBe('TB-0417')
    expect(readings!.wafers).toMatchObject([
      { id: '4', slot: 7 },
      { id: '5', slot: 5 },
    ])
    expect([...readings!.wafer]).toEqual([0, 0, 1, 1])
    expect([...readings!.line]).toEqual([10, 11, 18, 20])
    expect(list(readings!.voltage_V)).toEqual([0.02031, 0.02044, 0.02035, 0.0204])
    expect(list(readings!.current_A)).toEqual([0.001, 0.001, 0.001, 0.001])
    expect(readings!.temperature_C![0]).toBe(23.4)
    expect(readings!.temperature_C![2]).toBeCloseTo(23.5, 10)
    expect(readings!.time_ms![0]).toBe(Date.UTC(2026, 2, 4, 14, 22, 5))
    expect(readings!.time_ms![2]).toBeNaN()
    expect(problems).toEqual([
      {
        kind: 'bad-cell',
        file: 'two-wafer-blocks.csv',
        line: 19,
        column: 'V [mV]',
        found: 'OVLD',
        why: 'is an overload mark of the meter',
      },
      expect.objectContaining({ kind: 'bad-row', line: 21, found: 'Mean,,,,20.37' }),
      expect.objectContaining({ kind: 'bad-row', line: 22, found: 'end of data' }),
    ])
    expect(notes.some((note) => note.includes('23.4 °C'))).toBe(true)
    const [file] = readings!.files
    expect(file!.preamble.slice(0, 3)).toEqual([
      { key: '', value: 'Four-point probe export' },
      { key: 'Lot', value: 'TB-0417' },
      { key: 'Wafer', value: '4' },
    ])
    expect(file).toMatchObject({
      rows: 7,
      rejectedRows: 3,
      dialect: { encoding: 'UTF-8', delimiter: ',', decimalMark: '.' },
    })
  })

  it('semicolons, decimal commas, Latin-1, CRLF, trailing delimiters; thousands separators are refused', () => {
    const { readings, problems } = readReadings([fixture('semicolon-decimal-comma.csv')])
    expect(readings!.files[0]!.dialect).toEqual({ encoding: 'Windows-1252', delimiter: ';', decimalMark: ',' })
    expect(readings!.wafers).toMatchObject([{ id: '3', slot: 3 }])
    expect(list(readings!.voltage_V)).toEqual([0.003512, 0.003498])
    expect(list(readings!.current_A)).toEqual([1e-4, 1e-4])
    expect(list(readings!.y_mm)).toEqual([0, -40.25])
    expect(problems).toMatchObject([{ kind: 'bad-cell', line: 7, column: 'U/mV', found: '1.234,5' }])
    expect(readings!.files[0]!.preamble).toContainEqual({ key: 'operator', value: 'K. Imber' })
  })

  it('a long file folds into one reading a site, and a part given twice is a doubled site', () => {
    const { readings, problems } = readReadings([fixture('long-form.tsv')])
    expect(readings!.count).toBe(2)
    expect(list(readings!.voltage_V)).toEqual([0.0203, 0.0204])
    expect(list(readings!.voltageReverse_V)).toEqual([-0.0201, NaN])
    expect(list(readings!.currentB_A)).toEqual([0.001, NaN])
    expect(list(readings!.voltageReverseB_V)).toEqual([-0.016, NaN])
    expect(problems).toEqual([
      { kind: 'doubled-site', file: 'long-form.tsv', line: 7, wafer: '1', site: 'A2', firstLine: 6 },
    ])
  })

  it('a row of units under the header, polar places, quoted cells with line breaks', () => {
    const { readings, problems } = readReadings([fixture('units-row.csv')])
    expect(problems).toEqual([])
    expect(readings!.lot).toBe('TB-0418')
    expect(list(readings!.sheetResistance_ohm_sq)).toEqual([92.1, 92.3, 92.25])
    expect(list(readings!.x_mm)).toEqual([0, 0, -50])
    expect(list(readings!.y_mm)).toEqual([0, 50, 0])
    expect([...readings!.line]).toEqual([5, 6, 8])
    expect(readings!.files[0]!.ignoredHeaders).toEqual(['Comment'])
    expect(readings!.files[0]!.matches.find((match) => match.column === 'sheet_resistance_ohm_sq')).toMatchObject({
      unit: 'mohm/sq',
      position: 4,
    })
  })

  it.each([
    ['UTF-8 with mark', [0xef, 0xbb, 0xbf], 'utf8'],
    ['UTF-16 LE with mark', [0xff, 0xfe], 'le'],
    ['UTF-16 BE with mark', [0xfe, 0xff], 'be'],
    ['UTF-16 LE', [], 'le'],
    ['UTF-16 BE', [], 'be'],
  ] as const)('%s', (encoding, mark, kind) => {
    const text = 'wafer,site,V (µV),I (µA)\r\n1,1,1000,100\r\n'
    const body =
      kind === 'utf8'
        ? [...new TextEncoder().encode(text)]
        : [...text].flatMap((sign) => {
            const pair = [sign.charCodeAt(0) & 255, sign.charCodeAt(0) >> 8]
            return kind === 'le' ? pair : pair.reverse()
          })
    const { readings, problems } = readReadings([
      { name: 'a.csv', bytes: Uint8Array.from([...mark, ...body]), sha256: '' },
    ])
    expect(problems).toEqual([])
    expect(readings!.files[0]!.dialect.encoding).toBe(encoding)
    expect(list(readings!.voltage_V)).toEqual([0.001])
  })
})

describe('what is filled in, and where it comes from', () => {
  it('wafer from the slot column, from the file name; lot from the file name', () => {
    expect(readClean('slot,site,Rs\n3,1,92\n').wafers).toMatchObject([{ id: '3', slot: 3 }])
    const { readings, notes } = readReadings([
      textFile('site,Rs\n1,92\n', 'TB-0417_W05.csv'),
      textFile('site,Rs\n1,93\n', 'TB-0417_W06.csv'),
    ])
    expect(readings!.wafers.map(({ id }) => id)).toEqual(['05', '06'])
    expect(readings!.wafers.map(({ slot }) => slot)).toEqual([5, 6])
    expect(readings!.lot).toBe('TB-0417_W05')
    expect(notes).toContain('TB-0417_W05.csv: the wafer is named after the file: 05')
  })

  it('sites are numbered within a wafer, and a bad row keeps its number', () => {
    const { readings } = readText('wafer,Rs\n1,90\n1,--\n1,91\n2,92\n')
    expect([...readings!.site].map((site) => readings!.siteNames[site])).toEqual(['1', '3', '1'])
  })

  it('columns are the union of all files, NaN where a file has none', () => {
    const { readings } = readReadings([
      textFile('wafer,site,Rs,temp\n1,1,90,23.5\n', 'a.csv'),
      textFile('wafer;site;Rs;x;y\n2;1;91,5;3;4\n', 'b.csv'),
    ])
    expect(list(readings!.temperature_C)).toEqual([23.5, NaN])
    expect(list(readings!.x_mm)).toEqual([NaN, 3])
    expect(list(readings!.sheetResistance_ohm_sq)).toEqual([90, 91.5])
    expect(readings!.files.map(({ dialect }) => dialect.delimiter)).toEqual([',', ';'])
  })

  it('wafer and slot of one block, in either order, and of the next', () => {
    const block = (lines: string, value: number) => `${lines}\nsite,Rs\n1,${value}\n`
    const text = block('Slot: 7\nWafer: A', 90) + block('Slot: 8', 91) + block('Wafer: C', 92)
    expect(readClean(text).wafers).toMatchObject([
      { id: 'A', slot: 7 },
      { id: '8', slot: 8 },
      { id: 'C', slot: NaN },
    ])
  })

  it('a preamble temperature gives way to a column of temperatures', () => {
    expect(list(readClean('temperature: 30\nsite,Rs,temp\n1,90,23\n').temperature_C)).toEqual([23])
    expect(list(readClean('Temp (F): 73.4\nsite,Rs\n1,90\n').temperature_C)![0]).toBeCloseTo(23, 10)
  })

  it('times in one meaning only; two meanings leave the time out and keep the row', () => {
    const { readings, problems, notes } = readText(
      'site,Rs,time\n1,90,2026-03-04T14:22:05+01:00\n2,91,04.03.2026 14:22\n3,92,03/04/2026\n',
    )
    expect(list(readings!.time_ms)).toEqual([Date.UTC(2026, 2, 4, 13, 22, 5), Date.UTC(2026, 2, 4, 14, 22), NaN])
    expect(problems).toEqual([])
    expect(notes.filter((note) => note.includes('03/04/2026'))).toHaveLength(1)
    expect(notes.filter((note) => note.includes('UTC'))).toHaveLength(1)
  })

  it('date and time in two columns', () => {
    expect(list(readClean('site,Rs,Date,Time\n1,90,2026-03-04,14:22\n').time_ms)).toEqual([
      Date.UTC(2026, 2, 4, 14, 22),
    ])
  })
})

describe('signs of reverse readings', () => {
  const header = 'site,current_A,voltage_V,current_rev_A,voltage_rev_V\n'

  it('as they are, or both as magnitudes: V/I is the same', () => {
    const signed = readClean(`${header}1,1e-3,0.02,-1e-3,-0.021\n`)
    const magnitudes = readClean(`${header}1,1e-3,0.02,1e-3,0.021\n`)
    for (const { voltageReverse_V: v, currentReverse_A: i } of [signed, magnitudes])
      expect(v![0]! / i![0]!).toBeCloseTo(21, 9)
    expect(list(readClean('site,I,V\n1,-1e-3,-0.02\n').current_A)).toEqual([-1e-3])
  })

  it('without a current of its own, the forward current reversed', () => {
    const { readings, notes, problems } = readText(
      'site,current_A,voltage_V,voltage_rev_V\n1,1e-3,0.02,-0.021\n2,2e-3,0.04,-0.041\n',
    )
    expect(problems).toEqual([])
    expect(list(readings!.currentReverse_A)).toEqual([-1e-3, -2e-3])
    expect(notes.join()).toContain('forward current reversed')
  })

  it('current magnitudes beside signed voltages are reversed, if that holds for the whole file', () => {
    const all = readText(`${header}1,1e-3,0.02,1e-3,-0.021\n2,1e-3,0.02,1e-3,-0.022\n`)
    expect(list(all.readings!.currentReverse_A)).toEqual([-1e-3, -1e-3])
    expect(all.notes.join()).toContain('magnitudes')
    const mixed = readText(`${header}1,1e-3,0.02,1e-3,-0.021\n2,1e-3,0.02,-1e-3,-0.022\n`)
    expect([...mixed.readings!.line]).toEqual([3])
    expect(mixed.problems).toMatchObject([{ kind: 'bad-row', line: 2, column: 'voltageReverse_V' }])
  })

  it('a part of a long file without its forward reading is no reading', () => {
    const { readings, problems } = readText('site,direction,I,V\n1,-,-1e-3,-0.02\n2,+,1e-3,0.02\n2,-,-1e-3,-0.02\n')
    expect(readings!.count).toBe(1)
    expect(readings!.siteNames[readings!.site[0]!]).toBe('2')
    expect(problems).toMatchObject([{ kind: 'bad-row', line: 2 }])
  })

  it('nameless sites of a long file are put together by place and numbered one by one', () => {
    const { readings, problems } = readText('x,y,direction,I,V\n0,0,+,1,2\n0,0,-,-1,-2\n5,0,+,1,2\n5,0,-,-1,-2\n')
    expect(problems).toEqual([])
    expect([...readings!.site].map((site) => readings!.siteNames[site])).toEqual(['1', '2'])
  })

  it('a ready-made V/I of the reverse direction has no place and is listed', () => {
    const { readings, problems } = readText('site,direction,V/I\n1,+,20\n1,-,21\n')
    expect(list(readings!.vOverI_ohm)).toEqual([20])
    expect(problems).toMatchObject([{ kind: 'bad-row', line: 3 }])
  })
})

describe('doubled sites', () => {
  it('by name, by place within 1e-6 mm, but not across wafers nor dies', () => {
    const { readings, problems } = readText(
      'wafer,site,x,y,Rs\n1,1,0,0,90\n1,1,5,5,91\n1,2,0.0000009,0,92\n1,3,0.0000021,0,93\n2,1,0,0,94\n',
    )
    expect([...readings!.line]).toEqual([2, 5, 6])
    expect(problems).toMatchObject([
      { kind: 'doubled-site', line: 3, site: '1', firstLine: 2 },
      { kind: 'doubled-site', line: 4, site: '2', firstLine: 2 },
    ])
    expect(readClean('die_x,die_y,site,Rs\n0,0,1,90\n0,1,1,91\n0,0,2,92\n').count).toBe(3)
  })

  it('whatever blanks stand about its number', () => {
    const { problems } = readText('site,Rs\n5,90\n 5 ,91\n')
    expect(problems).toMatchObject([{ kind: 'doubled-site', line: 3, firstLine: 2 }])
  })

  it('a place on the border of two hash cells is found', () => {
    const { problems } = readText('site,x,y,Rs\n1,0.0005,0.0015,90\n2,0.0004999,0.0014999,91\n')
    expect(problems).toMatchObject([{ kind: 'doubled-site', line: 3, firstLine: 2 }])
  })

  it('our own numbers for nameless sites never double a name', () => {
    const { readings, problems } = readReadings([
      textFile('wafer,site,Rs\n1,1,90\n', 'a.csv'),
      textFile('wafer,Rs\n1,91\n', 'b.csv'),
    ])
    expect(problems).toEqual([])
    expect(readings!.count).toBe(2)
  })
})
