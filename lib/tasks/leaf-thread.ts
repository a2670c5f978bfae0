import sharp from 'sharp'
import { AppError } from '@/lib/core/errors'
import type { BlankPage } from '@/lib/core/grey-picture'
import { unread, type LeafReading, type PageGuess } from '@/lib/core/leaf'
import { decodePage } from '@/lib/reading/decode-page'
import { openDocument, type OpenDocument } from '@/lib/reading/pdfium'
import type { SheafPage } from '@/lib/reading/sheaf-page'
import { opencv } from '@/lib/registering/opencv'
import { registerLeaf, registerToPage } from '@/lib/registering/register-leaf'
import { makeTemplate, type Template } from '@/lib/registering/template'

/** What a thread is handed: a page of a sheaf (none: only get ready), the whole file (shared memory) for pages that must be drawn, the blank paper and its name. */
export type LeafJob = Readonly<{ page: SheafPage | null; sheaf: Uint8Array; paperKey: string; paper: readonly BlankPage[]; onto?: number }>
export type LeafAnswer = Readonly<{ reading: LeafReading; onto: PageGuess | null }>

sharp.concurrency(1)
sharp.cache(false)

let kept: { key: string; templates: Template[] } | null = null

/** Decodes one leaf and registers it: to every page, or to the page `onto` (from 1) alone. A page that cannot be read is a reading with a problem. */
export default async function readLeaf(job: LeafJob): Promise<LeafAnswer> {
  const { cv } = await opencv()
  if (kept?.key !== job.paperKey) kept = { key: job.paperKey, templates: job.paper.map((page) => makeTemplate(cv, page)) }
  const { templates } = kept
  const index = job.page?.index ?? 0
  try {
    if (!job.page) return { reading: unread(index, 'page_empty'), onto: null }
    const { image, picture } = await decodePage(job.page, () => drawable(job))
    if (job.onto === undefined) return { reading: { index, ...registerLeaf(cv, image, picture, templates) }, onto: null }
    const template = templates.find(({ page }) => page.page === job.onto)
    return { reading: unread(index, 'page_unreadable'), onto: template ? registerToPage(cv, image, picture, template) : null }
  } catch (error) {
    if (!(error instanceof AppError)) throw error
    return { reading: unread(index, error.detail['too_large'] ? 'page_too_large' : 'page_unreadable'), onto: null }
  }
}

let drawn: { key: string; open: OpenDocument } | null = null

/** The sheaf opened for drawing: kept open, since most pages of such a sheaf need it. */
async function drawable({ paperKey, sheaf }: LeafJob): Promise<OpenDocument> {
  if (drawn?.key !== paperKey) {
    drawn?.open.close()
    drawn = null
    drawn = { key: paperKey, open: await openDocument(sheaf) }
  }
  return drawn.open
}
