import { AppError } from '@/lib/core/errors'
import type { PaperPage } from '@/lib/core/paper'

/** Width and height in points, upright. ISO 216 for A4 and A3; Letter is 8½ × 11 in. */
const sizes = { A4: [595.28, 841.89], Letter: [612, 792], A3: [841.89, 1190.55] } as const
export type PaperSize = keyof typeof sizes

/** Printers and programs round differently: 2 mm either way is the same sheet. */
const slack = 6

/** The sheet a page is printed on, upright or lying; null when it is none of ours. */
export function paperSizeOf({ width, height }: Pick<PaperPage, 'width' | 'height'>): PaperSize | null {
  const [short, long] = width < height ? [width, height] : [height, width]
  const found = (Object.keys(sizes) as PaperSize[]).find((name) => Math.abs(sizes[name][0] - short) <= slack && Math.abs(sizes[name][1] - long) <= slack)
  return found ?? null
}

/** Throws paper_invalid with a line for each page that is neither A4, Letter nor A3. */
export function assertPaperSizes(pages: readonly PaperPage[]): void {
  const lines = pages.filter((page) => paperSizeOf(page) === null).map(({ page, width, height }) => ({
    path: `page ${page}`, says: `is ${Math.round((width * 25.4) / 72)} × ${Math.round((height * 25.4) / 72)} mm. Use A4, Letter or A3.`,
  }))
  if (lines.length > 0) throw new AppError('paper_invalid', { lines })
}
