import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { paperMaximum, type GradeScale } from '@/lib/core/paper'
import { assertScale } from '@/lib/results/assert-scale'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { getScale } from '@/db/grade-scales'
import { getPaper, setGradeScale } from '@/db/papers'
import { gatePaper } from './gate-paper'

// "A 32, B 28": short enough for an audit line, and no name in it but the grades'.
const inShort = ({ oddHalf, boundaries }: GradeScale) => [oddHalf, ...boundaries.map(({ grade, lowest }) => `${grade} ${lowest}`)].join(', ')

/** Stores the grade scale of a paper, boundaries in half marks; no mark changes. Throws bad_input with a line for each faulty boundary. */
export async function saveGrades(actor: Actor, paperId: string, scale: GradeScale): Promise<void> {
  await transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    const paper = await getPaper(trx, paperId)
    if (!paper) throw new AppError('not_found')
    const named = { ...scale, boundaries: scale.boundaries.map(({ grade, lowest }) => ({ grade: grade.trim(), lowest })) }
    assertScale(named, paperMaximum(paper.questions))
    const before = await getScale(trx, paperId)
    await setGradeScale(trx, paperId, named.oddHalf, named.boundaries)
    await addAuditLine(trx, actor, { act: 'grade-scale.changed', objectKind: 'paper', objectId: paperId, paperId, from: inShort(before), to: inShort(named) })
  })
}
