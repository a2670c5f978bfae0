import { readFileSync } from 'node:fs'
import { db } from '@/db/knex'
import { ensureResponses } from '@/db/responses'
import { addStoredFile } from '@/db/stored-files'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { keepBytes } from '@/lib/infra/file-store'
import { aClassSetPaper } from './class-set'

type TruthLeaf = Readonly<{ index: number; kind: string; candidate_number: string | null; paper_page: number | null; rotation: number; homography: number[][] | null; width_px: number; height_px: number }>
type Marked = Readonly<{ paperId: string; classSetId: string; scripts: readonly Readonly<{ scriptId: string; studentId: string; number: string; leaves: readonly number[] }>[]; questionIds: readonly string[]; scan: string }>

/** The everyday class set with its real sheaf, leaves placed as the truth file says, names confirmed, every answer of the first `most` students marked; the others are absent. */
export async function aMarkedClassSet(teacher: Actor, most = 3): Promise<Marked> {
  const { paperId, classSetId, students, truth, scan } = await aClassSetPaper(teacher.userId, 'everyday')
  const leaves = (truth as unknown as TruthLeaf[]).filter(({ kind }) => kind === 'script')
  const numbers = [...new Set(leaves.map(({ candidate_number }) => candidate_number!))].slice(0, most)
  await db()('class_set_students').where({ class_set_id: classSetId }).whereNotIn('student_id', numbers.map((number) => students[number]!)).update({ attendance: 'absent' })
  const sheafId = await aPlacedSheaf(paperId, classSetId, scan, truth.length)
  const scripts = []
  for (const [position, number] of numbers.entries()) {
    const scriptId = newId()
    await db()('scripts').insert({ id: scriptId, class_set_id: classSetId, student_id: students[number], position, confirmed_by: teacher.userId, confirmed_at: 1, created_at: 1 })
    const own = leaves.filter(({ candidate_number }) => candidate_number === number)
    for (const leaf of own) await layLeaf(sheafId, scriptId, leaf)
    scripts.push({ scriptId, studentId: students[number]!, number, leaves: own.map(({ index }) => index) })
  }
  await ensureResponses(db(), paperId)
  await markAll(paperId, teacher.userId)
  const questionIds = (await db()('questions').where({ paper_id: paperId }).orderBy('position').pluck('id')) as string[]
  return { paperId, classSetId, scripts, questionIds, scan }
}

async function aPlacedSheaf(paperId: string, classSetId: string, scan: string, leafCount: number): Promise<string> {
  const [fileId, sheafId] = [newId(), newId()]
  await addStoredFile(db(), { id: fileId, ...(await keepBytes(readFileSync(scan))), mediaType: 'application/pdf', originalName: '8K.pdf', createdBy: null })
  await db()('sheaves').insert({ id: sheafId, paper_id: paperId, file_id: fileId, state: 'placed', leaf_count: leafCount, created_at: 1 })
  await db()('sheaf_class_sets').insert({ sheaf_id: sheafId, class_set_id: classSetId })
  return sheafId
}

async function layLeaf(sheafId: string, scriptId: string, leaf: TruthLeaf): Promise<void> {
  const [pageId, leafId] = [newId(), newId()]
  await db()('script_pages').insert({ id: pageId, script_id: scriptId, paper_page: leaf.paper_page, position: leaf.paper_page! })
  await db()('leaves').insert({
    id: leafId, sheaf_id: sheafId, position: leaf.index, state: 'placed', width: leaf.width_px, height: leaf.height_px, turn: leaf.rotation,
    homography: JSON.stringify(leaf.homography), paper_page: leaf.paper_page, script_page_id: pageId,
  })
  await db()('script_pages').where({ id: pageId }).update({ leaf_id: leafId })
}

/** One stamp on each answer, on the first mark point, which earns its worth. */
async function markAll(paperId: string, markerId: string): Promise<void> {
  const rows = (await db()('responses').join('scripts', 'scripts.id', 'responses.script_id').join('questions', 'questions.id', 'responses.question_id').join('answer_spaces', 'answer_spaces.question_id', 'questions.id')
    .join('script_pages', (join) => join.on('script_pages.script_id', 'scripts.id').andOn('script_pages.paper_page', 'answer_spaces.page'))
    .where('questions.paper_id', paperId).select({ response: 'responses.id', page: 'script_pages.id', question: 'questions.id', x: 'answer_spaces.x', y: 'answer_spaces.y' })) as { response: string; page: string; question: string; x: number; y: number }[]
  for (const { response, page, question, x, y } of rows) {
    const point = await db()('mark_points').where({ question_id: question }).orderBy('position').first<{ id: string; worth: number }>('id', 'worth')
    const id = newId()
    await db()('markings').insert({ id, response_id: response, round: 'first', marker_id: markerId, state: 'settled', created_at: 1, settled_at: 1 })
    await db()('stamps').insert({ id: newId(), marking_id: id, version: 1, kind: 'tick', worth: point.worth, mark_point_id: point.id, script_page_id: page, x: x + 200, y: y + 40, w: 0, h: 0, text: '', path: '[]', saved_at: 1 })
    await db()('counting_decisions').insert({ id: newId(), response_id: response, marking_id: id, reason: 'first_mark', decided_by: markerId, decided_at: 1 })
  }
}

/** An account for a student of the list. */
export async function anAccountOf(studentId: string): Promise<Actor> {
  const userId = newId()
  await db()('users').insert({ id: userId, email: `${userId.slice(0, 8)}@kestrelbay.example`, given_name: 'Sam', family_name: 'Pupil', created_at: 1 })
  await db()('user_roles').insert({ user_id: userId, role: 'student' })
  await db()('students').where({ id: studentId }).update({ user_id: userId })
  return { userId, givenName: 'Sam', familyName: 'Pupil', roles: ['student'], studentId }
}
