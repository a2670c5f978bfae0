import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { ReturnedScriptLine, ReturnedScriptView } from '@/lib/core/returned'
import { addAuditLine } from '@/db/audit'
import { db, transaction } from '@/db/knex'
import { listReturnedTo, noteRead } from '@/db/returned-scripts'
import { now } from '@/lib/infra/clock'
import { readKept } from '@/lib/infra/file-store'
import { gateReturned } from './gate-returned'

/** All that stands handed back to the student who asks. Throws not_allowed for staff: they have the mark book. */
export async function readMyScripts(actor: Actor): Promise<ReturnedScriptLine[]> {
  if (!actor.roles.includes('student')) throw new AppError('not_allowed')
  return actor.studentId === null ? [] : listReturnedTo(db(), actor.studentId)
}

/** A returned script as it was frozen with its release; that its student has read it is noted once. Throws not_found. */
export async function readReturnedScript(actor: Actor, id: string): Promise<ReturnedScriptView> {
  const { revision, handedBackAt, detail } = await opened(actor, id)
  return { id, revision, handedBackAt, detail }
}

/** The file of a returned script, byte for byte as it was handed back. Throws not_found. */
export async function openReturnedPdf(actor: Actor, id: string): Promise<{ bytes: Buffer; name: string }> {
  const { sha256, detail } = await opened(actor, id)
  return { bytes: await readKept(sha256), name: `${detail.title}, ${detail.givenName} ${detail.familyName}.pdf` }
}

async function opened(actor: Actor, id: string) {
  return transaction(async (trx) => {
    const found = await gateReturned(trx, actor, id)
    if (found.asStudent && (await noteRead(trx, id, now()))) await addAuditLine(trx, actor, { act: 'returned-script.first-read', objectKind: 'returned-script', objectId: id, paperId: found.paperId })
    return found
  })
}
