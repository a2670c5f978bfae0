import { Malformed, type PdfDict, type PdfValue } from './value'

/** Where an object lies: at a byte of the file, or as the so-manieth of an object stream. */
export type Place = Readonly<{ at: number; generation: number }> | Readonly<{ inside: number; nth: number }>

const mostObjects = 1_000_000

/** Where every object lies, and the trailer. What is set first holds: tables are read from the newest back. */
export class XrefTable {
  readonly places = new Map<number, Place | null>()
  private readonly entries = new Map<string, PdfValue>()

  set(number: number, place: Place | null): void {
    if (this.places.has(number)) return
    if (this.places.size >= mostObjects) throw new Malformed('too many objects')
    this.places.set(number, place)
  }

  /** For tables made by going through the file, where the last one holds. */
  replace(number: number, place: Place): void {
    this.places.delete(number)
    this.set(number, place)
  }

  addTrailer(trailer: PdfDict): void {
    for (const [key, value] of trailer) if (!this.entries.has(key)) this.entries.set(key, value)
  }

  get trailer(): PdfDict {
    return this.entries
  }
}
