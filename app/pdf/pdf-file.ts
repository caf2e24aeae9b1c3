/**
 * A PDF file as this program writes it: one table of objects at the end, never updated since, not encrypted. Any other is
 * refused, and so is one that was cut or damaged; nothing is searched for and nothing is mended.
 */
import { inflateSync } from 'node:zlib'
import { PdfFault, PdfReader, dictionary, nameOf, reference, type PdfDictionary, type PdfValue } from './pdf-syntax'

export const MAX_FILE_BYTES = 256 * 2 ** 20
const MAX_OBJECTS = 1_000_000
/** An entry of the table: ten digits, five digits, a letter. */
const ENTRY_BYTES = 20
const TAIL_BYTES = 64

export interface PdfObjects {
  readonly bytes: Uint8Array
  /** Of the object with this number; entry 0 is no object. */
  readonly offsets: Float64Array
  /** Where the table of objects begins. */
  readonly tableAt: number
}

export interface PdfFile extends PdfObjects {
  readonly root: PdfDictionary
  readonly info: number
}

export interface PdfObject {
  readonly value: PdfValue
  /** As it stands in the file, compressed or not. */
  readonly stream: Uint8Array | null
}

/** @throws PdfFault */
export function openPdf(bytes: Uint8Array): PdfFile {
  if (bytes.length > MAX_FILE_BYTES) throw new PdfFault(`it is larger than ${MAX_FILE_BYTES / 2 ** 20} MB`)
  if (!new PdfReader(bytes, 0).startsWith('%PDF-')) throw new PdfFault('it is no PDF file')
  const tableAt = startOfTable(bytes)
  const reader = new PdfReader(bytes, tableAt)
  const offsets = objectOffsets(bytes, reader, tableAt)
  reader.expect('trailer\n')
  const trailer = dictionary(reader.value())
  reader.expect(`\nstartxref\n${tableAt}\n%%EOF\n`)
  if (reader.at !== bytes.length) throw new PdfFault('something was added at its end')
  if (trailer.has('Encrypt')) throw new PdfFault('it is encrypted')
  if (trailer.has('Prev') || trailer.has('XRefStm')) throw new PdfFault('it was changed by another program')
  if (trailer.get('Size') !== offsets.length) throw new PdfFault('its structure is damaged')
  const objects = { bytes, offsets, tableAt }
  const root = dictionary(objectOf(objects, reference(trailer.get('Root'))).value)
  return { ...objects, root, info: reference(trailer.get('Info')) }
}

function startOfTable(bytes: Uint8Array): number {
  const tail = Buffer.from(bytes.subarray(-TAIL_BYTES)).toString('latin1')
  const from = tail.lastIndexOf('startxref\n')
  if (from < 0 || !tail.endsWith('%%EOF\n')) {
    throw new PdfFault('it was cut short, or another program wrote it')
  }
  const start = new PdfReader(bytes, bytes.length - tail.length + from + 'startxref\n'.length).wholeNumber()
  if (start >= bytes.length) throw new PdfFault('its structure is damaged')
  return start
}

function objectOffsets(bytes: Uint8Array, reader: PdfReader, tableAt: number): Float64Array {
  if (!reader.startsWith('xref\n0 ')) throw new PdfFault('another program wrote it')
  reader.expect('xref\n0 ')
  const count = reader.wholeNumber()
  reader.expect('\n')
  if (count < 1 || count > MAX_OBJECTS || reader.at + count * ENTRY_BYTES > bytes.length) {
    throw new PdfFault('its table of objects is damaged')
  }
  const offsets = new Float64Array(count)
  reader.expect('0000000000 65535 f \n')
  for (let number = 1; number < count; number++) {
    const from = reader.at
    offsets[number] = reader.wholeNumber()
    reader.expect(' 00000 n \n')
    if (reader.at - from !== ENTRY_BYTES || offsets[number] >= tableAt) {
      throw new PdfFault('its table of objects is damaged')
    }
  }
  return offsets
}

/** @throws PdfFault if there is no such object, or not where the table says */
export function objectOf({ bytes, offsets, tableAt }: PdfObjects, number: number): PdfObject {
  if (!(number > 0 && number < offsets.length)) throw new PdfFault(`it has no object ${number}`)
  const reader = new PdfReader(bytes, offsets[number], tableAt)
  reader.expect(`${number} 0 obj\n`)
  const value = reader.value()
  reader.expect('\n')
  if (!reader.startsWith('stream\n')) {
    reader.expect('endobj\n')
    return { value, stream: null }
  }
  reader.expect('stream\n')
  const length = dictionary(value).get('Length')
  if (!isSize(length) || reader.at + length > tableAt) throw new PdfFault('its structure is damaged')
  const stream = bytes.subarray(reader.at, reader.at + length)
  reader.at += length
  reader.expect('\nendstream\nendobj\n')
  return { value, stream }
}

export function isSize(value: unknown): value is number {
  return typeof value === 'number' && Number.isSafeInteger(value) && value >= 0
}

/**
 * What a stream holds.
 * @throws PdfFault if it holds other than `size` bytes, counted no further than one beyond them
 */
export function streamOf(object: PdfObject, size: number): Uint8Array {
  const bytes = streamWithin(object, size)
  if (bytes.length !== size) throw new PdfFault('it holds something that is damaged')
  return bytes
}

/** The same, of a stream that holds no more than `most` bytes. */
export function streamWithin({ value, stream }: PdfObject, most: number): Uint8Array {
  const entries = dictionary(value)
  if (stream === null || nameOf(entries.get('Filter')) !== 'FlateDecode' || entries.has('DecodeParms')) {
    throw new PdfFault('it holds something that is compressed in another way')
  }
  const { bytes, read } = inflated(stream, most + 1)
  if (bytes.length > most || read !== stream.length) throw new PdfFault('it holds something that is damaged')
  return bytes
}

function inflated(stream: Uint8Array, maxOutputLength: number): { bytes: Uint8Array; read: number } {
  try {
    const { buffer, engine } = inflateSync(stream, { maxOutputLength, info: true }) as unknown as {
      buffer: Uint8Array
      engine: { bytesWritten: number }
    }
    return { bytes: buffer, read: engine.bytesWritten }
  } catch {
    throw new PdfFault('it holds something that is damaged')
  }
}
