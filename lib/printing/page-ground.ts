import type { BlankPage } from '@/lib/core/grey-picture'
import type { PaperRect } from '@/lib/core/paper-space'

/** Ink of the blank paper from this brightness down: also pale shading would spoil a code. */
const inked = 235

/** What is free on a page: where its own print lies, and what else must stay clear (answer spaces, name and number boxes). */
export type PageGround = Readonly<{
  page: number
  width: number
  height: number
  /** Whether any print lies within a box, in points. */
  hasPrint: (rect: PaperRect) => boolean
  /** Answer spaces of the page, and the boxes for name and number. */
  spaces: readonly PaperRect[]
}>

/** Looks once over a blank page's picture, so that any box on it can be asked about in no time. */
export function pageGround({ page, widthPoints, heightPoints, picture }: BlankPage, spaces: readonly PaperRect[]): PageGround {
  const { width, height, data } = picture
  const stride = width + 1
  const sums = new Uint32Array(stride * (height + 1))
  for (let y = 0; y < height; y++)
    for (let x = 0, row = 0; x < width; x++) {
      row += data[y * width + x]! < inked ? 1 : 0
      sums[(y + 1) * stride + x + 1] = sums[y * stride + x + 1]! + row
    }
  const k = width / widthPoints
  const within = (value: number, most: number) => Math.max(0, Math.min(most, value))
  const hasPrint = ({ x, y, w, h }: PaperRect): boolean => {
    const [left, right] = [within(Math.floor(x * k), width), within(Math.ceil((x + w) * k), width)]
    const [top, bottom] = [within(Math.floor(y * k), height), within(Math.ceil((y + h) * k), height)]
    return sums[bottom * stride + right]! - sums[top * stride + right]! - sums[bottom * stride + left]! + sums[top * stride + left]! > 0
  }
  return { page, width: widthPoints, height: heightPoints, hasPrint, spaces }
}

export function overlap(a: PaperRect, b: PaperRect): boolean {
  return a.x < b.x + b.w && b.x < a.x + a.w && a.y < b.y + b.h && b.y < a.y + a.h
}
