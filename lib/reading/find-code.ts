import type { GreyPicture } from '@/lib/core/grey-picture'
import type { PageImage } from '@/lib/core/leaf'
import type { PaperRect, PixelPoint } from '@/lib/core/paper-space'
import { codesIn, type Box, type FoundCode } from './code-engine'

/** A place where a code was printed: its page (from 1), which paper of the sheaf, and that page's size in points. */
export type CodeWindow = Readonly<{ page: number; paper: number; rect: PaperRect; pageWidth: number; pageHeight: number }>
type Density = Pick<PageImage, 'dpiX' | 'dpiY'>

/** A skewed and shifted page carries its code so far from where it should be: 15 mm, in points. */
const astray = (15 * 72) / 25.4
/** After so many places the whole page is quicker. */
const mostPlaces = 8
/** How dense the whole page is looked at first. */
const overview = 110

/** Looks for a wanted code where codes were printed, the page either way up. `wanted` says whether a text is one. Null when there is none. */
export async function codeInPlace(picture: GreyPicture, { dpiX, dpiY }: Density, windows: readonly CodeWindow[], wanted: (text: string) => boolean): Promise<FoundCode | null> {
  for (const box of placesOf(picture, dpiX, dpiY, windows)) {
    const found = await codeIn(picture, box, wanted)
    if (found) return found
  }
  return null
}

/** Looks for a code at a place that is known exactly: the corners of its square in pixels. */
export async function codeAt(picture: GreyPicture, corners: readonly PixelPoint[], wanted: (text: string) => boolean): Promise<FoundCode | null> {
  const [xs, ys] = [corners.map(({ x }) => x), corners.map(({ y }) => y)]
  const margin = 0.15 * (Math.max(...xs) - Math.min(...xs))
  const box = clipped(picture, { left: Math.min(...xs) - margin, top: Math.min(...ys) - margin, width: Math.max(...xs) - Math.min(...xs) + 2 * margin, height: Math.max(...ys) - Math.min(...ys) + 2 * margin })
  if (box.width < 20 || box.height < 20) return null
  const found = await codeIn(picture, box, wanted)
  if (found) return found
  const soft = await codesIn(shrunk(part(picture, box), 2))
  const other = soft.find(({ text }) => wanted(text))
  return other ? moved(other, 2, box.left, box.top) : null
}

/** Looks for a code all over a leaf, at a low density and then, if `closely`, at the leaf's own. */
export async function codeAnywhere(picture: GreyPicture, { dpiX, dpiY }: Density, wanted: (text: string) => boolean, closely: boolean): Promise<FoundCode | null> {
  const n = Math.floor(Math.min(dpiX, dpiY) / overview)
  if (n >= 2) {
    const found = (await codesIn(shrunk(picture, n))).find(({ text }) => wanted(text))
    if (found) return moved(found, n, 0, 0)
  }
  if (n >= 2 && !closely) return null
  return (await codesIn(picture)).find(({ text }) => wanted(text)) ?? null
}

async function codeIn(picture: GreyPicture, box: Box, wanted: (text: string) => boolean): Promise<FoundCode | null> {
  return (await codesIn(picture, box)).find(({ text }) => wanted(text)) ?? null
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
