import { PDFCrossRefStream, PDFName, PDFNumber, PDFObjectStream, PDFPageLeaf, PDFRawStream, PDFRef, PDFStream, type PDFContext, type PDFDocument, type PDFObject } from 'pdf-lib'
import { deflated } from '@/lib/typesetting/operators'

/** Where an object lies: at a byte of the file, or as the how manieth of a packed group. */
type Place = Readonly<{ ref: PDFRef; at: number; group: PDFRef | null }>
/** Objects that go into one packed group. */
const together = 200

/**
 * Writes a file while it is being built: what is finished goes out and is forgotten, so that a file of any length takes the memory of its
 * largest part. Objects that are still to grow (the catalog, the list of pages and its small entries) go out with the end. Readers find everything by the table
 * at the end (ISO 32000-1, 7.5.8).
 */
export class StreamedFile {
  private offset = 0
  private readonly places: Place[] = []
  private readonly context: PDFContext

  constructor(private readonly pdf: PDFDocument) {
    this.context = pdf.context
  }

  /** The first bytes of the file. */
  begin(): Uint8Array {
    return this.counted(Buffer.from('%PDF-1.7\n%\u00e2\u00e3\u00cf\u00d3\n\n', 'latin1'))
  }

  /** All objects that are finished, as the next bytes of the file. They cannot be changed any more. */
  finished(): Uint8Array[] {
    const growing = new Set<PDFRef | undefined>([this.context.trailerInfo.Root as PDFRef, this.context.trailerInfo.Info as PDFRef, this.pdf.catalog.get(PDFName.of('Pages')) as PDFRef])
    return this.written(this.context.enumerateIndirectObjects().filter(([ref, object]) => !growing.has(ref) && !(object instanceof PDFPageLeaf)))
  }

  /** The rest of the objects and the end of the file. */
  end(): Uint8Array[] {
    const rest = this.written(this.context.enumerateIndirectObjects())
    const start = this.offset
    return [...rest, ...partsOf(this.context.nextRef(), packedByNode(this.table(start))), Buffer.from(`startxref\n${start}\n%%EOF\n`, 'latin1')]
  }

  /** Where every object lies, in the order of their numbers; the table itself, numbered last, lies at `start`. */
  private table(start: number): PDFCrossRefStream {
    const { Root, Info } = this.context.trailerInfo
    const table = PDFCrossRefStream.create(this.context.obj({ Size: this.context.largestObjectNumber + 1, Root, Info }), false)
    for (const { ref, at, group } of this.places.sort((a, b) => a.ref.objectNumber - b.ref.objectNumber)) {
      if (group) table.addCompressedEntry(ref, group, at)
      else table.addUncompressedEntry(ref, at)
    }
    table.addUncompressedEntry(PDFRef.of(this.context.largestObjectNumber), start)
    return table
  }

  private written(objects: readonly [PDFRef, PDFObject][]): Uint8Array[] {
    const alone = objects.filter(([, object]) => object instanceof PDFStream)
    const small = objects.filter(([, object]) => !(object instanceof PDFStream))
    const parts = alone.flatMap(([ref, object]) => this.place(ref, object))
    for (let from = 0; from < small.length; from += together) {
      const group = small.slice(from, from + together)
      const ref = this.context.nextRef()
      group.forEach(([member], k) => this.places.push({ ref: member, at: k, group: ref }))
      parts.push(...this.place(ref, packedByNode(PDFObjectStream.withContextAndObjects(this.context, group, false))))
    }
    for (const [ref] of objects) this.context.delete(ref)
    return parts
  }

  private place(ref: PDFRef, object: PDFObject): Uint8Array[] {
    this.places.push({ ref, at: this.offset, group: null })
    return partsOf(ref, object).map((part) => this.counted(part))
  }

  private counted(bytes: Uint8Array): Uint8Array {
    this.offset += bytes.length
    return bytes
  }
}

/** The library's own packer is several times as slow as Node's. */
function packedByNode(plain: PDFObjectStream | PDFCrossRefStream): PDFRawStream {
  plain.updateDict()
  const bytes = deflated(plain.getUnencodedContents())
  plain.dict.set(PDFName.of('Filter'), PDFName.of('FlateDecode'))
  return PDFRawStream.of(plain.dict, bytes)
}

function partsOf(ref: PDFRef, object: PDFObject): Uint8Array[] {
  const head = `${ref.objectNumber} ${ref.generationNumber} obj\n`
  const tail = '\nendobj\n\n'
  if (object instanceof PDFRawStream) {
    const { contents } = object
    object.dict.set(PDFName.of('Length'), PDFNumber.of(contents.length))
    // Handed on as it is: the library would copy a stream byte by byte.
    return [Buffer.from(`${head}${object.dict.toString()}\nstream\n`, 'latin1'), contents, Buffer.from(`\nendstream${tail}`, 'latin1')]
  }
  const bytes = Buffer.alloc(object.sizeInBytes())
  object.copyBytesInto(bytes, 0)
  return [Buffer.from(head, 'latin1'), bytes, Buffer.from(tail, 'latin1')]
}
