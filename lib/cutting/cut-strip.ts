import sharp from 'sharp'
import { pointsPerInch, type Homography, type PaperRect } from '@/lib/core/paper-space'
import { warp, type Pixels } from './warp'

export type StripFormat = Readonly<{ dpi: number; type: 'jpeg' | 'webp'; quality?: number }>
/** Most pixels a strip may have: an A3 page at 300 dpi. */
const mostPixels = 20_000_000

/**
 * Cuts a box of the paper out of a leaf, upright and undistorted, as a picture of so many dots per inch.
 * @param source the leaf's stored image, grey or colour
 * @param homography paper points -> pixels of the stored image
 * @param rect what to cut, in paper points; the whole page gives an upright page picture
 * @param masked boxes in paper points (a name) that are painted over with paper white before anything leaves the server
 */
export async function cutStrip(source: Pixels, homography: Homography, rect: PaperRect, format: StripFormat, masked: readonly PaperRect[] = []): Promise<Buffer> {
  const { width, height, channels, data } = cutPixels(source, homography, rect, format.dpi, masked)
  const picture = sharp(data, { raw: { width, height, channels } })
  const quality = format.quality ?? 78
  return format.type === 'webp' ? picture.webp({ quality, effort: 2 }).toBuffer() : picture.jpeg({ quality }).toBuffer()
}

/** The same as bare pixels. */
export function cutPixels(source: Pixels, homography: Homography, rect: PaperRect, dpi: number, masked: readonly PaperRect[] = []): Pixels {
  const wanted = dpi / pointsPerInch
  const k = Math.min(wanted, Math.sqrt(mostPixels / (rect.w * rect.h)))
  const width = Math.max(1, Math.round(rect.w * k))
  const height = Math.max(1, Math.round(rect.h * k))
  const cut = warp(source, intoStrip(homography, rect, width, height), width, height)
  for (const mask of masked) paintOver(cut, mask, rect)
  return cut
}

/** Strip pixels -> paper points -> pixels of the stored image. */
function intoStrip(homography: Homography, { x, y, w, h }: PaperRect, width: number, height: number): Homography {
  const row = ([a, b, c]: readonly [number, number, number]) => [(a * w) / width, (b * h) / height, a * x + b * y + c] as const
  return [row(homography[0]), row(homography[1]), row(homography[2])]
}

function paintOver({ width, height, channels, data }: Pixels, mask: PaperRect, rect: PaperRect): void {
  const across = (at: number) => Math.min(width, Math.max(0, ((at - rect.x) * width) / rect.w))
  const down = (at: number) => Math.min(height, Math.max(0, ((at - rect.y) * height) / rect.h))
  const [left, right] = [Math.floor(across(mask.x)), Math.ceil(across(mask.x + mask.w))]
  for (let y = Math.floor(down(mask.y)); y < Math.ceil(down(mask.y + mask.h)); y++) data.fill(255, (y * width + left) * channels, (y * width + Math.max(left, right)) * channels)
}
