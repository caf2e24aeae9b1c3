/** Where two report files differ, in words that lead a reader to the place: a page, a file inside, a part of the structure. */
import { isDeepStrictEqual } from 'node:util'
import { inflateSync } from 'node:zlib'
import { RESULT_NAME } from './attachment-names'
import { attachmentPlaces } from './read-attachments'
import { objectOf, streamWithin, type PdfFile, type PdfObject } from './pdf-file'
import { PdfFault, array, dictionary, isReference, reference } from './pdf-syntax'

/**
 * `bytes`: not a byte may differ. `contents`: the same content may be compressed into different bytes. `rounding`: what
 * is drawn may also lie a hair beside, and the attached result, which is compared by its values, may differ.
 */
export type PdfStrictness = 'bytes' | 'contents' | 'rounding'

/**
 * In the order of the pages, then the rest; empty where there is none.
 *
 * @param remade a file that was made a moment ago; the places are found by its structure
 */
export function pdfDifferences(report: PdfFile, remade: PdfFile, how: PdfStrictness): readonly string[] {
  if (Buffer.compare(report.bytes, remade.bytes) === 0) return []
  const isSame = how === 'bytes' ? haveSameBytes : haveSameStreams(how === 'contents' ? haveSameBytes : isDrawnTheSame)
  const [before, after] = [new Extents(report), new Extents(remade)]
  const different: number[] = []
  const common = Math.min(report.offsets.length, remade.offsets.length)
  for (let number = 1; number < common; number++) {
    if (!isSame(before.of(number), after.of(number), number, report, remade)) different.push(number)
  }
  const found = [...placesOf(different, remade)]
  const places = how === 'rounding' ? found.filter((place) => place !== attachedAs(RESULT_NAME)) : found
  if (common < report.offsets.length) places.push('there is more in it than comes out')
  if (common < remade.offsets.length) places.push('there is less in it than comes out')
  if (found.length === 0 && (how === 'bytes' || !haveSameFrames(before, after))) {
    places.push(`its outer structure, at byte ${firstDifference(report.bytes, remade.bytes)}`)
  }
  return places
}

/** Where each object begins and where the next thing does. */
class Extents {
  private readonly starts: Float64Array
  constructor(readonly file: PdfFile) {
    this.starts = file.offsets.slice(1).sort()
  }

  of(number: number): Uint8Array {
    const from = this.file.offsets[number]
    return this.file.bytes.subarray(from, this.firstAbove(from))
  }

  /** Before the first object, and after the table. */
  frame(): readonly Uint8Array[] {
    const { bytes, tableAt, offsets } = this.file
    const trailerAt = tableAt + `xref\n0 ${offsets.length}\n`.length + 20 * offsets.length
    const startAt = bytes.length - `\nstartxref\n${tableAt}\n%%EOF\n`.length
    return [bytes.subarray(0, this.starts[0] ?? tableAt), bytes.subarray(trailerAt, startAt)]
  }

  private firstAbove(offset: number): number {
    let low = 0
    let high = this.starts.length
    while (low < high) {
      const middle = (low + high) >> 1
      if (this.starts[middle] > offset) high = middle
      else low = middle + 1
    }
    return this.starts[low] ?? this.file.tableAt
  }
}

function haveSameBytes(before: Uint8Array, after: Uint8Array): boolean {
  return before.length === after.length && Buffer.compare(before, after) === 0
}

function haveSameFrames(before: Extents, after: Extents): boolean {
  const frames = after.frame()
  return before.frame().every((frame, k) => haveSameBytes(frame, frames[k]))
}

type SameBytes = (before: Uint8Array, after: Uint8Array) => boolean

function haveSameStreams(isSame: SameBytes) {
  return (before: Uint8Array, after: Uint8Array, number: number, report: PdfFile, remade: PdfFile): boolean => {
    if (haveSameBytes(before, after)) return true
    try {
      const [one, other] = [objectOf(report, number), objectOf(remade, number)]
      if (one.stream === null || other.stream === null || !isDeepStrictEqual(entriesOf(one), entriesOf(other)))
        return false
      const content = inflateSync(other.stream)
      return isSame(streamWithin(one, content.length + ROOM_FOR_DIGITS), content)
    } catch (error) {
      if (error instanceof PdfFault) return false
      throw error
    }
  }
}

/** A number that came out a hair longer takes more digits. */
const ROOM_FOR_DIGITS = 65_536
const HAIR_pt = 0.002

/** Word by word; numbers may lie a hair apart. */
function isDrawnTheSame(before: Uint8Array, after: Uint8Array): boolean {
  if (haveSameBytes(before, after)) return true
  const [one, other] = [wordsOf(before), wordsOf(after)]
  return one.length === other.length && one.every((word, k) => word === other[k] || isAHairApart(word, other[k]))
}

function wordsOf(content: Uint8Array): readonly string[] {
  return Buffer.from(content).toString('latin1').split(/\s+/)
}

const NUMBER = /^[[(]?-?\d*\.?\d+[\])]?$/

function isAHairApart(one: string, other: string): boolean {
  if (!NUMBER.test(one) || !NUMBER.test(other)) return false
  const [a, b] = [one, other].map((word) => Number(word.replace(/[[\]()]/g, '')))
  return Math.abs(a - b) <= HAIR_pt && one.replace(/[-\d.]/g, '') === other.replace(/[-\d.]/g, '')
}

/** All that doesn't hang on how the stream is compressed. */
function entriesOf({ value }: PdfObject): readonly (readonly [string, unknown])[] {
  return [...dictionary(value)].filter(([key]) => key !== 'Length')
}

function placesOf(numbers: readonly number[], file: PdfFile): ReadonlySet<string> {
  const places = placesByObject(file)
  const found = numbers.map((number) => ({ number, place: places.get(number) ?? `object ${number} of the file` }))
  const rank = new Map([...places.keys()].map((number, index) => [number, index]))
  found.sort((a, b) => (rank.get(a.number) ?? places.size) - (rank.get(b.number) ?? places.size))
  return new Set(found.map(({ place }) => place))
}

function attachedAs(name: string): string {
  return `the attached ${name}`
}

const PROPERTIES = 'its title, dates and program'

/** Of a file of our own making, which is as we know it. */
function placesByObject(file: PdfFile): ReadonlyMap<number, string> {
  const places = new Map<number, string>()
  const kids = array(dictionary(objectOf(file, reference(file.root.get('Pages'))).value).get('Kids'))
  kids.forEach((kid, index) => {
    const page = dictionary(objectOf(file, reference(kid)).value)
    places.set(reference(kid), `page ${index + 1}`)
    places.set(reference(page.get('Contents')), `page ${index + 1}`)
  })
  for (const { name, entry, stream } of attachmentPlaces(file)) {
    places.set(stream, attachedAs(name))
    places.set(entry, attachedAs(name))
  }
  const properties = dictionary(objectOf(file, file.info).value)
  for (const value of [...properties.values(), file.root.get('Metadata')]) {
    if (isReference(value)) places.set(value.object, PROPERTIES)
  }
  return places.set(file.info, PROPERTIES)
}

function firstDifference(before: Uint8Array, after: Uint8Array): number {
  const end = Math.min(before.length, after.length)
  for (let at = 0; at < end; at++) if (before[at] !== after[at]) return at
  return end
}
