/** The files that travel inside a report, out of it again. */
import { isSize, objectOf, streamOf, type PdfFile, type PdfObject } from './pdf-file'
import { PdfFault, array, dictionary, reference, textOf, type PdfDictionary } from './pdf-syntax'

export interface ReadAttachment {
  readonly name: string
  readonly bytes: Uint8Array
}

export const ATTACHMENT_LIMITS = {
  count: 200,
  bytes: 256 * 2 ** 20,
  totalBytes: 512 * 2 ** 20,
  /** Up to here any ratio does: so little does no harm. */
  smallBytes: 2 ** 20,
  /** Of the size to the compressed size. Readings, in which each row counts something, stay far under it, however alike the rows are. */
  ratio: 500,
} as const

/** A file of ours names its attachments in these characters alone. */
const NAME = /^[\w .-]{1,120}$/

/**
 * In the order in which they were attached. What the file says of their sizes is held against the limits before anything
 * is unpacked.
 *
 * @throws PdfFault
 */
export function readAttachments(file: PdfFile): readonly ReadAttachment[] {
  const places = attachmentPlaces(file)
  let total = 0
  const packed = places.map(({ name, stream }) => {
    const object = objectOf(file, stream)
    const size = requireSize(name, object)
    total += size
    return { name, object, size }
  })
  if (total > ATTACHMENT_LIMITS.totalBytes) throw new PdfFault('the files in it are too large together')
  return packed.map(({ name, object, size }) => ({ name, bytes: streamOf(object, size) }))
}

export interface AttachmentPlace {
  readonly name: string
  /** Numbers of objects: the entry that names it, and what it holds. */
  readonly entry: number
  readonly stream: number
}

/** @throws PdfFault */
export function attachmentPlaces(file: PdfFile): readonly AttachmentPlace[] {
  const names = dictionary(objectOf(file, reference(file.root.get('Names'))).value)
  if (!names.has('EmbeddedFiles')) throw new PdfFault('no files are attached to it')
  const list = array(dictionary(names.get('EmbeddedFiles')).get('Names'))
  if (list.length % 2 !== 0 || list.length > 2 * ATTACHMENT_LIMITS.count) {
    throw new PdfFault(`more than ${ATTACHMENT_LIMITS.count} files are attached to it`)
  }
  const entries = list.filter((_, index) => index % 2 === 1).map(reference)
  const places = entries.map((entry) => placeOf(dictionary(objectOf(file, entry).value), entry))
  if (new Set(places.map(({ name }) => name.toLowerCase())).size !== places.length) {
    throw new PdfFault('two files in it have one name')
  }
  if (new Set(places.map(({ stream }) => stream)).size !== places.length) throw new PdfFault('its structure is damaged')
  return places
}

function placeOf(entry: PdfDictionary, number: number): AttachmentPlace {
  const name = textOf(entry.get('UF'))
  if (name === null || !NAME.test(name)) throw new PdfFault('a file in it has no proper name')
  return { name, entry: number, stream: reference(dictionary(entry.get('EF')).get('F')) }
}

/** The size that it says it unpacks to. */
function requireSize(name: string, { value, stream }: PdfObject): number {
  const size = dictionary(dictionary(value).get('Params')).get('Size')
  if (stream === null || !isSize(size)) throw new PdfFault('its structure is damaged')
  const { bytes, smallBytes, ratio } = ATTACHMENT_LIMITS
  if (size > bytes) throw new PdfFault(`${name} in it is larger than ${bytes / 2 ** 20} MB`)
  if (size > smallBytes && size > ratio * stream.length) throw new PdfFault(`${name} in it unpacks to far too much`)
  return size
}
