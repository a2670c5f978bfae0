import { AppError } from '@/lib/core/errors'
import { decipherOf, type Decipher } from './decipher'
import { decodeFilters, filtersOf } from './decode-filters'
import type { FileWindow } from './file-window'
import { readObject } from './read-object'
import { readXref } from './read-xref'
import { scanObjects } from './scan-objects'
import { Malformed, PdfRef, PdfStream, TooLarge, isDict, isList, type PdfDict, type PdfValue } from './value'
import { ValueParser } from './value-parser'
import { XrefTable, type Place } from './xref-table'

const mostKept = 4000
const mostObjectStream = 32 << 20
/** No stream of one page may be longer than this, coded: A3 at 600 dpi in three colours, not coded at all, is 200 MB. */
const mostStream = 256 << 20
const deepest = 32

type OpenedStream = Readonly<{ bytes: Uint8Array; numbers: readonly number[]; starts: readonly number[] }>

/**
 * The objects of a PDF, read from the file one by one as they are asked for. Where the file's own table fails, the file is
 * gone through once and its objects are found by themselves.
 */
export class PdfFile {
  private table: XrefTable
  private scanned: XrefTable | null = null
  private decipher: Decipher | null = null
  private readonly kept = new Map<number, PdfValue>()
  private readonly opened = new Map<number, OpenedStream>()
  private readonly inWork = new Set<number>()

  /** Throws file_encrypted when the file asks for a password. */
  constructor(readonly file: FileWindow) {
    try {
      this.table = readXref(file)
    } catch (error) {
      if (!isFault(error)) throw error
      this.table = this.scan()
    }
    this.decipher = this.decipherer()
    this.kept.clear()
  }

  get trailer(): PdfDict {
    return this.table.trailer
  }

  /** Takes the objects found by going through the file for all that follows. False when that was done already. */
  rebuild(): boolean {
    if (this.table === this.scanned) return false
    this.table = this.scan()
    this.decipher ??= this.decipherer()
    this.kept.clear()
    this.opened.clear()
    return true
  }

  /** The numbers of all objects, in the order of the file where it was gone through. */
  numbers(): Iterable<number> {
    return this.table.places.keys()
  }

  /** A value itself, whatever references lead to it; null for what is not there. Never throws for what the file holds. */
  get(value: PdfValue | undefined): PdfValue {
    let found: PdfValue = value ?? null
    for (let k = 0; found instanceof PdfRef; k++) found = k < deepest ? this.object(found.number) : null
    return found
  }

  dict(value: PdfValue | undefined): PdfDict | null {
    const found = this.get(value)
    return isDict(found) ? found : found instanceof PdfStream ? found.dict : null
  }

  list(value: PdfValue | undefined): readonly PdfValue[] {
    const found = this.get(value)
    return isList(found) ? found : []
  }

  number(value: PdfValue | undefined): number | null {
    const found = this.get(value)
    return typeof found === 'number' ? found : null
  }

  name(value: PdfValue | undefined): string {
    const found = this.get(value)
    return typeof found === 'string' ? found : ''
  }

  /** A stream's coded bytes, deciphered. Throws TooLarge. */
  coded(stream: PdfStream): Uint8Array {
    if (stream.length > mostStream) throw new TooLarge('stream')
    const bytes = this.file.read(stream.at, stream.length)
    return this.decipher && stream.dict.get('Type') !== 'XRef' ? this.decipher.stream(bytes, stream.number, stream.generation) : bytes
  }

  /** A stream's bytes with all filters undone. Throws TooLarge, Malformed. */
  decoded(stream: PdfStream, most: number): Uint8Array {
    return decodeFilters(this.coded(stream), this.filters(stream.dict), most)
  }

  filters(dict: PdfDict): ReturnType<typeof filtersOf> {
    return filtersOf(dict, (value) => this.get(value))
  }

