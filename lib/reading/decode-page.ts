import sharp, { type Sharp } from 'sharp'
import { AppError } from '@/lib/core/errors'
import type { GreyPicture } from '@/lib/core/grey-picture'
import type { PageImage } from '@/lib/core/leaf'
import { g4Tiff } from './g4-tiff'
import type { OpenDocument } from './pdfium'
import { boxOf, drawPage, frameOf, renderedImage } from './render-page'
import { mostPixels, type SheafPage } from './sheaf-page'

/** A page's stored image in grey, with the frame it is in. */
export type DecodedPage = Readonly<{ image: PageImage; picture: GreyPicture }>

/**
 * Decodes a page's stored image to grey, in full. `sheaf` opens the whole file; it is asked only when the page has to be drawn
 * (an image stream that turns out broken is tried that way too) and stays open. Throws page_unreadable, with detail `too_large` for pages of absurd size.
 */
export async function decodePage(page: SheafPage, sheaf: () => Promise<OpenDocument>): Promise<DecodedPage> {
  if (page.image) {
    const picture = await decodeStream(page).catch(() => null)
    if (picture) return { image: { ...page.image, width: picture.width, height: picture.height }, picture }
  } else if (page.problem !== 'must_render') throw unreadable(page.index, page.problem === 'page_too_large')
  const open = await sheaf().catch(() => {
    throw unreadable(page.index)
  })
  return drawStoredPage(open, page.index, 1)
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

/**
 * Draws one page of an open sheaf in its stored frame; three channels are red, green, blue. Throws page_unreadable, also when an image is
 * there and nothing of it can be seen: such a page must not pass for an empty one.
 */
export function drawStoredPage({ engine, document }: OpenDocument, index: number, channels: 1 | 3): DecodedPage {
  const page = engine._FPDF_LoadPage(document, index)
  if (!page) throw unreadable(index)
  try {
    const box = boxOf(engine, page)
    const { frame, hasImages } = frameOf(engine, page, box)
    if (frame.width * frame.height > mostPixels) throw unreadable(index, true)
    const picture = drawPage(engine, page, box, frame, channels)
    if (hasImages && picture.data.every((v) => v === picture.data[0])) throw unreadable(index)
    return { image: renderedImage(frame), picture }
  } finally {
    engine._FPDF_ClosePage(page)
  }
}

function unreadable(index: number, tooLarge = false): AppError {
  return new AppError('page_unreadable', { page: index + 1, too_large: tooLarge })
}
