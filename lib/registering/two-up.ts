import type { BlankPage } from '@/lib/core/grey-picture'
import type { ImagePart, PageImage } from '@/lib/core/leaf'

/** Parts of an image that may be a page each, first left (or upper) as stored; `plain` when the sheet's size says so, not its shape alone. */
export type Halves = Readonly<{ parts: readonly [ImagePart, ImagePart]; dpiX: number; dpiY: number; plain: boolean }>

/** Halves reach over the middle by so much of their width: a sheet never lies quite straight on the glass. */
const overlap = 0.06
/** By how much a scan's proportions may differ from those of two pages side by side. */
const slack = 0.09

/**
 * Where two pages lie when a scan shows them side by side: its long side is two short sides of the paper, its short side one long
 * one. Null when the shape is another, or when the sheet is no larger than one page. Only a guess: the print of each half has to prove it.
 */
export function halvesOf(image: PageImage, paper: readonly BlankPage[]): Halves | null {
  const found = paper.map((page) => halvesFor(image, page))
  // With papers of several sizes a sheet as large as one page of the larger is a single leaf first.
  const single = paper.some((page) => isSingle(image, page))
  const first = found.find((halves) => halves?.plain) ?? found.find((halves) => halves !== null) ?? null
  return first && single ? { ...first, plain: false } : first
}

function isSingle(image: PageImage, { widthPoints, heightPoints }: BlankPage): boolean {
  const sides = [image.width / image.dpiX, image.height / image.dpiY].sort((a, b) => a - b) as [number, number]
  const page = [widthPoints / 72, heightPoints / 72].sort((a, b) => a - b) as [number, number]
  return near(sides[0], page[0]) && near(sides[1], page[1])
}

function halvesFor(image: PageImage, page: BlankPage): Halves | null {
  const long = Math.max(page.widthPoints, page.heightPoints) / 72
  const short = Math.min(page.widthPoints, page.heightPoints) / 72
  const across = image.width / image.dpiX >= image.height / image.dpiY
  const [L, S] = across ? [image.width / image.dpiX, image.height / image.dpiY] : [image.height / image.dpiY, image.width / image.dpiX]
  if (Math.abs(Math.log(L / S / ((2 * short) / long))) > slack) return null
  const plain = near(L, 2 * short) && near(S, long)
  if (!plain && near(L, long)) return null
  // A file that lies about its size is taken to show two pages from edge to edge.
  const by = plain ? 1 : Math.max(L / (2 * short), S / long)
  return { parts: cut(image.width, image.height, across), dpiX: image.dpiX * by, dpiY: image.dpiY * by, plain }
}

function near(said: number, should: number): boolean {
  return said > 0.86 * should && said < 1.16 * should
}

function cut(width: number, height: number, across: boolean): [ImagePart, ImagePart] {
  const [along, other] = across ? [width, height] : [height, width]
  const size = Math.min(along, Math.round((along / 2) * (1 + overlap)))
  const box = (from: number): ImagePart => (across ? { x: from, y: 0, w: size, h: other } : { x: 0, y: from, w: other, h: size })
  return [box(0), box(along - size)]
}
