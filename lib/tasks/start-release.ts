import { z } from 'zod'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { openLines } from '@/lib/core/hand-back'
import { addAuditLine } from '@/db/audit'
import { addJob } from '@/db/jobs'
import { transaction } from '@/db/knex'
import { addRelease, isBuilding } from '@/db/releases'
import { addReturnedScripts, listStanding } from '@/db/returned-scripts'
import { now } from '@/lib/infra/clock'
import { checkClassSet } from './check-class-set'
import { gateClassSet } from './gate-class-set'
import { gatherClassSet } from './gather-class-set'
import { scriptsToGo } from './scripts-to-go'

/** The farthest day a release may wait for. */
const longestWait = 366 * 86_400_000

export const ReleaseForm = z.object({
  /** Only these scripts; all that can go when left out. */
  scriptIds: z.array(z.string().min(1).max(80)).min(1).max(500).optional(),
  /** When students are to have them, in milliseconds; at once when left out or past. */
  dueAt: z.int().min(0).optional(),
})

/**
 * Hands a class set back, or some of its scripts: puts down every one that can go and was not handed back as it stands now, and asks the
 * worker to build them, at once or on their day. Students see nothing before all are built. What keeps another script back is not asked of
 * a chosen one. Gives the release's id. Throws checks_open while a line of the clerical check is
 * open, already_there while a release is being built or waits, nothing_to_return, and bad_input for a day too far away.
 */
export async function startRelease(actor: Actor, classSetId: string, { scriptIds, dueAt }: z.output<typeof ReleaseForm> = {}): Promise<string> {
  return transaction(async (trx) => {
    const set = await gateClassSet(trx, actor, 'change', classSetId)
    const at = now()
    if (dueAt !== undefined && dueAt > at + longestWait) throw new AppError('bad_input')
    if (await isBuilding(trx, classSetId)) throw new AppError('already_there')
    const gathered = await gatherClassSet(trx, classSetId)
    const checks = await checkClassSet(trx, actor, gathered)
    const chosen = scriptIds && new Set(scriptIds)
    // A line about no script (a loose sheet, a student without one) may be about any of them.
    const open = openLines(checks).filter(({ scriptId }) => !chosen || scriptId === null || chosen.has(scriptId)).length
    if (open > 0) throw new AppError('checks_open', { open })
    const going = scriptsToGo(gathered, checks, await listStanding(trx, classSetId)).filter(({ goes, scriptId }) => goes && (!chosen || chosen.has(scriptId)))
    if (going.length === 0) throw new AppError('nothing_to_return')
    const waits = dueAt !== undefined && dueAt > at ? dueAt : null
    const releaseId = await addRelease(trx, { classSetId, createdBy: actor.userId, at, dueAt: waits })
    await addReturnedScripts(trx, releaseId, going.map(({ scriptId, studentId }) => ({ scriptId, studentId: studentId! })))
    await addJob(trx, 'build-release', releaseId, waits === null ? 0 : waits - at)
    await addAuditLine(trx, actor, { act: 'release.started', objectKind: 'release', objectId: releaseId, paperId: set.paperId, to: going.length })
    return releaseId
  })
}
