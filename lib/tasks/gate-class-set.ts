import type { Actor, PaperAct } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { getClassSet, type ClassSet } from '@/db/class-sets'
import type { Db } from '@/db/knex'
import { gatePaper } from './gate-paper'

/** A class set by way of its paper; throws not_found or not_allowed. */
export async function gateClassSet(trx: Db, actor: Actor, act: PaperAct, classSetId: string): Promise<ClassSet> {
  const set = await getClassSet(trx, classSetId)
  if (!set) throw new AppError('not_found')
  await gatePaper(trx, actor, act, set.paperId)
  return set
}
