import type { GreyPicture } from '@/lib/core/grey-picture'
import type { PageImage } from '@/lib/core/leaf'
import type { Turn } from '@/lib/core/paper-space'
import { chain, identity, undo, type Affine } from './affine'
import { withFloats, type Pdfium } from './pdfium'
import { covers, imageFrame, pageFrame, type PageBox, type StoredFrame } from './stored-frame'

type PlacedImage = Readonly<{ matrix: Affine; width: number; height: number }>
const bgra = 4
const imageObject = 3
const formObject = 5
const forPrinting = 0x800
/** Density for pages without an image of their own. */
const plainDpi = 200

/** The shown box of a loaded page and its /Rotate. */
export function boxOf(engine: Pdfium, page: number): PageBox {
  const [left, top, right, bottom] = withFloats(engine, [0, 0, 0, 0], (at, read) => {
    engine._FPDF_GetPageBoundingBox(page, at)
    return read() as [number, number, number, number]
  })
  const turn = (engine._FPDFPage_GetRotation(page) * 90) as Turn
  return { left, bottom, width: right - left, height: top - bottom, turn }
}

/** The stored-image frame of a page that is drawn: that of the sharpest image that covers it, else the page before its /Rotate. */
export function frameOf(engine: Pdfium, page: number, box: PageBox): Readonly<{ frame: StoredFrame; hasImages: boolean }> {
  const images = imagesOn(engine, page)
  const whole = images
    .filter((image) => covers(box, image.matrix))
    .map((image) => imageFrame(box, image.matrix, image.width, image.height))
    .filter((frame) => frame !== null)
    .sort((a, b) => b.width * b.height - a.width * a.height)[0]
  const hasImages = images.length > 0
  if (whole && whole.dpiX >= 50) return { frame: whole, hasImages }
  const density = images
    .filter(({ matrix: [a, b, c, d] }) => Math.abs(a * d - b * c) > 0.02 * box.width * box.height)
    .map(({ matrix: [a, b], width }) => (72 * width) / Math.hypot(a, b))
  return { frame: pageFrame(box, density.length ? Math.min(400, Math.max(100, ...density)) : plainDpi), hasImages }
}

function imagesOn(engine: Pdfium, page: number): PlacedImage[] {
  const found: PlacedImage[] = []
  eachImage(engine, page, (object, matrix) => found.push({ matrix, ...pixelSize(engine, object) }))
  return found
}

/** Whether each image of a page can be decoded: one that cannot leaves its place white. */
export function everyImageDecodes(engine: Pdfium, page: number): boolean {
  let all = true
  eachImage(engine, page, (object) => {
    const bitmap = engine._FPDFImageObj_GetBitmap(object)
    if (bitmap) engine._FPDFBitmap_Destroy(bitmap)
    else all = false
  })
  return all
}

function eachImage(engine: Pdfium, page: number, work: (object: number, matrix: Affine) => void): void {
  const look = (object: number, outer: Affine, depth: number): void => {
    const type = engine._FPDFPageObj_GetType(object)
    if (type !== imageObject && type !== formObject) return
    const own = withFloats(engine, [...identity], (at, read) => (engine._FPDFPageObj_GetMatrix(object, at) ? (read() as unknown as Affine) : identity))
    const matrix = chain(own, outer)
    if (type === imageObject) work(object, matrix)
    else if (depth < 5) for (let k = 0; k < Math.min(engine._FPDFFormObj_CountObjects(object), 500); k++) look(engine._FPDFFormObj_GetObject(object, k), matrix, depth + 1)
  }
  for (let k = 0; k < Math.min(engine._FPDFPage_CountObjects(page), 2000); k++) look(engine._FPDFPage_GetObject(page, k), identity, 0)
}

function pixelSize(engine: Pdfium, object: number): { width: number; height: number } {
  const at = engine.wasmExports.malloc(8)
  engine._FPDFImageObj_GetImagePixelSize(object, at, at + 4)
  const view = new DataView(engine.HEAPU8.buffer, at, 8)
  const size = { width: view.getUint32(0, true), height: view.getUint32(4, true) }
  engine.wasmExports.free(at)
  return size
}

/** User space -> the picture the engine draws at one pixel a point, /Rotate applied, y down. */
function display({ left, bottom, width, height, turn }: PageBox): Affine {
  if (turn === 90) return [0, 1, 1, 0, -bottom, -left]
  if (turn === 180) return [-1, 0, 0, 1, left + width, -bottom]
  if (turn === 270) return [0, -1, -1, 0, bottom + height, left + width]
  return [1, 0, 0, -1, -left, bottom + height]
}

/** Draws a loaded page into a frame, in colour (three bytes a pixel) or grey. White where nothing is. */
export function drawPage(engine: Pdfium, page: number, box: PageBox, frame: StoredFrame, channels: 1 | 3): GreyPicture {
  const { width, height } = frame
  const back = undo(display(box))!
  const matrix = chain(back, frame.toPixels)
  const size = width * height * 4
  const pixels = engine.wasmExports.malloc(size)
  if (!pixels) throw new Error('no memory for a page picture')
  const bitmap = engine._FPDFBitmap_CreateEx(width, height, bgra, pixels, width * 4)
  engine._FPDFBitmap_FillRect(bitmap, 0, 0, width, height, 0xffffffff)
  withFloats(engine, matrix, (m) => withFloats(engine, [0, 0, width, height], (clip) => engine._FPDF_RenderPageBitmapWithMatrix(bitmap, page, m, clip, forPrinting)))
  const data = channels === 1 ? greyOf(engine.HEAPU8.subarray(pixels, pixels + size)) : rgbOf(engine.HEAPU8.subarray(pixels, pixels + size))
  engine._FPDFBitmap_Destroy(bitmap)
  engine.wasmExports.free(pixels)
  return { width, height, data }
}

function greyOf(from: Uint8Array): Uint8Array {
  const to = new Uint8Array(from.length / 4)
  for (let i = 0, j = 0; i < to.length; i++, j += 4) to[i] = (from[j]! * 29 + from[j + 1]! * 150 + from[j + 2]! * 77) >> 8
  return to
}
function rgbOf(from: Uint8Array): Uint8Array {
  const to = new Uint8Array((from.length / 4) * 3)
  for (let i = 0, j = 0; j < from.length; i += 3, j += 4) {
    to[i] = from[j + 2]!
    to[i + 1] = from[j + 1]!
    to[i + 2] = from[j]!
  }
  return to
}

/** What is kept of a rendered page's frame. */
export function renderedImage({ width, height, dpiX, dpiY, shownTurn }: StoredFrame): PageImage {
  return { encoding: 'rendered', width, height, dpiX, dpiY, shownTurn }
}
