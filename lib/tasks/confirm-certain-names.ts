import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { certainName } from '@/lib/core/sorting'
import { now } from '@/lib/infra/clock'
import { getScript, setScriptName } from '@/db/scripts'
import { assertListed, markPresent } from './script-for'
import { decideSorting } from './sorting-record'

export type CertainName = Readonly<{ scriptId: string; classSetId: string; studentId: string }>

/**
 * Confirms names that the boxes say with certainty, as a person saw them together at a glance: one decision, undone as one. Throws out_of_date when
 * any of them is no longer the certain suggestion it was; then none is confirmed.
 */
export async function confirmCertainNames(actor: Actor, paperId: string, names: readonly CertainName[]): Promise<void> {
  await decideSorting(actor, paperId, 'script.certain-named', { kind: 'paper', id: paperId, to: `${names.length} scripts` }, async (trx, touch) => {
    for (const { scriptId, classSetId, studentId } of names) {
      const script = await getScript(trx, scriptId)
      if (!script || script.paperId !== paperId) throw new AppError('not_found')
      const still = script.studentId === null && script.classSetId === classSetId && script.suggestedStudentId === studentId
      if (!still || (script.suggestionCertainty ?? 0) < certainName) throw new AppError('out_of_date')
      await assertListed(trx, paperId, classSetId, studentId)
      await touch.script(scriptId)
      await markPresent(trx, touch, classSetId, studentId)
      await setScriptName(trx, scriptId, { classSetId, studentId, suggestedStudentId: null, suggestionReason: null, suggestionCertainty: null, confirmedBy: actor.userId, confirmedAt: now() })
    }
  })
}
