import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Turn } from '@/lib/core/paper-space'
import { now } from '@/lib/infra/clock'
import { db } from '@/db/knex'
import { getLeaf, moveLeaf } from '@/db/leaves'
import { decideSorting } from './sorting-record'
import { takeLeafOut } from './take-leaf-out'

/**
 * Takes a leaf out of where it is: to the loose sheets (to be placed anew), or aside (kept, but not part of this test).
 * Blank leaves and those set aside come back the same way.
 */
export async function layLeaf(actor: Actor, { leafId, to }: { leafId: string; to: 'loose' | 'set_aside' }): Promise<void> {
  const leaf = await getLeaf(db(), leafId)
  if (!leaf) throw new AppError('not_found')
  await decideSorting(actor, leaf.paperId, to === 'loose' ? 'leaf.loosened' : 'leaf.set-aside', { kind: 'leaf', id: leafId }, async (trx, touch) => {
    const current = await getLeaf(trx, leafId)
    if (!current || current.state === 'read' || current.state === to) throw new AppError('out_of_date')
    await takeLeafOut(trx, touch, current)
    await moveLeaf(trx, leafId, { state: to, homography: null, scriptPageId: null, decidedBy: actor.userId, decidedAt: now() })
  })
}

/** Turns a leaf that is not placed: `turn` is how far its stored image is shown turned, in degrees clockwise. */
export async function turnLeaf(actor: Actor, { leafId, turn }: { leafId: string; turn: Turn }): Promise<void> {
  const leaf = await getLeaf(db(), leafId)
  if (!leaf) throw new AppError('not_found')
  await decideSorting(actor, leaf.paperId, 'leaf.turned', { kind: 'leaf', id: leafId, to: String(turn) }, async (trx, touch) => {
    const current = await getLeaf(trx, leafId)
    if (!current || current.state === 'read' || current.state === 'placed') throw new AppError('out_of_date')
    await touch.leaf(leafId)
    await moveLeaf(trx, leafId, { turn })
  })
}
