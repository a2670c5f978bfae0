import { readFile } from 'node:fs/promises'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { db } from '@/db/knex'
import { findDemoPile } from './find-demo-pile'
import { gatePaper } from './gate-paper'

/** A scanned pile of this paper, for whoever has no copier at hand. Throws not_found outside the demo school and for a paper of one's own making. */
export async function readDemoPile(actor: Actor, paperId: string): Promise<Buffer> {
  await gatePaper(db(), actor, 'change', paperId)
  const pile = await findDemoPile(db(), paperId)
  if (!pile) throw new AppError('not_found')
  return readFile(pile)
}
