import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { listMarkers, listPeopleWith, setMarkerQuestions } from '@/db/paper-people'
import { listQuestions } from '@/db/questions'
import { gatePaper } from './gate-paper'

export type AssignMarker = Readonly<{ paperId: string; userId: string; /** Null: every question; empty: none any more. */ questionIds: readonly string[] | null }>

/** Says which questions of a paper a marker marks. What they have marked already stays. */
export async function assignMarker(actor: Actor, { paperId, userId, questionIds }: AssignMarker): Promise<void> {
  await transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    const before = (await listMarkers(trx, paperId)).filter((marker) => marker.userId === userId)
    const isMarker = (await listPeopleWith(trx, 'marker')).some((person) => person.userId === userId)
    if (!isMarker && before.length === 0) throw new AppError('not_found')
    const own = new Set((await listQuestions(trx, paperId)).map(({ id }) => id))
    if (questionIds?.some((id) => !own.has(id))) throw new AppError('not_found')
    const wanted = questionIds === null ? null : [...new Set(questionIds)]
    const was = say(before.some(({ questionId }) => questionId === null) ? null : before.map(({ questionId }) => questionId!))
    if (was === say(wanted)) return
    await setMarkerQuestions(trx, paperId, userId, wanted)
    await addAuditLine(trx, actor, { act: 'marker.assigned', objectKind: 'user', objectId: userId, paperId, from: was, to: say(wanted) })
  })
}

function say(questionIds: readonly string[] | null): string {
  return questionIds === null ? 'all' : [...questionIds].sort().join(' ') || 'none'
}
