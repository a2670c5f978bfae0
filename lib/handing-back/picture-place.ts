import { PDFArray, PDFDict, PDFName, PDFNumber, PDFRawStream, type PDFPage } from 'pdf-lib'
import { compose, type Homography } from '@/lib/core/paper-space'
import { readContent, type Operation } from './content-reader'
import { decoded } from './own-resources'

/** An image drawn on a page: its size in pixels, and what takes its unit square to the page's user space. */
type Placed = Readonly<{ width: number; height: number; matrix: Homography }>
/** Pixels of a page's stored image. */
export type ImageSize = Readonly<{ width: number; height: number }>
/** A page's shown box in its user space, y up. */
export type PageBox = Readonly<{ x: number; y: number; w: number; h: number }>

const still: Homography = [[1, 0, 0], [0, 1, 0], [0, 0, 1]]

/**
 * What takes pixels of a page's stored image to the page's user space. Where one image of just these pixels lies on the page, that is
 * where its matrix puts it, turned or not. Otherwise the stored image is the page itself before its /Rotate.
 */
export function pixelsToPage(page: PDFPage, content: Uint8Array, size: ImageSize): Homography {
  const placed = placedImages(content, page.node.Resources(), still, 0)
  const only = placed.length === 1 ? placed[0]! : null
  if (only && only.width === size.width && only.height === size.height) return compose(only.matrix, unitSquare(size))
  const box = pageBox(page)
  return compose([[box.w, 0, box.x], [0, box.h, box.y], [0, 0, 1]], unitSquare(size))
}

/** Pixels, y down, to the unit square that PDF draws an image in, y up. */
function unitSquare({ width, height }: ImageSize): Homography {
  return [[1 / width, 0, 0], [0, -1 / height, 1], [0, 0, 1]]
}

/** The crop box within the media box: what is shown of a page. */
export function pageBox(page: PDFPage): PageBox {
  const media = page.getMediaBox()
  const crop = page.getCropBox()
  const x = Math.max(media.x, crop.x)
  const y = Math.max(media.y, crop.y)
  const w = Math.min(media.x + media.width, crop.x + crop.width) - x
  const h = Math.min(media.y + media.height, crop.y + crop.height) - y
  return w > 0 && h > 0 ? { x, y, w, h } : { x: media.x, y: media.y, w: media.width, h: media.height }
}

/** Images in drawing order, also those inside forms. Depth is bounded: a form may name itself. */
function placedImages(content: Uint8Array, resources: PDFDict | undefined, start: Homography, depth: number): Placed[] {
  const objects = resources?.lookup(PDFName.of('XObject'))
  const placed: Placed[] = []
  const kept: Homography[] = []
  let matrix = start
  for (const { operator, operands } of readContent(content)) {
    if (operator === 'q') kept.push(matrix)
    else if (operator === 'Q') matrix = kept.pop() ?? start
    else if (operator === 'cm') matrix = compose(matrix, matrixOf(operands))
    else if (operator === 'BI') placed.push({ width: 0, height: 0, matrix })
    else if (operator === 'Do' && objects instanceof PDFDict) placed.push(...drawn(objects, operands, resources, matrix, depth))
  }
  return placed
}

function drawn(objects: PDFDict, operands: Operation['operands'], around: PDFDict | undefined, matrix: Homography, depth: number): Placed[] {
  const name = operands.at(-1)
  const object = name !== null && typeof name === 'object' ? objects.lookup(PDFName.of(name.name)) : undefined
  if (!(object instanceof PDFRawStream)) return []
  const { dict } = object
  if (dict.lookup(PDFName.of('Subtype')) === PDFName.of('Image')) return [{ width: numberIn(dict, 'Width'), height: numberIn(dict, 'Height'), matrix }]
  if (dict.lookup(PDFName.of('Subtype')) !== PDFName.of('Form') || depth > 8) return []
  const own = dict.lookup(PDFName.of('Matrix'))
  const inside = own instanceof PDFArray ? compose(matrix, matrixOf(own.asArray().map((n) => (n instanceof PDFNumber ? n.asNumber() : 0)))) : matrix
  const resources = dict.lookup(PDFName.of('Resources'))
  return placedImages(decoded(object), resources instanceof PDFDict ? resources : around, inside, depth + 1)
}

function matrixOf(operands: Operation['operands']): Homography {
  const [a, b, c, d, e, f] = operands.slice(-6).map((operand) => (typeof operand === 'number' ? operand : 0)) as [number, number, number, number, number, number]
  return [[a, c, e], [b, d, f], [0, 0, 1]]
}

function numberIn(dict: PDFDict, key: string): number {
  const value = dict.lookup(PDFName.of(key))
  return value instanceof PDFNumber ? value.asNumber() : 0
}
