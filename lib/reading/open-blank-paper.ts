import { AppError } from '@/lib/core/errors'
import { templateDpi, type BlankPage } from '@/lib/core/grey-picture'
import { openDocument, type Pdfium } from './pdfium'
import { boxOf, drawPage } from './render-page'
import type { PageBox, StoredFrame } from './stored-frame'

const mostBlankPages = 40

/**
 * Draws the pages of a blank paper in grey at `templateDpi`, as a reader shows them (CropBox and /Rotate respected), with
 * their sizes in points; `only` (from 1) draws that page alone. Throws the file errors of openSheaf, and too_many_pages beyond 40.
 */
export async function openBlankPaper(bytes: Uint8Array, dpi = templateDpi, only?: number): Promise<BlankPage[]> {
  if (bytes.length === 0) throw new AppError('file_empty')
  if (!Buffer.from(bytes.subarray(0, 1024)).includes('%PDF-')) throw new AppError('file_not_pdf')
  const { engine, document, close } = await openDocument(bytes)
  try {
    const count = engine._FPDF_GetPageCount(document)
    if (count === 0) throw new AppError('file_no_pages')
    if (count > mostBlankPages) throw new AppError('too_many_pages', { pages: count, most: mostBlankPages })
    const wanted = Array.from({ length: count }, (_, index) => index).filter((index) => only === undefined || index === only - 1)
    return wanted.map((index) => blankPage(engine, document, index, dpi))
  } finally {
    close()
  }
}

function blankPage(engine: Pdfium, document: number, index: number, dpi: number): BlankPage {
  const page = engine._FPDF_LoadPage(document, index)
  if (!page) throw new AppError('page_unreadable', { page: index + 1 })
  try {
    const box = boxOf(engine, page)
    const frame = shownFrame(box, dpi)
    if (frame.width * frame.height > 40_000_000) throw new AppError('page_unreadable', { page: index + 1 })
    const sideways = box.turn % 180 !== 0
    return {
      page: index + 1,
      widthPoints: sideways ? box.height : box.width,
      heightPoints: sideways ? box.width : box.height,
      picture: drawPage(engine, page, box, frame, 1),
    }
  } finally {
    engine._FPDF_ClosePage(page)
  }
}

/** The page as shown, after its /Rotate: user space -> pixels. */
function shownFrame({ left, bottom, width, height, turn }: PageBox, dpi: number): StoredFrame {
  const k = dpi / 72
  const [w, h] = turn % 180 ? [height, width] : [width, height]
  const toPixels =
    turn === 90 ? ([0, k, k, 0, -bottom * k, -left * k] as const)
    : turn === 180 ? ([-k, 0, 0, k, (left + width) * k, -bottom * k] as const)
    : turn === 270 ? ([0, -k, -k, 0, (bottom + height) * k, (left + width) * k] as const)
    : ([k, 0, 0, -k, -left * k, (bottom + height) * k] as const)
  return { width: Math.ceil(w * k), height: Math.ceil(h * k), dpiX: dpi, dpiY: dpi, shownTurn: 0, toPixels }
}
