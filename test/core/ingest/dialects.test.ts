import { describe, expect, it } from 'vitest'
import { procedureSchema } from '../../../core/procedure/schema'
import type { ReadOptions } from '../../../core/ingest/read-options'
import { readReadings } from '../../../core/ingest/read-files'
import { list, readClean, readText, textFile } from './read'

describe('delimiters and decimal marks', () => {
  it.each([',', ';', '\t'])('delimiter %j is found by the header', (delimiter) => {
    const text = ['wafer,site,Rs', '1,1,92.5'].join('\n').replaceAll(',', delimiter)
    expect(readClean(text).files[0]!.dialect).toMatchObject({ delimiter, decimalMark: '.' })
  })

  it('a preamble with another delimiter does not mislead', () => {
    const readings = readClean('Lot;TB-0417\nOperator, shift: K. Imber, B\nwafer,site,Rs\n1,1,92\n')
    expect(readings.lot).toBe('TB-0417')
    expect(readings.files[0]!.dialect.delimiter).toBe(',')
  })

  it('what is given wins over what is guessed', () => {
    expect(list(readClean('site;Rs\n1;1,234\n', { decimalMark: ',' }).sheetResistance_ohm_sq)).toEqual([1.234])
    expect(readText('site;Rs\n1;1,234\n', { decimalMark: '.' }).problems[1]).toMatchObject({
      kind: 'bad-cell',
      found: '1,234',
    })
    expect(readText('site,Rs\n1,92\n', { delimiter: ';' }).readings).toBeNull()
    expect(readClean('sep=;\nsite;Rs\n1;92\n').count).toBe(1)
  })

  it.each([
    ['CRLF', '\r\n'],
    ['CR alone', '\r'],
    ['blank lines between', '\n\n ,, \n'],
  ])('%s', (_, lineBreak) => {
    expect(readClean(['wafer,site,Rs', '1,1,92', '1,2,93', ''].join(lineBreak)).count).toBe(2)
  })

  it('one column is enough', () => expect(readClean('Rs_ohm_sq\n92\n93\n').count).toBe(2))
})

describe('preambles', () => {
  it.each([
    'Lot: TB-0417\nWafer: 4\n',
    'lot,TB-0417\nwafer,4\n',
    'lot,TB-0417,,\nwafer,4,,\n',
    '# lot=TB-0417\n# wafer=4\n',
    '# Lot ID: TB-0417\n# Wafer No. = 4\n',
    'lot;TB-0417\nwafer;4\n',
    'Lot: TB-0417, Wafer: 4\n',
    'Lot,TB-0417,Wafer,4\n',
    'Lot =\tTB-0417\nWafer\t4\n',
  ])('%j', (preamble) => {
    const readings = readClean(`${preamble}\nsite,x,y,Rs\n1,0,0,92\n`)
    expect(readings.lot).toBe('TB-0417')
    expect(readings.wafers).toMatchObject([{ id: '4', slot: 4 }])
  })

  it('a wafer line among the rows holds for the rows under it', () => {
    const readings = readClean('site,Rs\nWafer: 1\n1,90\nWafer: 2\n1,91\n')
    expect(readings.wafers.map(({ id }) => id)).toEqual(['1', '2'])
  })

  it('a temperature that cannot be read is said', () => {
    expect(readText('temperature: warm\nsite,Rs\n1,90\n').notes.join()).toContain('"warm"')
  })
})

