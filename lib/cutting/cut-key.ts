import { createHash } from 'node:crypto'
import type { Homography, PaperRect } from '@/lib/core/paper-space'

/** What a cut is made of. Boxes and masks in paper points. */
export type Cut = Readonly<{ leafId: string; homography: Homography; rect: PaperRect; masks: readonly PaperRect[] }>

/** Changes with the way cuts are made, so that old ones are made anew. */
const edition = 1

/** A name for the picture of a cut: the same as long as leaf, place on it, box and masks are the same. Its address may be kept for ever. */
export function cutKey(cut: Cut): string {
  return createHash('sha256').update(JSON.stringify([edition, cut.leafId, cut.homography, cut.rect, cut.masks])).digest('hex').slice(0, 24)
}
