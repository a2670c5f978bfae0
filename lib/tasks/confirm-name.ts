import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { now } from '@/lib/infra/clock'
import { db } from '@/db/knex'
import { findScriptOfStudent, getScript, setScriptName } from '@/db/scripts'
import { assertListed, markPresent } from './script-for'
import { decideSorting } from './sorting-record'

/** Gives a script its student's name: a person read the name box. Throws name_taken when another script bears it. */
export async function confirmName(actor: Actor, { scriptId, classSetId, studentId }: { scriptId: string; classSetId: string; studentId: string }): Promise<void> {
  const script = await getScript(db(), scriptId)
  if (!script) throw new AppError('not_found')
  await decideSorting(actor, script.paperId, 'script.named', { kind: 'script', id: scriptId, to: studentId }, async (trx, touch) => {
    await assertListed(trx, script.paperId, classSetId, studentId)
    const other = await findScriptOfStudent(trx, classSetId, studentId)
    if (other && other.id !== scriptId) throw new AppError('name_taken', { script: other.position })
    await touch.script(scriptId)
    await markPresent(trx, touch, classSetId, studentId)
    await setScriptName(trx, scriptId, { classSetId, studentId, suggestedStudentId: null, suggestionReason: null, suggestionCertainty: null, confirmedBy: actor.userId, confirmedAt: now() })
  })
}

/** Takes a script's name away again, to be read anew. */
export async function takeNameAway(actor: Actor, { scriptId }: { scriptId: string }): Promise<void> {
  const script = await getScript(db(), scriptId)
  if (!script) throw new AppError('not_found')
  await decideSorting(actor, script.paperId, 'script.unnamed', { kind: 'script', id: scriptId }, async (trx, touch) => {
    const current = await getScript(trx, scriptId)
    if (!current?.studentId) throw new AppError('out_of_date')
    await touch.script(scriptId)
    await setScriptName(trx, scriptId, { classSetId: current.classSetId, studentId: null, suggestedStudentId: null, suggestionReason: null, suggestionCertainty: null, confirmedBy: null, confirmedAt: null })
  })
}
