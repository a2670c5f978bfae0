import sharp from 'sharp'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Turn } from '@/lib/core/paper-space'
import { db } from '@/db/knex'
import { getLeaf, getLeafEvidence } from '@/db/leaves'
import { gatePaper } from './gate-paper'
import { leafImage } from './leaf-image'

/**
 * A leaf (its own part of an image that shows two pages) as a JPEG for whoever sorts its paper (a marker gets strips, with names covered). Turned to read upright, or by `turn`
 * degrees clockwise; at most `width` pixels wide. Throws page_unreadable.
 */
export async function readLeafPicture(actor: Actor, { leafId, width, turn }: { leafId: string; width: number; turn?: Turn }): Promise<Uint8Array> {
  const leaf = await getLeaf(db(), leafId)
  if (!leaf) throw new AppError('not_found')
  await gatePaper(db(), actor, 'change', leaf.paperId)
  const part = leaf.half === null ? undefined : (await getLeafEvidence(db(), [leafId])).get(leafId)?.reading.part
  const stored = sharp(await leafImage(db(), leafId), { failOn: 'none' })
  const own = part ? stored.extract({ left: part.x, top: part.y, width: part.w, height: part.h }) : stored
  const upright = own.rotate(turn ?? leaf.turn)
  return upright.resize({ width, withoutEnlargement: true }).jpeg({ quality: 80 }).toBuffer()
}
