import { deflateSync } from 'node:zlib'
import { PDFHexString, PDFRawStream, PDFString, type PDFContext, type PDFRef } from 'pdf-lib'

/** A number as PDF writes it: no exponent, a thousandth of a point is enough. */
export function num(value: number): string {
  return String(Math.round(value * 1000) / 1000 || 0)
}

/** A place on a page as PDF writes it: a hundredth of a point is finer than any printer. */
export function place(value: number): string {
  return String(Math.round(value * 100) / 100 || 0)
}

/** Words as a PDF string, in the shorter of its two ways. */
export function textString(words: string): PDFString | PDFHexString {
  return /^[\x20-\x7e]*$/.test(words) && !/[()\\]/.test(words) ? PDFString.of(words) : PDFHexString.fromText(words)
}

/** Sets a colour given as #RRGGBB for filling, for lines, or for both. */
export function colour(hex: string, use: 'fill' | 'line' | 'both'): string {
  const parts = [1, 3, 5].map((at) => num(parseInt(hex.slice(at, at + 2), 16) / 255)).join(' ')
  return [use === 'line' ? '' : `${parts} rg`, use === 'fill' ? '' : `${parts} RG`].join(' ').trim()
}

/** Shows type that reads as other text than its glyphs say; null where they say it. */
export function actualText(text: string | null, shown: string): string {
  return text === null ? shown : `/Span <</ActualText ${textString(text).toString()}>> BDC ${shown} EMC`
}

/** Lets a file pack all its streams with Node's own packer: several times as fast as the library's. */
export function packWithNode(context: PDFContext): void {
  context.flateStream = (contents, dict = {}) => {
    const bytes = deflated(typeof contents === 'string' ? Buffer.from(contents, 'latin1') : contents)
    return PDFRawStream.of(context.obj({ ...dict, Filter: 'FlateDecode', Length: bytes.length }), bytes)
  }
}

/** Operators packed small. */
export function pack(operators: string): Uint8Array {
  return deflated(Buffer.from(operators, 'latin1'))
}

/** Packs small things in a small window: making room for a large one takes longer than the packing. */
export function deflated(bytes: Uint8Array): Uint8Array {
  return deflateSync(bytes, { level: 9, windowBits: bytes.length < 4096 ? 12 : 15, memLevel: bytes.length < 4096 ? 6 : 8 })
}

/** Puts operators into the file as a packed stream. */
export function packed(context: PDFContext, operators: string): PDFRef {
  // A few letters get no smaller.
  if (operators.length < 80) return context.register(PDFRawStream.of(context.obj({ Length: operators.length }), Buffer.from(operators, 'latin1')))
  const bytes = pack(operators)
  return context.register(PDFRawStream.of(context.obj({ Filter: 'FlateDecode', Length: bytes.length }), bytes))
}

/** Operators as a form that draws in the space round it: its box is where it lies, and nothing moves or stretches it. */
export function packedForm(context: PDFContext, operators: string, box: readonly number[], resources: PDFRef): PDFRef {
  const bytes = pack(operators)
  return context.register(PDFRawStream.of(context.obj({ Type: 'XObject', Subtype: 'Form', BBox: [...box], Resources: resources, Filter: 'FlateDecode', Length: bytes.length }), bytes))
}
