import sharp, { type Sharp } from 'sharp'
import type { Turn } from '@/lib/core/paper-space'
import { drawStoredPage, sharpOf } from './decode-page'
import type { SheafPage } from './sheaf-page'

/**
 * A leaf for the screen: a JPEG turned clockwise by `turn` (0 gives the stored image), at most `width` pixels wide, in the scan's own colours.
 * Throws page_unreadable.
 */
export async function leafPicture(page: SheafPage, sheaf: () => Uint8Array, turn: Turn, width: number): Promise<Buffer> {
  const stored = (page.image && (await sharpOf(page).metadata().then(() => sharpOf(page), () => null))) || (await drawn(page, sheaf))
  return stored.rotate(turn).resize({ width, withoutEnlargement: true }).jpeg({ quality: 78 }).toBuffer()
}

async function drawn(page: SheafPage, sheaf: () => Uint8Array): Promise<Sharp> {
  const { picture } = await drawStoredPage(sheaf(), page.index, 3)
  return sharp(picture.data, { raw: { width: picture.width, height: picture.height, channels: 3 } })
}
