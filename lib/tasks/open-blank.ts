import type { PaperPage } from '@/lib/core/paper'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { assertPaperSizes } from '@/lib/setting/paper-size'

/** Only the sizes are wanted: the pages are drawn as small as can be. */
const tiny = 9

/** The pages of a blank paper as they are shown. Throws a file error, or paper_invalid for a sheet that is none of ours. */
export async function openBlank(bytes: Uint8Array): Promise<PaperPage[]> {
  const drawn = await openBlankPaper(bytes, tiny)
  const pages = drawn.map(({ page, widthPoints, heightPoints }) => ({ page, width: hundredth(widthPoints), height: hundredth(heightPoints) }))
  assertPaperSizes(pages)
  return pages
}

/** The engine's sizes are single precision: 595.280029296875 is 595.28. */
function hundredth(points: number): number {
  return Math.round(points * 100) / 100
}
