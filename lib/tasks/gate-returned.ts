import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Db } from '@/db/knex'
import { getReturnedScript, type ReturnedScript } from '@/db/returned-scripts'
import { gatePaper } from './gate-paper'

/**
 * The one gate before a returned script: its own student while it stands handed back, or an owner of its paper at any time. Anyone
 * else, and everyone before the release and after a withdrawal, is told not_found, as if it had never been there.
 */
export async function gateReturned(db: Db, actor: Actor, id: string): Promise<ReturnedScript & { asStudent: boolean }> {
  const found = await getReturnedScript(db, id)
  if (!found) throw new AppError('not_found')
  if (actor.roles.includes('student') && actor.studentId === found.studentId) {
    if (!found.holds) throw new AppError('not_found')
    return { ...found, asStudent: true }
  }
  await gatePaper(db, actor, 'change', found.paperId).catch(() => { throw new AppError('not_found') })
  return { ...found, asStudent: false }
}
