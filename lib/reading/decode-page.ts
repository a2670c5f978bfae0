import sharp, { type Sharp } from 'sharp'
import { AppError } from '@/lib/core/errors'
import type { GreyPicture } from '@/lib/core/grey-picture'
import type { PageImage } from '@/lib/core/leaf'
import { endsInGrey } from './ends-in-grey'
import { g4Tiff } from './g4-tiff'
import type { OpenSheaf } from './open-sheaf'
import { openDocument, resetPdfium, type OpenDocument } from './pdfium'
import { boxOf, drawPage, everyImageDecodes, frameOf, renderedImage } from './render-page'
import { mostPixels, pageError, type LiftedImage } from './sheaf-page'

/** A page's stored image in grey, with the frame it is in. */
export type DecodedPage = Readonly<{ image: PageImage; picture: GreyPicture }>

/**
 * Decodes a page's stored image to grey, in full. A page without an image of its own is drawn; an image stream that turns out
 * broken is tried that way too. Throws page_unreadable, page_too_large for pages of absurd size, and page_incomplete where a part
 * of the picture is missing: what was written there must not pass for nothing written.
 */
export async function decodePage(sheaf: OpenSheaf, index: number): Promise<DecodedPage> {
  const page = sheaf.page(index)
  if (page.image) {
    if (page.broken) throw pageError('page_incomplete', index)
    const picture = await decodeStream(page, index).catch((error: unknown) => {
      if (error instanceof AppError) throw error
      return null
    })
    if (picture) return { image: { ...page.image, width: picture.width, height: picture.height }, picture }
  } else if (page.problem !== 'must_render') throw pageError(page.problem, index)
  return drawStoredPage(sheaf, index, 1)
}

/** The image behind a page as sharp reads it: its own pixels, not turned, true black on white. */
export function sharpOf({ image, bytes, inverted }: LiftedImage): Sharp {
  const options = { failOn: 'none', limitInputPixels: mostPixels } as const
  if (image.encoding === 'g4') return sharp(g4Tiff(bytes, image.width, image.height, inverted), options)
  const picture = sharp(bytes, options)
  return inverted ? picture.negate() : picture
}

async function decodeStream(page: LiftedImage, index: number): Promise<GreyPicture> {
  const picture = await greyOf(sharpOf(page))
  if (page.image.encoding === 'jpeg' && endsInGrey(picture)) throw pageError('page_incomplete', index)
  return picture
}

async function greyOf(page: Sharp): Promise<GreyPicture> {
  const { data, info } = await page.toColourspace('b-w').raw().toBuffer({ resolveWithObject: true })
  if (info.channels === 1) return { width: info.width, height: info.height, data }
  const grey = new Uint8Array(info.width * info.height)
  for (let i = 0, j = 0; i < grey.length; i++, j += info.channels) grey[i] = data[j]!
  return { width: info.width, height: info.height, data: grey }
}

/**
 * Draws one page of a sheaf in its stored frame; three channels are red, green, blue. Throws page_unreadable, also when an image is
 * there and nothing of it can be seen: such a page must not pass for an empty one. Throws page_too_large and page_incomplete as decodePage does.
 */
export async function drawStoredPage(sheaf: OpenSheaf, index: number, channels: 1 | 3): Promise<DecodedPage> {
  const { parts, unit } = sheaf.alone(index)
  const document = await openDocument(parts).catch(() => {
    throw pageError('page_unreadable', index)
  })
  try {
    return drawOnly(document, index, channels, unit)
  } catch (error) {
    if (error instanceof AppError) throw error
    // the engine gave up in the middle: what it holds is not to be trusted any more
    resetPdfium()
    throw pageError('page_unreadable', index)
  } finally {
    document.close()
  }
}

function drawOnly({ engine, document }: OpenDocument, index: number, channels: 1 | 3, unit: number): DecodedPage {
  const page = engine._FPDF_LoadPage(document, 0)
  if (!page) throw pageError('page_unreadable', index)
  try {
    const box = { ...boxOf(engine, page), unit }
    const { frame, hasImages } = frameOf(engine, page, box)
    if (frame.width * frame.height > mostPixels) throw pageError('page_too_large', index)
    const picture = drawPage(engine, page, box, frame, channels)
    // white all over is an empty page only if its images are white, not lost
    if (hasImages && isUniform(picture.data) && (picture.data[0] !== 255 || !everyImageDecodes(engine, page))) throw pageError('page_unreadable', index)
    return { image: renderedImage(frame), picture }
  } finally {
    engine._FPDF_ClosePage(page)
  }
}

function isUniform(data: Uint8Array): boolean {
  return data.every((v) => v === data[0])
}
