import { deflateSync } from 'node:zlib'
import { PDFHexString, PDFRawStream, type PDFContext, type PDFRef } from 'pdf-lib'

/** A number as PDF writes it: no exponent, a thousandth of a point is enough. */
export function num(value: number): string {
  return String(Math.round(value * 1000) / 1000 || 0)
}

/** Sets a colour given as #RRGGBB for filling, for lines, or for both. */
export function colour(hex: string, use: 'fill' | 'line' | 'both'): string {
  const parts = [1, 3, 5].map((at) => num(parseInt(hex.slice(at, at + 2), 16) / 255)).join(' ')
  return [use === 'line' ? '' : `${parts} rg`, use === 'fill' ? '' : `${parts} RG`].join(' ').trim()
}

/** Shows type that reads as other text than its glyphs say; null where they say it. */
export function actualText(text: string | null, shown: string): string {
  return text === null ? shown : `/Span <</ActualText ${PDFHexString.fromText(text).toString()}>> BDC ${shown} EMC`
}

/** Puts operators into the file as a packed stream. Node's own packer: several times as fast as pdf-lib's. */
export function packed(context: PDFContext, operators: string): PDFRef {
  const bytes = deflateSync(Buffer.from(operators, 'latin1'))
  return context.register(PDFRawStream.of(context.obj({ Filter: 'FlateDecode', Length: bytes.length }), bytes))
}

/** Operators as a form that draws in the space round it: its box is where it lies, and nothing moves or stretches it. */
export function packedForm(context: PDFContext, operators: string, box: readonly number[], fonts: PDFRef): PDFRef {
  const bytes = deflateSync(Buffer.from(operators, 'latin1'))
  return context.register(PDFRawStream.of(context.obj({ Type: 'XObject', Subtype: 'Form', BBox: [...box], Resources: { Font: fonts }, Filter: 'FlateDecode', Length: bytes.length }), bytes))
}
