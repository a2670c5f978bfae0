import sharp, { type Sharp } from 'sharp'
import type { Turn } from '@/lib/core/paper-space'
import { drawStoredPage, sharpOf } from './decode-page'
import { openDocument } from './pdfium'
import type { SheafPage } from './sheaf-page'

/**
 * A leaf for the screen: a JPEG turned clockwise by `turn` (0 gives the stored image), at most `width` pixels wide, in the scan's own colours.
 * @param sheaf the whole file's bytes, asked for only when the page has to be drawn
 * Throws page_unreadable.
 */
export async function leafPicture(page: SheafPage, sheaf: () => Promise<Uint8Array>, turn: Turn, width: number): Promise<Buffer> {
  const stored = await storedPicture(page, sheaf)
  return stored.rotate(turn).resize({ width, withoutEnlargement: true }).jpeg({ quality: 78 }).toBuffer()
}

/** A leaf's stored image in its own colours as bare pixels, for cutting strips. Throws page_unreadable. */
export async function leafPixels(page: SheafPage, sheaf: () => Promise<Uint8Array>): Promise<Readonly<{ width: number; height: number; channels: 1 | 3; data: Uint8Array }>> {
  const { data, info } = await (await storedPicture(page, sheaf)).raw().toBuffer({ resolveWithObject: true })
  return { width: info.width, height: info.height, channels: info.channels === 1 ? 1 : 3, data }
}

async function storedPicture(page: SheafPage, sheaf: () => Promise<Uint8Array>): Promise<Sharp> {
  if (page.image) {
    const readable = await sharpOf(page).metadata().catch(() => null)
    if (readable) return readable.channels === 1 ? sharpOf(page).toColourspace('b-w') : sharpOf(page).toColourspace('srgb').removeAlpha()
  }
  const open = await openDocument(await sheaf())
  try {
    const { picture } = drawStoredPage(open, page.index, 3)
    return sharp(picture.data, { raw: { width: picture.width, height: picture.height, channels: 3 } })
  } finally {
    open.close()
  }
}
