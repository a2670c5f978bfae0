import { AppError } from '@/lib/core/errors'
import type { BlankPage } from '@/lib/core/grey-picture'
import type { Paper } from '@/lib/core/paper'
import { pageGround, type PageGround } from '@/lib/printing/page-ground'
import { blankPagesOf } from './read-sheaf'

// The paper last asked about stays drawn: whoever moves a code asks again and again.
let held: { fileId: string; pages: Promise<BlankPage[]> } | null = null

/** What is free on each page of a paper. Throws paper_invalid when it has no blank paper. */
export async function pageGrounds(paper: Paper): Promise<PageGround[]> {
  if (!paper.blankFileId) throw new AppError('paper_invalid')
  if (held?.fileId !== paper.blankFileId) {
    const pages = blankPagesOf(paper)
    held = { fileId: paper.blankFileId, pages }
    pages.catch(() => { held = null })
  }
  const spaces = spacesOf(paper)
  return (await held.pages).map((page) => pageGround(page, spaces.filter((space) => space.page === page.page).map(({ rect }) => rect)))
}

/** Answer spaces and the boxes for name and number: where students write. */
export function spacesOf({ questions, boxes }: Paper): { page: number; rect: Paper['boxes'][number]['rect'] }[] {
  return [...questions.flatMap((question) => question.spaces), ...boxes].map(({ page, rect }) => ({ page, rect }))
}
