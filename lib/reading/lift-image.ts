import type { PageImage } from '@/lib/core/leaf'
import { drawnImages } from './drawn-images'
import { jbig2Mmr } from './jbig2-mmr'
import { jpegHead } from './jpeg-head'
import { contentOf, type PageSource } from './page-source'
import { decodeFilters, type Filter } from './pdf/decode-filters'
import type { PdfFile } from './pdf/pdf-file'
import { PdfStream, type PdfDict } from './pdf/value'
import { mostPixels, type LiftedImage } from './sheaf-page'
import { covers, imageFrame } from './stored-frame'

const leastDpi = 50
const mostCoded = 256 << 20
type Coded = Pick<LiftedImage, 'bytes' | 'inverted'> & { encoding: PageImage['encoding']; width: number; height: number }

/** Takes the one full-page JPEG or G4 image of a page out untouched. Null when the page is anything else and must be drawn. Throws what reading streams throws. */
export function liftImage(source: PageSource): LiftedImage | 'too_large' | null {
  const { pdf, resources, box } = source
  const { drawn, otherInk, coloured } = drawnImages(contentOf(source))
  const only = drawn[0]
  if (!only || drawn.length > 1 || otherInk || !covers(box, only.matrix)) return null
  const stream = pdf.get(pdf.dict(resources.get('XObject'))?.get(only.name))
  if (!(stream instanceof PdfStream) || stream.dict.get('Subtype') !== 'Image') return null
  const width = pdf.number(stream.dict.get('Width')) ?? 0
  const height = pdf.number(stream.dict.get('Height')) ?? 0
  if (!(width >= 1 && height >= 1)) return null
  if (width * height > mostPixels) return 'too_large'
  const coded = codedImage(pdf, stream, width, height, coloured)
  if (coded === null) return null
  if (coded.width * coded.height > mostPixels) return 'too_large'
  const frame = imageFrame(box, only.matrix, coded.width, coded.height)
  if (!frame) return null
  const { dpiX, dpiY, shownTurn } = frame
  // a speck stretched over a page is no scan of it
  if (dpiX < leastDpi || dpiY < leastDpi) return null
  return { image: { encoding: coded.encoding, width: coded.width, height: coded.height, dpiX, dpiY, shownTurn }, bytes: coded.bytes, inverted: coded.inverted, broken: stream.broken }
}

function codedImage(pdf: PdfFile, stream: PdfStream, width: number, height: number, coloured: boolean): Coded | null {
  const { dict } = stream
  if (dict.has('SMask') || dict.has('Mask') || dict.has('SMaskInData')) return null
  const filters = pdf.filters(dict)
  const last = filters.at(-1)
  if (!last || !['DCTDecode', 'CCITTFaxDecode', 'JBIG2Decode'].includes(last.name)) return null
  const decode = pdf.list(dict.get('Decode')).map((value) => pdf.number(value) ?? NaN)
  const flipped = decode[0] === 1 && decode[1] === 0
  if (decode.length > 0 && (decode.length !== 2 || !(flipped || (decode[0] === 0 && decode[1] === 1)))) return null
  if (last.name === 'CCITTFaxDecode' && !plainG4(pdf, dict, last.parms, width, coloured)) return null
  if (last.name === 'JBIG2Decode' && (last.parms?.has('JBIG2Globals') || !isGrey(pdf, dict, coloured))) return null
  const bytes = withoutOuter(pdf.coded(stream), filters)
  if (last.name === 'JBIG2Decode') {
    const g4 = jbig2Mmr(bytes, width, height)
    return g4 && { bytes: g4, encoding: 'g4', inverted: flipped, width, height }
  }
  if (last.name === 'CCITTFaxDecode') return { bytes, encoding: 'g4', inverted: (last.parms?.get('BlackIs1') === true) !== flipped, width, height }
  const head = jpegHead(bytes)
  if (!head || !plainJpeg(pdf, dict, head.components) || last.parms?.has('ColorTransform')) return null
  return { bytes, encoding: 'jpeg', inverted: flipped, width: head.width, height: head.height }
}

/** The picture's own bytes, from under whatever lies around them. */
function withoutOuter(bytes: Uint8Array, filters: readonly Filter[]): Uint8Array {
  return filters.length > 1 ? decodeFilters(bytes, filters.slice(0, -1), mostCoded) : bytes
}

/** Grey or colour as every reader understands it; print colours and palettes are for the PDF engine. */
function plainJpeg(pdf: PdfFile, image: PdfDict, components: number): boolean {
  const space = pdf.get(image.get('ColorSpace'))
  const name = pdf.name(Array.isArray(space) ? space[0] : space)
  return components === 1 ? ['DeviceGray', 'CalGray', 'G', 'ICCBased'].includes(name) : components === 3 && ['DeviceRGB', 'CalRGB', 'RGB', 'ICCBased'].includes(name)
}

/** G4 of the image's own width, black on white. */
function plainG4(pdf: PdfFile, image: PdfDict, parms: PdfDict | null, width: number, coloured: boolean): boolean {
  const k = parms?.get('K')
  const columns = parms?.has('Columns') ? parms.get('Columns') : 1728
  return isGrey(pdf, image, coloured) && typeof k === 'number' && k < 0 && columns === width && parms?.get('EncodedByteAlign') !== true
}

/** Grey by itself, or a stencil painted in the colour a page starts with. */
function isGrey(pdf: PdfFile, image: PdfDict, coloured: boolean): boolean {
  const space = pdf.get(image.get('ColorSpace'))
  const name = pdf.name(Array.isArray(space) ? space[0] : space)
  return ['DeviceGray', 'CalGray', 'G'].includes(name) || (pdf.get(image.get('ImageMask')) === true && !coloured)
}
