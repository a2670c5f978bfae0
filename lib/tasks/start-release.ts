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

/**
 * Hands a class set back: puts down every script that can go and was not handed back as it stands now, and asks the worker to build
 * them. Students see nothing before all are built. Gives the release's id. Throws checks_open while a line of the clerical check is
 * open, already_there while a release is being built, and nothing_to_return.
 */
export async function startRelease(actor: Actor, classSetId: string): Promise<string> {
  return transaction(async (trx) => {
    const set = await gateClassSet(trx, actor, 'change', classSetId)
    if (await isBuilding(trx, classSetId)) throw new AppError('already_there')
    const gathered = await gatherClassSet(trx, classSetId)
    const checks = await checkClassSet(trx, actor, gathered)
    const open = openLines(checks).length
    if (open > 0) throw new AppError('checks_open', { open })
    const going = scriptsToGo(gathered, checks, await listStanding(trx, classSetId)).filter(({ goes }) => goes)
    if (going.length === 0) throw new AppError('nothing_to_return')
    const releaseId = await addRelease(trx, { classSetId, createdBy: actor.userId, at: now() })
    await addReturnedScripts(trx, releaseId, going.map(({ scriptId, studentId }) => ({ scriptId, studentId: studentId! })))
    await addJob(trx, 'build-release', releaseId)
    await addAuditLine(trx, actor, { act: 'release.started', objectKind: 'release', objectId: releaseId, paperId: set.paperId, to: going.length })
    return releaseId
  })
}
