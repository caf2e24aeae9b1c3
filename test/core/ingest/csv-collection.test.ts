/** The public collection csv-spectrum (BSD-2-Clause): each of its files with the cells that it must give. */
import { readdirSync, readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { dirname, join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { decodeText } from '../../../core/ingest/decode-text'
import { blockEnds, splitRows } from '../../../core/ingest/split-rows'

const FOLDER = dirname(createRequire(import.meta.url).resolve('csv-spectrum/package.json'))
const NAMES = readdirSync(join(FOLDER, 'csvs')).map((file) => file.replace(/\.csv$/, ''))

/** As the reader of exports takes a file apart, block by block. */
function rowsOf(bytes: Uint8Array): string[][] {
  const decoded = decodeText(bytes)
  if ('looksLike' in decoded) throw new Error(`it looks like ${decoded.looksLike}`)
  const ends = blockEnds(decoded.units)
  if (!Array.isArray(ends)) throw new Error('a line is too long')
  return ends.flatMap((end, block) => {
    const rows = splitRows(decoded.text(block === 0 ? 0 : ends[block - 1], end), ',', 1)
    return rows.cells.map((cells, row) => {
      expect(rows.isBroken(row)).toBe(false)
      return cells.map((cell, at) => (at === cells.length - 1 ? cell.trimEnd() : cell))
    })
  })
}

/** In one of its pairs the collection contradicts itself: an object for the list of one, with another telephone number. */
function expectedOf(name: string): unknown {
  const json = readFileSync(join(FOLDER, 'json', `${name}.json`), 'utf8').replaceAll('\\r\\n', '\\n')
  const rows = JSON.parse(json) as unknown
  return name === 'location_coordinates' ? [{ ...(rows as object), 'Contact Phone Number': '2095257564' }] : rows
}

describe('the collection', () => {
  it('is there, whole', () => expect(NAMES).toHaveLength(12))

  // A quote amid a cell (36°36'37.8"N) is a quote; "\r\n" inside quotes is a line break.
  it.each(NAMES)('%s', (name) => {
    const [header, ...rows] = rowsOf(readFileSync(join(FOLDER, 'csvs', `${name}.csv`)))
    const found = rows.map((cells) => Object.fromEntries(header.map((key, at) => [key, cells[at]])))
    expect(found).toEqual(expectedOf(name))
  })
})
