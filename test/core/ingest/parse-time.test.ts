import { describe, expect, it } from 'vitest'
import { TimeColumnReader, parseTime } from '../../../core/ingest/parse-time'

describe('parseTime', () => {
  it.each([
    ['2026-03-04', '2026-03-04T00:00:00Z', false],
    ['2026-03-04T14:22:05Z', '2026-03-04T14:22:05Z', true],
    ['2026-03-04T14:22:05.250-05:30', '2026-03-04T19:52:05.250Z', true],
    ['2026-03-04 14:22:05', '2026-03-04T14:22:05Z', false],
    ['2026/3/4 2:22 PM', '2026-03-04T14:22:00Z', false],
    ['2026-03-04 12:05 AM', '2026-03-04T00:05:00Z', false],
    ['04.03.2026 14:22', '2026-03-04T14:22:00Z', false],
    ['25/03/2026 14:22', '2026-03-25T14:22:00Z', false],
    ['03/25/2026', '2026-03-25T00:00:00Z', false],
    ['04/04/2026', '2026-04-04T00:00:00Z', false],
  ])('%s', (text, iso, hasZone) => expect(parseTime(text)).toEqual({ time_ms: Date.parse(iso), hasZone }))

  it.each(['03/04/2026', '3-4-2026 10:00'])('%s has two meanings', (text) => expect(parseTime(text)).toBe('ambiguous'))
  it.each([
    '2026-02-30',
    '31.04.2026',
    '2026-13-01',
    '2026-03-04 25:00',
    '04.03.26',
    '14:22',
    'yesterday',
    '1772634125',
    '2026-03-04 13:00 PM',
  ])('%s is no time', (text) => expect(parseTime(text)).toBe('unknown'))
})

describe('TimeColumnReader', () => {
  it('reads plain times as parseTime does, and remembers what it met', () => {
    const reader = new TimeColumnReader()
    for (const text of ['2026-03-04T14:22:05Z', '2026-03-04 23:59:59', '2026-03-05 00:00:00', '2024-02-29 12:00:00']) {
      const reading = parseTime(text)
      expect(reader.read(text, 1)).toBe(typeof reading === 'string' ? NaN : reading.time_ms)
    }
    expect(reader.sawZoneless).toBe(true)
    expect(reader.firstRefused).toBeNull()
    expect(reader.read('2023-02-29 12:00:00', 7)).toBeNaN()
    expect(reader.read('', 8)).toBeNaN()
    expect(reader.firstRefused).toEqual({ text: '2023-02-29 12:00:00', why: 'unknown', line: 7 })
  })

  it('a zone in every row leaves no doubt', () => {
    const reader = new TimeColumnReader()
    reader.read('2026-03-04T14:22:05Z', 1)
    reader.read('2026-03-04T14:22:05+02:00', 2)
    expect(reader.sawZoneless).toBe(false)
  })
})
