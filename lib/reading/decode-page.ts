import sharp, { type Sharp } from 'sharp'
import { AppError } from '@/lib/core/errors'
import type { GreyPicture } from '@/lib/core/grey-picture'
import type { PageImage } from '@/lib/core/leaf'
import { g4Tiff } from './g4-tiff'
import { openDocument } from './pdfium'
import { boxOf, drawPage, frameOf, renderedImage } from './render-page'
import { mostPixels, type SheafPage } from './sheaf-page'

/** A page's stored image in grey, with the frame it is in. */
export type DecodedPage = Readonly<{ image: PageImage; picture: GreyPicture }>

/**
 * Decodes a page's stored image to grey, in full. `sheaf` gives the whole file's bytes; it is asked only when the page has to be drawn
 * (an image stream that turns out broken is tried that way too). Throws page_unreadable, with detail `too_large` for pages of absurd size.
 */
export async function decodePage(page: SheafPage, sheaf: () => Uint8Array): Promise<DecodedPage> {
  if (page.image === null && page.problem !== 'must_render') throw new AppError('page_unreadable', { page: page.index + 1, too_large: page.problem === 'page_too_large' })
  if (page.image) {
    const picture = await decodeStream(page).catch(() => null)
    if (picture) return { image: { ...page.image, width: picture.width, height: picture.height }, picture }
  }
  return drawStoredPage(sheaf(), page.index, 1)
}

/** The image behind a page as sharp reads it: its own pixels, not turned, true black on white. */
export function sharpOf(page: SheafPage & { image: PageImage }): Sharp {
  const { image, bytes, inverted } = page
  if (image.encoding === 'g4') return sharp(g4Tiff(bytes, image.width, image.height, inverted), { failOn: 'none', limitInputPixels: mostPixels })
  const picture = sharp(bytes, { failOn: 'none', limitInputPixels: mostPixels })
  return inverted ? picture.negate() : picture
}

async function decodeStream(page: SheafPage & { image: PageImage }): Promise<GreyPicture> {
  const { data, info } = await sharpOf(page).toColourspace('b-w').raw().toBuffer({ resolveWithObject: true })
  if (info.channels === 1) return { width: info.width, height: info.height, data }
  const grey = new Uint8Array(info.width * info.height)
  for (let i = 0, j = 0; i < grey.length; i++, j += info.channels) grey[i] = data[j]!
  return { width: info.width, height: info.height, data: grey }
}

/** Draws one page of a sheaf in its stored frame; three channels are red, green, blue. Throws page_unreadable and the file errors. */
export async function drawStoredPage(bytes: Uint8Array, index: number, channels: 1 | 3): Promise<DecodedPage> {
  const { engine, document, close } = await openDocument(bytes).catch(() => { throw new AppError('page_unreadable', { page: index + 1 }) })
  try {
    const page = engine._FPDF_LoadPage(document, index)
    if (!page) throw new AppError('page_unreadable', { page: index + 1 })
    try {
      const box = boxOf(engine, page)
      const frame = frameOf(engine, page, box)
      if (frame.width * frame.height > mostPixels) throw new AppError('page_unreadable', { page: index + 1, too_large: true })
      return { image: renderedImage(frame), picture: drawPage(engine, page, box, frame, channels) }
    } finally {
      engine._FPDF_ClosePage(page)
    }
  } finally {
    close()
  }
}
