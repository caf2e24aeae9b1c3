/** What the preamble gives to the rows under it, where no column does. A file may hold several such blocks. */
import { preambleTarget, preambleTemperature_C } from './preamble'
import type { PreambleEntry } from './preamble'

export class Section {
  /** Every entry of the file, in order. */
  readonly entries: PreambleEntry[] = []
  lot = ''
  wafer = ''
  slot = ''
  temperature_C = NaN
  /** Said in the note that tells where a temperature came from. */
  temperatureText = ''
  time = ''
  private date = ''
  private isOpen = false
  /** Wafer and slot go together: a block that gives one of them doesn't keep the other of the block before. */
  private isWaferOfBlock = false

  /** Returns false if a temperature was given that can't be read. */
  take(entries: readonly PreambleEntry[]): boolean {
    if (!this.isOpen) this.open()
    let isRead = true
    for (const entry of entries) {
      this.entries.push(entry)
      isRead = this.takeOne(entry) && isRead
    }
    return isRead
  }

  /** The first reading after a preamble: the next entry begins a new block. */
  close(): void {
    this.isOpen = false
  }

  /** A new block is about another wafer; what it doesn't repeat of lot and temperature still holds. */
  private open(): void {
    this.isOpen = true
    this.isWaferOfBlock = false
    this.time = ''
    this.date = ''
  }

  private takeOne(entry: PreambleEntry): boolean {
    const target = preambleTarget(entry.key)
    if (target === 'lot') this.lot = entry.value
    if ((target === 'wafer' || target === 'slot') && !this.isWaferOfBlock) {
      this.wafer = ''
      this.slot = ''
      this.isWaferOfBlock = true
    }
    if (target === 'wafer') this.wafer = entry.value
    if (target === 'slot') this.slot = entry.value
    if (target === 'date') this.date = entry.value
    if (target === 'time') this.time = entry.value
    if (this.date !== '' && (target === 'date' || target === 'time')) this.time = joinDate(this.date, this.time)
    if (target !== 'temperature_C') return true
    this.temperature_C = preambleTemperature_C(entry)
    this.temperatureText = entry.value
    return !Number.isNaN(this.temperature_C)
  }
}

/** A date and a time of day in two places; a time that has a day already stands alone. */
export function joinDate(date: string, time: string): string {
  return /^\d{1,2}:\d{2}/.test(time) ? `${date} ${time}` : time === '' ? date : time
}