  private object(number: number): PdfValue {
    const known = this.kept.get(number)
    if (known !== undefined) return known
    // an object that needs itself to be read is none
    if (this.inWork.has(number)) return null
    this.inWork.add(number)
    try {
      const value = this.readAnyWay(number)
      if (this.kept.size >= mostKept) this.kept.clear()
      this.kept.set(number, value)
      return value
    } finally {
      this.inWork.delete(number)
    }
  }

  private readAnyWay(number: number): PdfValue {
    const place = this.table.places.get(number)
    if (!place) return null
    try {
      return this.readFrom(place, number)
    } catch (error) {
      if (!isFault(error)) throw error
    }
    const other = this.table === this.scanned ? null : this.scan().places.get(number)
    if (!other) return null
    try {
      return this.readFrom(other, number)
    } catch (error) {
      if (!isFault(error)) throw error
      return null
    }
  }

  private readFrom(place: Place, number: number): PdfValue {
    if ('inside' in place) return this.fromObjectStream(place.inside, number)
    const found = readObject(this.file, place.at, { length: (ref) => this.get(ref), ...(this.decipher ? { clear: this.decipher.string } : {}) })
    if (found.number !== number) throw new Malformed('another object')
    return found.value
  }

  private fromObjectStream(holder: number, number: number): PdfValue {
    const { bytes, numbers, starts } = this.openObjectStream(holder)
    const nth = numbers.indexOf(number)
    if (nth < 0) throw new Malformed('not in its stream')
    return new ValueParser(bytes, starts[nth]).value()
  }

  private openObjectStream(holder: number): OpenedStream {
    const known = this.opened.get(holder)
    if (known) return known
    const place = this.table.places.get(holder) ?? this.scanned?.places.get(holder)
    const stream = place && 'at' in place ? this.object(holder) : null
    if (!(stream instanceof PdfStream)) throw new Malformed('no object stream')
    const first = this.number(stream.dict.get('First')) ?? 0
    const count = Math.min(this.number(stream.dict.get('N')) ?? 0, 100_000)
    const bytes = Buffer.concat([this.decoded(stream, mostObjectStream), Buffer.from('\n')])
    const parser = new ValueParser(bytes)
    const [numbers, starts]: [number[], number[]] = [[], []]
    for (let k = 0; k < count && parser.at < first; k++) {
      numbers.push(parser.whole())
      starts.push(first + parser.whole())
    }
    if (this.opened.size >= 4) this.opened.delete(this.opened.keys().next().value!)
    const opened = { bytes, numbers, starts }
    this.opened.set(holder, opened)
    return opened
  }

  private scan(): XrefTable {
    if (this.scanned) return this.scanned
    const { table, objectStreams } = scanObjects(this.file)
    const before = this.table
    this.scanned = table
    this.table = table
    if (!this.decipher && table.trailer.has('Encrypt')) this.decipher = this.decipherer()
    this.kept.clear()
    for (const holder of objectStreams) {
      try {
        for (const [nth, number] of this.openObjectStream(holder).numbers.entries()) if (!table.places.has(number)) table.set(number, { inside: holder, nth })
      } catch (error) {
        if (!isFault(error)) throw error
      }
    }
    if (before) this.table = before
    return table
  }

  private decipherer(): Decipher | null {
    const encrypt = this.dict(this.trailer.get('Encrypt'))
    if (!encrypt) return null
    const [id] = this.list(this.trailer.get('ID'))
    const first = this.get(id)
    const decipher = decipherOf(this.flat(encrypt, 0), first instanceof Uint8Array ? first : new Uint8Array())
    if (!decipher) throw new AppError('file_encrypted')
    return decipher
  }

  private flat(dict: PdfDict, depth: number): PdfDict {
    return new Map([...dict].map(([key, value]) => {
      const found = this.get(value)
      return [key, isDict(found) && depth < 4 ? this.flat(found, depth + 1) : found]
    }))
  }
}

/** What a file's contents may do to its reader; anything else is a bug. */
export function isFault(error: unknown): boolean {
  return error instanceof Malformed || error instanceof TooLarge
}
