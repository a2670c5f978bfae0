import { jpegHead } from './jpeg-head'
import type { PdfFile } from './pdf/pdf-file'
import { PdfStream } from './pdf/value'

/** The pixels that an image takes to decode: what its dictionary says, its own code stream if that says more, or its mask. */
export function imagePixels(pdf: PdfFile, image: PdfStream): number {
  const { dict } = image
  const filters = pdf.filters(dict)
  const inside = filters.length === 1 ? codedPixels(filters[0]!.name, pdf, image) : 0
  const masks = ['SMask', 'Mask'].map((key) => pdf.get(dict.get(key))).filter((mask) => mask instanceof PdfStream && mask !== image)
  return Math.max(saidPixels(pdf, image), inside, ...masks.map((mask) => saidPixels(pdf, mask as PdfStream)))
}

function saidPixels(pdf: PdfFile, { dict }: PdfStream): number {
  return Math.max(0, pdf.number(dict.get('Width')) ?? 0) * Math.max(0, pdf.number(dict.get('Height')) ?? 0)
}

function codedPixels(filter: string, pdf: PdfFile, image: PdfStream): number {
  if (filter === 'JPXDecode') return jpxPixels(Buffer.from(pdf.coded(image).subarray(0, 4096)))
  const head = filter === 'DCTDecode' ? jpegHead(pdf.coded(image)) : null
  return head ? head.width * head.height : 0
}

/** The size in a JPEG 2000 code stream's SIZ marker. */
function jpxPixels(head: Buffer): number {
  const at = head.indexOf(Buffer.from([0xff, 0x4f, 0xff, 0x51]))
  if (at < 0 || at + 24 > head.length) return 0
  const [x1, y1, x0, y0] = [8, 12, 16, 20].map((k) => head.readUInt32BE(at + k)) as [number, number, number, number]
  return Math.max(0, x1 - x0) * Math.max(0, y1 - y0)
}