describe('mapping', () => {
  it('given columns win, with the header as written or in other case, with their own unit', () => {
    const columns = { voltage_V: { header: 'reading 7', unit: 'mV' }, current_A: 'CHANNEL 3 [uA]' }
    const readings = readClean('site,Voltage,Reading 7,Channel 3 [uA]\n1,99,20,1000\n', { columns })
    expect(list(readings.voltage_V)).toEqual([0.02])
    expect(list(readings.current_A)).toEqual([0.001])
    expect(readings.files[0]!.ignoredHeaders).toEqual(['Voltage'])
    expect(readings.files[0]!.matches.find(({ column }) => column === 'voltage_V')).toEqual({
      header: 'Reading 7',
      position: 3,
      column: 'voltage_V',
      unit: 'mV',
      why: 'given in the procedure',
    })
  })

  it('the readings of a procedure are such options', () => {
    const { readings } = procedureSchema.parse({
      format: 'persquare-procedure/1',
      readings: { delimiter: ';', columns: { site: 'Rs' } },
    })
    const options: ReadOptions = readings
    expect(readText('site;Rs;rho\n1;2;3\n', options).readings!.siteNames).toContain('2')
  })

  it('a header "Direction" beside columns for both directions is none of ours', () => {
    const readings = readClean('site,Direction,I,V,Vr\n1,up,1,2,-2\n')
    expect(readings.files[0]!.ignoredHeaders).toEqual(['Direction'])
  })

  it('settles a tie', () => {
    expect(
      list(
        readClean('site,V1,Rs,Rs\n1,2,90,91\n'.replace('Rs,Rs', 'Rs,rs'), {
          columns: { sheet_resistance_ohm_sq: 'rs' },
        }).sheetResistance_ohm_sq,
      ),
    ).toEqual([91])
  })

  it('says in words why, and that a unit was assumed', () => {
    const [, match] = readClean('site,Rs,V\n1,90,2\n').files[0]!.matches
    expect(match).toMatchObject({
      column: 'sheet_resistance_ohm_sq',
      unit: 'ohm/sq',
      why: '"rs" is a usual word for sheet resistance; no unit in the header, taken as ohm/sq',
    })
    expect(readClean('site,Rs (ohm)\n1,90\n').files[0]!.matches[1]!.why).toContain('ohm taken as ohm/sq')
  })

  it('polar places where the headers are bare letters; r alone is no place', () => {
    expect(list(readClean('site,r,theta,Rs\n1,10,270,92\n').y_mm)).toEqual([-10])
    expect(readClean('site,R,Rs\n1,10,92\n').x_mm).toBeNull()
  })
})

describe('files of many blocks', () => {
  const rows = Array.from(
    { length: 20_000 },
    (_, at) => `1,${at + 1},${(at % 200) / 2},${Math.floor(at / 200) / 2},0.001,0.02`,
  )
  const header = 'wafer,site,x_mm,y_mm,current_A,voltage_V'

  it('every line has its number, and the last row needs no line break', () => {
    const readings = readClean([header, ...rows].join('\r\n'))
    expect(readings.count).toBe(20_000)
    expect(readings.line.every((line, at) => line === at + 2)).toBe(true)
    expect(readings.x_mm![19_999]).toBe(99.5)
  })

  it('with quotes and quoted line breaks too', () => {
    const quoted = rows.map((row, at) => (at % 3 === 0 ? `${row},"a ""note""\nof two lines, and commas"` : `${row},""`))
    const readings = readClean([`${header},Comment`, ...quoted].join('\n'))
    expect(readings.count).toBe(20_000)
    expect(readings.line.every((line, at) => line === at + 2 + Math.ceil(at / 3))).toBe(true)
  })

  it('a stray quote spoils its own line and no other, wherever it stands', () => {
    for (const at of [0, 1500, 12_345, 19_999]) {
      const spoiled = rows.map((row, index) => (index === at ? `"${row}` : row))
      const { readings, problems } = readText([header, ...spoiled].join('\n'))
      expect(readings!.count).toBe(19_999)
      expect(problems).toMatchObject([{ kind: 'bad-row', line: at + 2 }])
    }
  })

  it('an inch mark inside a cell is a letter like another', () => {
    expect(readClean('wafer,site,Rs,head\n1,1,92,5" head\n1,2,93,5" head\n').count).toBe(2)
  })

  it('the same bytes give the same readings', () => {
    const file = textFile([header, ...rows].join('\n'))
    expect(readReadings([file])).toEqual(readReadings([file]))
  })
})
