import { AppError } from '@/lib/core/errors'
import { gradeOf } from '@/lib/core/grade-of'
import type { Paper } from '@/lib/core/paper'
import type { ClassSet } from '@/db/class-sets'
import { getClassSet } from '@/db/class-sets'
import type { Db } from '@/db/knex'
import { listCells, listScriptsOfSet, listStudentsOfSet, type CellOfSet, type ScriptOfSet, type StudentOfSet } from '@/db/mark-book'
import { getPaper } from '@/db/papers'
import { listSamples } from '@/db/samples'
import { listAdjustments, listCountingMarkings, listPagesToReturn, type Adjustment, type CountingMarking, type PageToReturn } from '@/db/scripts-to-return'
import { env } from '@/lib/infra/env'
import type { GatheredAnswer, GatheredScript } from '@/lib/handing-back/script-to-return'
import { totalOf } from '@/lib/results/total-of'

/** One class set as it stands now, read in a few statements, for checking and for building. */
export type GatheredSet = Readonly<{
  paper: Paper
  set: ClassSet
  students: readonly StudentOfSet[]
  scripts: readonly ScriptOfSet[]
  cells: ReadonlyMap<string, readonly CellOfSet[]>
  markings: ReadonlyMap<string, readonly CountingMarking[]>
  pages: ReadonlyMap<string, readonly PageToReturn[]>
  adjustments: readonly Adjustment[]
  sampled: boolean
}>

function byScript<T extends { scriptId: string }>(rows: readonly T[]): Map<string, T[]> {
  const found = new Map<string, T[]>()
  for (const row of rows) {
    const of = found.get(row.scriptId)
    if (of) of.push(row)
    else found.set(row.scriptId, [row])
  }
  return found
}

/** Reads a class set with its scripts, pages and counting marks. Throws not_found. */
export async function gatherClassSet(db: Db, classSetId: string): Promise<GatheredSet> {
  const set = await getClassSet(db, classSetId)
  const paper = set && (await getPaper(db, set.paperId))
  if (!set || !paper) throw new AppError('not_found')
  return {
    paper, set, students: await listStudentsOfSet(db, classSetId), scripts: await listScriptsOfSet(db, classSetId),
    cells: byScript(await listCells(db, classSetId)), markings: byScript(await listCountingMarkings(db, classSetId)), pages: byScript(await listPagesToReturn(db, classSetId)),
    adjustments: await listAdjustments(db, classSetId), sampled: (await listSamples(db, paper.id)).some((sample) => sample.classSetId === classSetId),
  }
}

function answersOf(gathered: GatheredSet, scriptId: string): GatheredAnswer[] {
  const markings = new Map((gathered.markings.get(scriptId) ?? []).map((marking) => [marking.questionId, marking]))
  return (gathered.cells.get(scriptId) ?? []).map(({ questionId, hasPage }) => ({
    questionId, hasPage: hasPage === 1, marking: markings.get(questionId) ?? null,
    adjustments: gathered.adjustments.filter((one) => one.scriptId === scriptId && one.questionId === questionId),
  }))
}

type Named = Pick<GatheredScript, 'givenName' | 'familyName' | 'candidateNumber'>

/** One script with its student as the builder takes it. While its name is open it goes by `otherwise`; null without that. */
export function gatheredScript(gathered: GatheredSet, scriptId: string): GatheredScript | null
export function gatheredScript(gathered: GatheredSet, scriptId: string, otherwise: Named): GatheredScript
export function gatheredScript(gathered: GatheredSet, scriptId: string, otherwise: Named | null = null): GatheredScript | null {
  const script = gathered.scripts.find((one) => one.scriptId === scriptId)
  const student = gathered.students.find(({ studentId }) => studentId === script?.studentId) ?? otherwise
  if (!student) return null
  const { paper, set } = gathered
  const total = totalOf(paper.questions, (gathered.cells.get(scriptId) ?? []))
  return {
    paper, school: env.schoolName, className: set.className, satOn: set.satOn, givenName: student.givenName, familyName: student.familyName, candidateNumber: student.candidateNumber,
    pages: (gathered.pages.get(scriptId) ?? []).flatMap(({ id, paperPage, leaf }) => (leaf ? [{ id, paperPage, leaf }] : [])),
    answers: answersOf(gathered, scriptId), total, grade: total.toCome === 0 ? gradeOf(paper.scale, total.final) : null, sampled: gathered.sampled,
  }
}
