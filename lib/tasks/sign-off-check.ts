import { z } from 'zod'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { checkKeys } from '@/lib/core/hand-back'
import { addAuditLine } from '@/db/audit'
import { addSignOff, dropSignOff } from '@/db/check-sign-offs'
import { transaction } from '@/db/knex'
import { now } from '@/lib/infra/clock'
import { signKey } from '@/lib/handing-back/clerical-check'
import { checkClassSet } from './check-class-set'
import { gateClassSet } from './gate-class-set'
import { gatherClassSet } from './gather-class-set'

export const SignOffForm = z.object({
  classSetId: z.string().min(1),
  check: z.enum(checkKeys),
  subjects: z.array(z.string().min(1).max(80)).min(1).max(500),
  reason: z.string().trim().min(3, 'Say in a few words why this may stand.').max(300),
})
export const SignatureForm = SignOffForm.pick({ classSetId: true, check: true }).extend({ subject: z.string().min(1).max(80) })

/**
 * Signs lines of the clerical check by one's own name, with a reason. For what nobody may sign away (no sure name, marks missing)
 * the same act keeps that script back. Throws out_of_date when a line is not there any more.
 */
export async function signOffCheck(actor: Actor, { classSetId, check, subjects, reason }: z.output<typeof SignOffForm>): Promise<void> {
  await transaction(async (trx) => {
    const set = await gateClassSet(trx, actor, 'change', classSetId)
    const found = (await checkClassSet(trx, actor, await gatherClassSet(trx, classSetId))).find(({ key }) => key === check)!
    const there = new Set(found.lines.map(({ subject }) => subject))
    if (subjects.some((subject) => !there.has(subject))) throw new AppError('out_of_date')
    for (const subject of subjects) {
      await addSignOff(trx, { classSetId, key: signKey(check, subject), reason, by: actor.userId, at: now() })
      await addAuditLine(trx, actor, { act: found.closing === 'sign' ? 'check.signed' : 'script.kept-back', objectKind: 'class-set', objectId: classSetId, paperId: set.paperId, to: signKey(check, subject) })
    }
  })
}

/** Takes a signature back, or lets a script that was kept back go again. Throws out_of_date when there is none. */
export async function takeBackSignature(actor: Actor, { classSetId, check, subject }: z.output<typeof SignatureForm>): Promise<void> {
  await transaction(async (trx) => {
    const set = await gateClassSet(trx, actor, 'change', classSetId)
    const key = signKey(check, subject)
    if (!(await dropSignOff(trx, classSetId, key))) throw new AppError('out_of_date')
    await addAuditLine(trx, actor, { act: 'check.signature-taken-back', objectKind: 'class-set', objectId: classSetId, paperId: set.paperId, from: key })
  })
}
