import type { GreyPicture } from '@/lib/core/grey-picture'
import type { PageImage } from '@/lib/core/leaf'
import type { PaperRect, PixelPoint } from '@/lib/core/paper-space'
import { codesIn, type FoundCode } from './code-engine'

/** A place where a code was printed, with the size of its page, in points. */
export type CodeWindow = Readonly<{ rect: PaperRect; pageWidth: number; pageHeight: number }>
type Box = Readonly<{ left: number; top: number; width: number; height: number }>

/** A skewed and shifted page carries its code so far from where it should be: 15 mm, in points. */
const astray = (15 * 72) / 25.4
/** After so many places the whole page is quicker. */
const mostPlaces = 8
/** How dense the whole page is looked at first. */
const overview = 110

/**
 * Looks for a wanted code on a leaf: first where codes were printed, the page either way up, then all over the page at a low density,
 * then at the leaf's own. `wanted` says whether a text is one. Null when there is none.
 */
export async function findCode(picture: GreyPicture, { dpiX, dpiY }: Pick<PageImage, 'dpiX' | 'dpiY'>, windows: readonly CodeWindow[], wanted: (text: string) => boolean): Promise<FoundCode | null> {
  for (const box of placesOf(picture, dpiX, dpiY, windows)) {
    const found = (await codesIn(part(picture, box))).find(({ text }) => wanted(text))
    if (found) return moved(found, 1, box.left, box.top)
  }
  const n = Math.floor(Math.min(dpiX, dpiY) / overview)
  if (n >= 2) {
    const found = (await codesIn(shrunk(picture, n))).find(({ text }) => wanted(text))
    if (found) return moved(found, n, 0, 0)
  }
  return (await codesIn(picture)).find(({ text }) => wanted(text)) ?? null
}

/** Where on the leaf a code may be, one box for places that lie close together; the page upright first. */
function placesOf(picture: GreyPicture, dpiX: number, dpiY: number, windows: readonly CodeWindow[]): Box[] {
  const places: Box[] = []
  for (const turned of [false, true])
    for (const window of windows)
      for (const centre of centresOn(picture, dpiX, dpiY, window, turned)) {
        const [w, h] = [((window.rect.w + 2 * astray) * dpiX) / 72, ((window.rect.h + 2 * astray) * dpiY) / 72]
        const seen = places.some((box) => Math.abs(box.left + box.width / 2 - centre.x) < 0.12 * w && Math.abs(box.top + box.height / 2 - centre.y) < 0.12 * h)
        if (!seen) places.push(clipped(picture, { left: centre.x - w / 2, top: centre.y - h / 2, width: w, height: h }))
      }
  return places.filter(({ width, height }) => width > 20 && height > 20).slice(0, mostPlaces)
}

/** The middle of a code's place on a leaf that shows the page from edge to edge, one way up or the other; sideways where the leaf is shaped that way. */
function centresOn({ width, height }: GreyPicture, dpiX: number, dpiY: number, { rect, pageWidth, pageHeight }: CodeWindow, turned: boolean): PixelPoint[] {
  const [x, y] = [rect.x + rect.w / 2 - pageWidth / 2, rect.y + rect.h / 2 - pageHeight / 2]
  const sideways = width / dpiX > height / dpiY !== pageWidth > pageHeight
  const [u, v] = sideways ? [-y, x] : [x, y]
  const sign = turned ? -1 : 1
  return [{ x: width / 2 + (sign * u * dpiX) / 72, y: height / 2 + (sign * v * dpiY) / 72 }]
}

function clipped({ width, height }: GreyPicture, box: Box): Box {
  const left = Math.max(0, Math.round(box.left))
  const top = Math.max(0, Math.round(box.top))
  return { left, top, width: Math.min(width, Math.round(box.left + box.width)) - left, height: Math.min(height, Math.round(box.top + box.height)) - top }
}

function part(picture: GreyPicture, { left, top, width, height }: Box): GreyPicture {
  const data = new Uint8Array(width * height)
  for (let y = 0; y < height; y++) data.set(picture.data.subarray((top + y) * picture.width + left, (top + y) * picture.width + left + width), y * width)
  return { width, height, data }
}

/** Means of n x n pixels. */
function shrunk({ width, height, data }: GreyPicture, n: number): GreyPicture {
  const [w, h] = [Math.floor(width / n), Math.floor(height / n)]
  const out = new Uint8Array(w * h)
  for (let y = 0; y < h; y++)
    for (let x = 0; x < w; x++) {
      let sum = 0
      for (let j = 0; j < n; j++) for (let i = 0; i < n; i++) sum += data[(y * n + j) * width + x * n + i]!
      out[y * w + x] = sum / (n * n)
    }
  return { width: w, height: h, data: out }
}

function moved({ text, corners }: FoundCode, by: number, left: number, top: number): FoundCode {
  const [a, b, c, d] = corners.map(({ x, y }): PixelPoint => ({ x: x * by + left, y: y * by + top }))
  return { text, corners: [a!, b!, c!, d!] }
}
