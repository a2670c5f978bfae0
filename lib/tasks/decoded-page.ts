import { PDFDocument } from 'pdf-lib'
import sharp from 'sharp'
import { AppError } from '@/lib/core/errors'
import { addDecodedPage } from '@/lib/handing-back/add-decoded-page'
import type { ScriptPage } from '@/lib/handing-back/returned-page'
import { mostPixels } from '@/lib/reading/sheaf-page'
import { sheafPicture } from './look-at-sheaf'

/** A page of a sheaf, or its own part of a picture of two pages, as a sheaf of one page whose picture is coded without loss. Throws page_unreadable. */
export async function decodedPage(file: string, page: ScriptPage): Promise<PDFDocument> {
  const picture = sharp(await sheafPicture(file, page.index), { failOn: 'none', limitInputPixels: mostPixels })
  const { space } = await picture.metadata()
  const stored = (space === 'cmyk' ? picture.toColourspace('srgb') : picture).removeAlpha()
  const { part } = page
  const own = part ? stored.extract({ left: part.x, top: part.y, width: part.w, height: part.h }) : stored
  const { data, info } = await own.raw().toBuffer({ resolveWithObject: true })
  if (info.width !== page.image.width || info.height !== page.image.height) throw new AppError('page_unreadable', { page: page.index + 1 })
  const pdf = await PDFDocument.create({ updateMetadata: false })
  addDecodedPage(pdf, { width: info.width, height: info.height, channels: info.channels === 3 ? 3 : 1, data }, page.homography)
  return pdf
}
