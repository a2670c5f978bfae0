import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { addSampleScript, listSampleScripts } from '@/db/samples'
import { gateSample } from './gate-sample'
import { sampleCandidates } from './sample-candidates'

/** Puts one more script of the class set into a sample, by its moderator or an owner. Throws not_found for a script that is none of it, already_there. */
export async function addToSample(actor: Actor, { sampleId, scriptId }: Readonly<{ sampleId: string; scriptId: string }>): Promise<void> {
  await transaction(async (trx) => {
    const { paperId, classSetId } = await gateSample(trx, actor, sampleId)
    const { candidates } = await sampleCandidates(trx, paperId, classSetId)
    if (!candidates.some((one) => one.scriptId === scriptId)) throw new AppError('not_found')
    if ((await listSampleScripts(trx, paperId)).some((one) => one.sampleId === sampleId && one.scriptId === scriptId)) throw new AppError('already_there')
    await addSampleScript(trx, sampleId, scriptId)
    await addAuditLine(trx, actor, { act: 'sample.script-added', objectKind: 'sample', objectId: sampleId, paperId, to: scriptId })
  })
}
