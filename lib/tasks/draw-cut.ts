import sharp from 'sharp'
import { AppError } from '@/lib/core/errors'
import { cutBox, pixelsPerPoint, pixelsUnder } from '@/lib/cutting/cut-box'
import { cutKey, type Cut } from '@/lib/cutting/cut-key'
import { keptPicture } from '@/lib/infra/kept-picture'
import type { Db } from '@/db/knex'
import { leafImage } from './leaf-image'

/** Resolutions a cut is drawn at: asked for something between, the next finer one is sent. */
const finenesses = [72, 100, 120, 150, 200, 240, 300]

/** A picture for a browser, with a name that changes when the picture does. */
export type Picture = Readonly<{ bytes: Buffer; type: string; key: string }>

/** Draws a cut as WebP at `dpi` or the next finer resolution, and keeps it on disk. Throws page_unreadable. */
export async function drawCut(db: Db, cut: Cut, dpi: number): Promise<Picture> {
  const fineness = finenesses.find((candidate) => candidate >= dpi) ?? 300
  const key = cutKey(cut)
  const bytes = await keptPicture(cut.leafId, `${key}-${fineness}`, () => draw(db, cut, fineness))
  return { bytes, type: 'image/webp', key }
}

async function draw(db: Db, { leafId, homography, rect, masks }: Cut, dpi: number): Promise<Buffer> {
  const file = await leafImage(db, leafId)
  const stored = sharp(file, { failOn: 'none' })
  const { width = 0, height = 0 } = await stored.metadata()
  const part = pixelsUnder(homography, rect, { width, height })
  if (!part) throw new AppError('page_unreadable')
  const { data, info } = await stored.extract(part).removeAlpha().raw().toBuffer({ resolveWithObject: true })
  // Cut at the scan's own resolution and shrink afterwards, so that thin strokes stay whole.
  const scale = Math.max(dpi / 72, Math.min(300 / 72, pixelsPerPoint(homography, rect)))
  const cut = cutBox({ width: info.width, height: info.height, channels: info.channels, data }, part, homography, rect, scale, masks)
  const raw = { width: cut.width, height: cut.height, channels: cut.channels as 1 | 3 }
  return sharp(cut.data, { raw }).resize({ width: Math.round((rect.w * dpi) / 72), withoutEnlargement: true }).webp({ quality: 80, effort: 2 }).toBuffer()
}
