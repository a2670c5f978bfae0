import { deflateSync } from 'node:zlib'
import { PDFName, PDFRawStream, type PDFDocument } from 'pdf-lib'
import { toPixels, type Homography } from '@/lib/core/paper-space'

/** Pixels row after row, grey or red, green, blue. */
type Picture = Readonly<{ width: number; height: number; channels: 1 | 3; data: Uint8Array }>
/** Pixels a point where nothing says how large the sheet was. */
const plain = 200 / 72

/** Adds a page that is a picture, pixel for pixel, in the size of the sheet that it shows. */
export function addDecodedPage(pdf: PDFDocument, { width, height, channels, data }: Picture, homography: Homography | null): void {
  const scale = homography ? pixelsAPoint(homography) : plain
  const [w, h] = [width / scale, height / scale].map((n) => Math.round(n * 100) / 100) as [number, number]
  const bytes = deflateSync(data)
  const image = pdf.context.register(PDFRawStream.of(pdf.context.obj({
    Type: 'XObject', Subtype: 'Image', Width: width, Height: height, BitsPerComponent: 8, ColorSpace: channels === 3 ? 'DeviceRGB' : 'DeviceGray', Filter: 'FlateDecode', Length: bytes.length,
  }), bytes))
  const page = pdf.addPage([w, h])
  const content = Buffer.from(`q ${w} 0 0 ${h} 0 0 cm /Page Do Q`, 'latin1')
  page.node.set(PDFName.of('Resources'), pdf.context.obj({ XObject: { Page: image } }))
  page.node.set(PDFName.of('Contents'), pdf.context.register(PDFRawStream.of(pdf.context.obj({ Length: content.length }), content)))
}

function pixelsAPoint(homography: Homography): number {
  const [from, right, down] = [{ x: 200, y: 300 }, { x: 300, y: 300 }, { x: 200, y: 400 }].map((point) => toPixels(homography, point)) as [{ x: number; y: number }, { x: number; y: number }, { x: number; y: number }]
  return Math.sqrt((Math.hypot(right.x - from.x, right.y - from.y) * Math.hypot(down.x - from.x, down.y - from.y)) / 10_000)
}
