import { inflateSync } from 'node:zlib'
import { PDFArray, PDFBool, PDFDict, PDFName, PDFNumber, PDFRawStream, decodePDFRawStream, type PDFObject, type PDFPage } from 'pdf-lib'
import type { Turn } from '@/lib/core/paper-space'
import { drawnImages } from './drawn-images'
import { mostPixels, type SheafPage } from './sheaf-page'
import { covers, imageFrame, type PageBox } from './stored-frame'

type Lifted = Readonly<{ bytes: Uint8Array; encoding: 'jpeg' | 'g4'; inverted: boolean }>

/** Takes the one full-page JPEG or G4 image of a page out untouched. Null when the page is anything else and must be drawn. */
export function liftImage(page: PDFPage, index: number): SheafPage | null {
  const { drawn, otherInk, coloured } = drawnImages(contentOf(page))
  const only = drawn[0]
  if (!only || drawn.length > 1 || otherInk) return null
  const stream = imageNamed(page, only.name)
  if (!stream) return null
  const box = boxOf(page)
  const width = numberAt(stream.dict, 'Width')
  const height = numberAt(stream.dict, 'Height')
  const frame = covers(box, only.matrix) ? imageFrame(box, only.matrix, width, height) : null
  if (!frame || !(width >= 1) || !(height >= 1)) return null
  if (width * height > mostPixels) return { index, image: null, bytes: null, problem: 'page_too_large' }
  const lifted = lift(stream, width, coloured)
  if (!lifted) return null
  const { dpiX, dpiY, shownTurn } = frame
  return { index, image: { encoding: lifted.encoding, width, height, dpiX, dpiY, shownTurn }, bytes: lifted.bytes, inverted: lifted.inverted }
}

function boxOf(page: PDFPage): PageBox {
  const { x, y, width, height } = page.getCropBox()
  return { left: x, bottom: y, width, height, turn: ((((page.getRotation().angle % 360) + 360) % 360) as Turn) }
}

function contentOf(page: PDFPage): Uint8Array {
  const contents = page.node.Contents()
  const parts: Uint8Array[] = []
  const streams = contents instanceof PDFArray ? contents.asArray().map((ref) => page.doc.context.lookup(ref)) : [contents]
  for (const stream of streams) if (stream instanceof PDFRawStream) parts.push(decodePDFRawStream(stream).decode(), new Uint8Array([10]))
  return Buffer.concat(parts)
}

function imageNamed(page: PDFPage, name: string): PDFRawStream | null {
  const objects = page.node.Resources()?.lookupMaybe(PDFName.of('XObject'), PDFDict)
  const stream = objects?.lookup(PDFName.of(name))
  if (!(stream instanceof PDFRawStream)) return null
  return stream.dict.lookup(PDFName.of('Subtype')) === PDFName.of('Image') ? stream : null
}

function lift(stream: PDFRawStream, width: number, coloured: boolean): Lifted | null {
  const { dict } = stream
  if (dict.has(PDFName.of('SMask')) || dict.has(PDFName.of('Mask'))) return null
  const filters = listAt(dict, 'Filter').map((f) => (f instanceof PDFName ? f.decodeText() : ''))
  const last = filters.at(-1)
  if (filters.length > 2 || (filters.length === 2 && filters[0] !== 'FlateDecode')) return null
  const parms = listAt(dict, 'DecodeParms')
  const outer = parms[0]
  if (filters.length === 2 && outer instanceof PDFDict && numberAt(outer, 'Predictor') > 1) return null
  const bytes = filters.length === 2 ? inflateSync(stream.contents) : stream.contents
  const decode = listAt(dict, 'Decode').map((v) => (v instanceof PDFNumber ? v.asNumber() : NaN))
  const flipped = decode.length > 0 && decode[0] === 1
  if (last === 'DCTDecode') return decode.length > 2 && flipped ? null : { bytes, encoding: 'jpeg', inverted: flipped }
  if (last !== 'CCITTFaxDecode') return null
  const own = parms[filters.length - 1]
  return own instanceof PDFDict && plainG4(dict, own, width, coloured) ? { bytes, encoding: 'g4', inverted: boolAt(own, 'BlackIs1') !== flipped } : null
}

/** G4 of the image's own width, black on white: grey by itself, or a stencil painted in the colour a page starts with. */
function plainG4(image: PDFDict, parms: PDFDict, width: number, coloured: boolean): boolean {
  const grey = ['DeviceGray', 'CalGray', 'G'].includes(nameAt(image, 'ColorSpace')) || (boolAt(image, 'ImageMask') && !coloured)
  const columns = parms.has(PDFName.of('Columns')) ? numberAt(parms, 'Columns') : 1728
  return grey && numberAt(parms, 'K') < 0 && columns === width && !boolAt(parms, 'EncodedByteAlign')
}

function numberAt(dict: PDFDict, key: string): number {
  const value = dict.lookup(PDFName.of(key))
  return value instanceof PDFNumber ? value.asNumber() : 0
}
function boolAt(dict: PDFDict, key: string): boolean {
  return dict.lookup(PDFName.of(key)) === PDFBool.True
}
function nameAt(dict: PDFDict, key: string): string {
  let value = dict.lookup(PDFName.of(key))
  if (value instanceof PDFArray) value = value.lookup(0)
  return value instanceof PDFName ? value.decodeText() : ''
}
function listAt(dict: PDFDict, key: string): (PDFObject | undefined)[] {
  const value = dict.lookup(PDFName.of(key))
  if (value instanceof PDFArray) return value.asArray().map((item) => dict.context.lookup(item))
  return value ? [value] : []
}
