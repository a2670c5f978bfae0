import { EncryptedPDFError, PDFDocument, PDFName, type PDFPage, type PDFRef } from 'pdf-lib'
import { AppError } from '@/lib/core/errors'
import type { PaperPage } from '@/lib/core/paper'

type Matrix = [number, number, number, number, number, number]

/**
 * Puts the pages of a blank paper into a PDF once each, as drawings (never as pictures), upright and cut to what is shown of them; they are
 * then drawn as often as wanted. A page without content has null. Throws file_locked for a paper locked against changes, file_damaged, and pages_differ.
 */
export async function blankForms(pdf: PDFDocument, blank: Uint8Array, pages: readonly PaperPage[]): Promise<(PDFRef | null)[]> {
  const source = await open(blank)
  if (source.getPageCount() !== pages.length) throw new AppError('pages_differ', { pages: source.getPageCount(), before: pages.length })
  const drawn = source.getPages().map((page, k) => ({ page, ...frameOf(page, pages[k]!) }))
  const full = drawn.filter(({ page }) => page.node.Contents() !== undefined)
  const forms = await pdf.embedPages(full.map(({ page }) => page), full.map(({ box }) => box), full.map(({ matrix }) => matrix))
  for (const form of forms) await form.embed()
  return drawn.map((each) => {
    const at = full.indexOf(each)
    return at < 0 ? null : keepGroup(pdf, forms[at]!.ref, each.page)
  })
}

async function open(blank: Uint8Array): Promise<PDFDocument> {
  try {
    return await PDFDocument.load(blank, { updateMetadata: false, throwOnInvalidObject: false })
  } catch (error) {
    throw new AppError(error instanceof EncryptedPDFError ? 'file_locked' : 'file_damaged')
  }
}

/** Transparency of a page is reckoned as a group of its own when the page asks for it; only a group without a colour space of its own stands by itself. */
function keepGroup(pdf: PDFDocument, ref: PDFRef, page: PDFPage): PDFRef {
  const form = pdf.context.lookup(ref)
  if (page.node.has(PDFName.of('Group')) && form && 'dict' in form) (form as { dict: { set: (key: PDFName, value: unknown) => void } }).dict.set(PDFName.of('Group'), pdf.context.obj({ S: 'Transparency' }))
  return ref
}

/** The shown box of a page in its own space, and what takes that space upright onto a page of the paper's size, y up. */
function frameOf(page: PDFPage, paper: PaperPage): { box: { left: number; bottom: number; right: number; top: number }; matrix: Matrix } {
  const media = page.getMediaBox()
  const crop = page.getCropBox()
  const left = Math.max(media.x, crop.x)
  const bottom = Math.max(media.y, crop.y)
  const right = Math.min(media.x + media.width, crop.x + crop.width)
  const top = Math.min(media.y + media.height, crop.y + crop.height)
  const turn = (((page.getRotation().angle % 360) + 360) % 360)
  const k = paper.width / (turn % 180 ? top - bottom : right - left)
  const upright: Matrix =
    turn === 90 ? [0, -1, 1, 0, -bottom, right]
    : turn === 180 ? [-1, 0, 0, -1, right, top]
    : turn === 270 ? [0, 1, -1, 0, top, -left]
    : [1, 0, 0, 1, -left, -bottom]
  return { box: { left, bottom, right, top }, matrix: upright.map((value) => value * k) as Matrix }
}
