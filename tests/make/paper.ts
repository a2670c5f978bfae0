import { db } from '@/db/knex'
import { addPaper, setPaperBoxes } from '@/db/papers'
import { putQuestion } from '@/db/questions'
import { ensureResponses } from '@/db/responses'
import { newId } from '@/lib/core/ids'
import { halves, type MarkingStep } from '@/lib/core/marks'

type Made = Readonly<{ paperId: string; questionIds: string[]; classSetId: string; studentIds: string[]; scriptIds: string[] }>
type Wanted = Readonly<{ owner: string; questions?: readonly { label: string; worths: readonly number[] }[]; students?: number; step?: MarkingStep; scripts?: boolean }>

/**
 * A paper of one A4 page with questions (worths in halves, one mark point each), a class set of `students`, and a placed script
 * with one page for each of them (no image behind it).
 */
export async function aPaper({ owner, questions = [{ label: '1', worths: [1, 1] }, { label: '2', worths: [2, 2] }], students = 3, step = 1, scripts = true }: Wanted): Promise<Made> {
  const paperId = newId()
  await addPaper(db(), { id: paperId, title: 'Light and shadow', step, tolerance: halves(1), keepUntil: '2028-01-31', createdBy: owner })
  await db()('paper_pages').insert({ paper_id: paperId, page: 1, width: 595.28, height: 841.89 })
  await setPaperBoxes(db(), paperId, [{ kind: 'name', page: 1, rect: { x: 90, y: 90, w: 250, h: 30 } }])
  const questionIds: string[] = []
  for (const [position, { label, worths }] of questions.entries()) {
    const id = newId()
    questionIds.push(id)
    await putQuestion(db(), paperId, {
      id, label, position, maximum: halves(worths.reduce((a, b) => a + b, 0)), text: '', answer: '', modelSolution: '', schemeNote: '', tolerance: null,
      spaces: [{ id: newId(), page: 1, rect: { x: 48, y: 150 + position * 100, w: 499, h: 94 } }],
      points: worths.map((worth, k) => ({ id: newId(), label: `Point ${k + 1}`, worth: halves(worth), kind: null, dependsOn: null, note: '', withdrawn: false })),
    })
  }
  const classId = newId()
  await db()('classes').insert({ id: classId, name: `C${classId.slice(0, 6)}`, created_at: Date.now() })
  await db()('class_teachers').insert({ class_id: classId, user_id: owner })
  const classSetId = newId()
  await db()('class_sets').insert({ id: classSetId, paper_id: paperId, class_id: classId, sat_on: '2026-11-12', created_at: Date.now() })
  const studentIds: string[] = []
  const scriptIds: string[] = []
  for (let n = 0; n < students; n++) {
    const id = newId()
    studentIds.push(id)
    const row = { candidate_number: `${Math.floor(Math.random() * 1e9)}`, given_name: `Given${n}`, family_name: `Family${n}` }
    await db()('students').insert({ id, ...row, email: null, created_at: Date.now() })
    await db()('class_students').insert({ class_id: classId, student_id: id })
    await db()('class_set_students').insert({ class_set_id: classSetId, student_id: id, ...row })
    if (scripts) scriptIds.push(await aScript(classSetId, id, n))
  }
  if (scripts) await ensureResponses(db(), paperId)
  return { paperId, questionIds, classSetId, studentIds, scriptIds }
}

async function aScript(classSetId: string, studentId: string, position: number): Promise<string> {
  const id = newId()
  await db()('scripts').insert({ id, class_set_id: classSetId, student_id: studentId, position, confirmed_at: Date.now(), created_at: Date.now() })
  await db()('script_pages').insert({ id: newId(), script_id: id, paper_page: 1, position: 1 })
  return id
}

/** The ids of what belongs to one script and question: its response and its first page. */
export async function responseOf(scriptId: string, questionId: string): Promise<{ responseId: string; scriptPageId: string }> {
  const response = await db()('responses').where({ script_id: scriptId, question_id: questionId }).first<{ id: string }>('id')
  const page = await db()('script_pages').where({ script_id: scriptId }).orderBy('position').first<{ id: string }>('id')
  return { responseId: response.id, scriptPageId: page.id }
}
