import { mayOnPaper, type Actor, type PaperStanding } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { MarkBook } from '@/lib/core/mark-book'
import { listClassSets } from '@/db/class-sets'
import { db } from '@/db/knex'
import { listCells, listColumns, listScriptsOfSet, listStudentsOfSet, type CellOfSet } from '@/db/mark-book'
import { getScale } from '@/db/grade-scales'
import { blindResponseIds } from '@/db/samples'
import { markBookOf, type Standing } from '@/lib/results/mark-book-of'
import { pairRows } from '@/lib/results/mark-book-rows'
import { gatePaper } from './gate-paper'

function standingOf(cell: CellOfSet, hidden: boolean): Standing {
  return {
    responseId: cell.responseId, scriptId: cell.scriptId, questionId: cell.questionId, hasPage: cell.hasPage === 1, raw: cell.raw, adjustment: cell.adjustment,
    nothingWritten: cell.nothingWritten === 1, secondMarked: cell.secondMarked === 1, agreed: cell.countingRound === 'agreed', flagged: cell.flagged === 1, hidden,
  }
}

const marksQuestion = ({ marks }: PaperStanding, id: string) => marks === 'all' || marks.includes(id)

/**
 * The mark book of one class set (the first when none is named). An owner sees all of it; a marker the columns of their own
 * questions, without names and totals; who only moderates sees none, and nobody sees a first mark of what they still have to
 * second-mark. Throws not_found and not_allowed.
 */
export async function readMarkBook(actor: Actor, paperId: string, classSetId?: string): Promise<MarkBook> {
  const standing = await gatePaper(db(), actor, 'see', paperId)
  const whole = mayOnPaper(actor, 'change', standing)
  if (!whole && !(actor.roles.includes('marker') && standing.marks.length > 0)) throw new AppError('not_allowed')
  const classSets = (await listClassSets(db(), paperId)).map(({ id, className, satOn }) => ({ id, className, satOn }))
  const chosen = classSetId === undefined ? classSets[0] : classSets.find(({ id }) => id === classSetId)
  if (classSetId !== undefined && !chosen) throw new AppError('not_found')
  const questions = (await listColumns(db(), paperId)).filter(({ id }) => whole || marksQuestion(standing, id))
  const [scale, blind] = [await getScale(db(), paperId), await blindResponseIds(db(), actor.userId, paperId)]
  const read = chosen ? { students: await listStudentsOfSet(db(), chosen.id), scripts: await listScriptsOfSet(db(), chosen.id), cells: await listCells(db(), chosen.id) } : { students: [], scripts: [], cells: [] }
  const pairs = pairRows(read.students, read.scripts)
  const seen = whole ? pairs : pairs.filter(({ script }) => script !== null).sort((a, b) => a.script!.position - b.script!.position)
  const own = new Set(questions.map(({ id }) => id))
  const standings = read.cells.filter(({ questionId }) => own.has(questionId)).map((cell) => standingOf(cell, blind.has(cell.responseId) && cell.countingMarkerId !== actor.userId))
  return {
    paperId, title: scale.title, classSets, classSetId: chosen?.id ?? null, whole, gradeNames: whole ? scale.boundaries.map(({ grade }) => grade) : [],
    ...markBookOf({ questions, pairs: seen, standings, scale, whole }),
  }
}
