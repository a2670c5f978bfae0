import { createHash } from 'node:crypto'
import type { AdjustmentPlan } from '@/lib/core/adjusting'
import { AppError } from '@/lib/core/errors'
import { effectOfAdjustment, type Adjusted, type Standing } from '@/lib/results/effect-of-adjustment'
import { markerPatterns } from '@/lib/second-marking/marker-patterns'
import { comparedResponseIds } from '@/db/counting-decisions'
import { getClassSet } from '@/db/class-sets'
import { getScale } from '@/db/grade-scales'
import type { Db } from '@/db/knex'
import { listCells, listScriptsOfSet, listStudentsOfSet, type CellOfSet } from '@/db/mark-book'
import { getPaper } from '@/db/papers'
import { listSampledAnswers } from '@/db/sampled-answers'
import type { Sample } from '@/db/samples'

export type AskedAdjustment = Readonly<{ sampleId: string; questionId: string; markerId: string }>
type Planned = AdjustmentPlan & Readonly<{ answers: readonly { responseId: string; markingId: string }[]; shift: number }>

function standingOf(cell: CellOfSet | undefined, markerId: string, compared: ReadonlySet<string>): Standing {
  if (!cell || cell.raw === null) return 'other'
  const first = cell.countingRound === 'first' || cell.countingRound === 're-mark'
  if (!first || compared.has(cell.responseId)) return 'own'
  return cell.countingMarkerId === markerId ? 'theirs' : 'other'
}

/** Every script of the class set with how its answer stands to the adjustment, named as the list names them. */
async function scriptsOf(trx: Db, { classSetId }: Sample, { questionId, markerId }: AskedAdjustment, cells: readonly CellOfSet[]): Promise<Adjusted[]> {
  const compared = await comparedResponseIds(trx, classSetId)
  const students = new Map((await listStudentsOfSet(trx, classSetId)).map((student) => [student.studentId, student]))
  return (await listScriptsOfSet(trx, classSetId)).map(({ scriptId, position, studentId }) => {
    const marks = cells.filter((cell) => cell.scriptId === scriptId)
    const student = studentId === null ? undefined : students.get(studentId)
    return { scriptId, number: position + 1, name: student ? `${student.familyName}, ${student.givenName}` : null, marks, standing: standingOf(marks.find((cell) => cell.questionId === questionId), markerId, compared) }
  })
}

/**
 * The adjustment that a sample calls for, with its effect on every script of the class set; after the caller's gate. Throws not_found, or no_pattern when the marks do not
 * call for one.
 */
export async function planAdjustment(trx: Db, sample: Sample, asked: AskedAdjustment): Promise<Planned> {
  const { questionId, markerId } = asked
  const [paper, set] = [(await getPaper(trx, sample.paperId))!, (await getClassSet(trx, sample.classSetId))!]
  const question = paper.questions.find(({ id }) => id === questionId)
  if (!question) throw new AppError('not_found')
  const answers = (await listSampledAnswers(trx, paper.id)).filter((one) => one.sampleId === sample.id && one.questionId === questionId)
  const column = { id: questionId, label: question.label, maximum: question.maximum, tolerance: question.tolerance ?? sample.tolerance }
  const pattern = markerPatterns(answers, [column], paper.step).find((one) => one.markerId === markerId)
  if (!pattern) throw new AppError('not_found')
  if (pattern.pattern.shift === null) throw new AppError('no_pattern', { why: pattern.pattern.why })
  const { shift } = pattern.pattern
  const cells = await listCells(trx, set.id)
  const scripts = await scriptsOf(trx, sample, asked, cells)
  const scale = await getScale(trx, paper.id)
  const lines = effectOfAdjustment({ questions: paper.questions, scale, questionId, halves: shift, scripts })
  const theirs = new Set(scripts.filter(({ standing }) => standing === 'theirs').map(({ scriptId }) => scriptId))
  const key = createHash('sha256').update(JSON.stringify([shift, lines.map(({ scriptId, kind, mark, total }) => [scriptId, kind, mark, total])])).digest('hex').slice(0, 32)
  return {
    paperId: paper.id, sampleId: sample.id, className: set.className, maximum: question.maximum, graded: scale.boundaries.length > 0, pattern, lines, key, shift,
    answers: cells.filter((cell) => cell.questionId === questionId && theirs.has(cell.scriptId)).map(({ responseId, countingMarkingId }) => ({ responseId, markingId: countingMarkingId! })),
  }
}
