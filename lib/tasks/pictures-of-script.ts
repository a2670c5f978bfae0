import type { PaperStanding } from '@/lib/core/actor'
import type { Paper } from '@/lib/core/paper'
import { corners, toPaper, type PaperRect } from '@/lib/core/paper-space'
import type { PagePicture } from '@/lib/core/run'
import { cutKey, type Cut } from '@/lib/cutting/cut-key'
import type { ScriptPage } from '@/db/runs'

/** Whether names stay off the pictures this person is sent: while the paper hides them, and from a moderator always. */
export function hidesNames(paper: Pick<Paper, 'namesHidden'>, standing: PaperStanding): boolean {
  return paper.namesHidden || (standing.moderates && !standing.owner)
}

/** Handwriting runs over the edge of its box, in points. */
const over = 6

/** The name and number boxes of a page of the paper, a little larger than printed. Number boxes lie side by side and are covered as one. */
export function masksOf(paper: Pick<Paper, 'boxes'>, paperPage: number | null): PaperRect[] {
  return paper.boxes.filter((box) => box.page === paperPage).map(({ rect }) => ({ x: rect.x - over, y: rect.y - over, w: rect.w + 2 * over, h: rect.h + 2 * over }))
}

/** The cut of a box out of a page of a script; null while the page has not been scanned. */
export function cutOf(page: ScriptPage, rect: PaperRect, masks: readonly PaperRect[]): Cut | null {
  return page.leaf && { leafId: page.leaf.id, homography: page.leaf.homography, rect, masks }
}

/** The whole page in paper space: of the blank paper, or the sheet itself for an extra page (never the other page on its image, which may be another student's). Null without a leaf. */
export function wholePage(page: ScriptPage, paper: Pick<Paper, 'pages'>): PaperRect | null {
  const blank = paper.pages.find((candidate) => candidate.page === page.paperPage)
  if (blank) return { x: 0, y: 0, w: blank.width, h: blank.height }
  if (!page.leaf) return null
  const { homography, part, width, height } = page.leaf
  const at = corners(part ?? { x: 0, y: 0, w: width, h: height }).map(({ x, y }) => toPaper(homography, { x, y }))
  return { x: 0, y: 0, w: Math.max(...at.map(({ x }) => x)), h: Math.max(...at.map(({ y }) => y)) }
}

/** The pages of a script that can be looked at whole, in order. */
export function pagePictures(pages: readonly ScriptPage[], paper: Paper, hidden: boolean): PagePicture[] {
  return pages.flatMap((page) => {
    const rect = wholePage(page, paper)
    const cut = rect && cutOf(page, rect, hidden ? masksOf(paper, page.paperPage) : [])
    return cut ? [{ scriptPageId: page.id, paperPage: page.paperPage, width: cut.rect.w, height: cut.rect.h, src: `/api/script-pages/${page.id}/picture?v=${cutKey(cut)}` }] : []
  })
}
