/**
 * Times of a row, to milliseconds since 1970-01-01T00:00Z. Only forms with one meaning are read; `03/04/2026` has
 * two and is refused. No locale, no time zone of the machine.
 */
const ISO =
  /^(\d{4})([-/.])(\d{1,2})\2(\d{1,2})(?:(?:\s*T\s*|\s+)(\d{1,2}):(\d{2})(?::(\d{2})(?:[.,](\d{1,9}))?)?\s*([AP]M)?\s*(Z|UTC|GMT|[+-]\d{2}(?::?\d{2})?)?)?$/i
const DAY_FIRST =
  /^(\d{1,2})([./-])(\d{1,2})\2(\d{4})(?:,?\s+(\d{1,2}):(\d{2})(?::(\d{2})(?:[.,](\d{1,9}))?)?\s*([AP]M)?\s*(Z|UTC|GMT|[+-]\d{2}(?::?\d{2})?)?)?$/i

export interface TimeReading {
  readonly time_ms: number
  readonly hasZone: boolean
}

export type TimeRefusal = 'ambiguous' | 'unknown'

export function parseTime(text: string): TimeReading | TimeRefusal {
  if (text.length > 60) return 'unknown'
  const iso = ISO.exec(text)
  if (iso) return assemble(Number(iso[1]), Number(iso[3]), Number(iso[4]), iso.slice(5))
  const other = DAY_FIRST.exec(text)
  if (!other) return 'unknown'
  const first = Number(other[1])
  const second = Number(other[3])
  const year = Number(other[4])
  // Points are written day first everywhere; strokes and dashes both ways round.
  if (other[2] === '.') return assemble(year, second, first, other.slice(5))
  if (first <= 12 && second <= 12 && first !== second) return 'ambiguous'
  return first > 12 ? assemble(year, second, first, other.slice(5)) : assemble(year, first, second, other.slice(5))
}

function assemble(
  year: number,
  month: number,
  day: number,
  clock: readonly (string | undefined)[],
): TimeReading | TimeRefusal {
  const [hourText = '0', minuteText = '0', secondText = '0', fraction = '', half, zone] = clock
  let hour = Number(hourText)
  const minute = Number(minuteText)
  const second = Number(secondText)
  if (half !== undefined) {
    if (hour < 1 || hour > 12) return 'unknown'
    hour = (hour % 12) + (half.toUpperCase() === 'PM' ? 12 : 0)
  }
  const midnight = Date.UTC(year, month - 1, day)
  const back = new Date(midnight)
  const isDay = back.getUTCMonth() === month - 1 && back.getUTCDate() === day
  if (!isDay || hour > 23 || minute > 59 || second > 60) return 'unknown'
  const clock_ms = ((hour * 60 + minute) * 60 + second) * 1000 + Math.round(Number(`0.${fraction || '0'}`) * 1000)
  return { time_ms: midnight + clock_ms - zoneOffset_ms(zone), hasZone: zone !== undefined }
}

function zoneOffset_ms(zone: string | undefined): number {
  const match = /^([+-])(\d{2}):?(\d{2})?$/.exec(zone ?? '')
  if (!match) return 0
  const minutes = Number(match[2]) * 60 + Number(match[3] ?? 0)
  return (match[1] === '-' ? -minutes : minutes) * 60_000
}

/** Reads a column of times: the ordinary `2026-03-04T14:22:05` without the cost of a regular expression a row. */
export class TimeColumnReader {
  /** A time without zone was read (and taken as UTC). */
  sawZoneless = false
  /** The first cell that couldn't be read, and why. */
  firstRefused: { readonly text: string; readonly why: TimeRefusal; readonly line: number } | null = null

  private day = ''
  private midnight_ms = NaN

  read(text: string, line: number): number {
    if (text === '') return NaN
    const quick = this.readPlain(text)
    if (quick === quick) return quick
    const reading = parseTime(text)
    if (typeof reading === 'string') {
      this.firstRefused ??= { text, why: reading, line }
      return NaN
    }
    if (!reading.hasZone) this.sawZoneless = true
    return reading.time_ms
  }

  /** `YYYY-MM-DD?hh:mm:ss` with an optional Z, NaN for anything else. */
  private readPlain(text: string): number {
    const length = text.length
    const zulu = length === 20 && text.charCodeAt(19) === 90
    if (!(length === 19 || zulu) || text.charCodeAt(13) !== 58 || text.charCodeAt(16) !== 58) return NaN
    const mark = text.charCodeAt(10)
    if (mark !== 84 && mark !== 32) return NaN
    const hour = twoDigits(text, 11)
    const minute = twoDigits(text, 14)
    const second = twoDigits(text, 17)
    if (!(hour <= 23 && minute <= 59 && second <= 59)) return NaN
    const day = text.slice(0, 10)
    if (day !== this.day) {
      const reading = parseTime(day)
      if (typeof reading === 'string' || day.charCodeAt(4) !== 45) return NaN
      this.day = day
      this.midnight_ms = reading.time_ms
    }
    if (!zulu) this.sawZoneless = true
    return this.midnight_ms + ((hour * 60 + minute) * 60 + second) * 1000
  }
}

function twoDigits(text: string, at: number): number {
  const tens = text.charCodeAt(at) - 48
  const ones = text.charCodeAt(at + 1) - 48
  return tens >= 0 && tens <= 9 && ones >= 0 && ones <= 9 ? tens * 10 + ones : NaN
}
