import { readFileSync } from 'node:fs'
import path from 'node:path'
import { db } from '@/db/knex'
import { newId } from '@/lib/core/ids'

const folder = path.join(import.meta.dirname, '../../seeds/class-sets')

/** A real paper of the demo school: its paper.json, parsed, and the bytes of its blank PDF. */
export function realPaper(name: 'everyday' | 'one-page' | 'bitonal' | 'booklet'): { file: Record<string, unknown>; pdf: Buffer } {
  return { file: JSON.parse(readFileSync(path.join(folder, name, 'paper.json'), 'utf8')) as Record<string, unknown>, pdf: readFileSync(path.join(folder, name, 'paper.pdf')) }
}

/** A class with students, taught by `teacher`. */
export async function aClass(teacher: string, students = 2): Promise<{ classId: string; studentIds: string[] }> {
  const classId = newId()
  await db()('classes').insert({ id: classId, name: `C${classId.slice(0, 6)}`, created_at: 1 })
  await db()('class_teachers').insert({ class_id: classId, user_id: teacher })
  const studentIds: string[] = []
  for (let n = 0; n < students; n++) studentIds.push(await aStudentOf(classId))
  return { classId, studentIds }
}

export async function aStudentOf(classId: string): Promise<string> {
  const id = newId()
  await db()('students').insert({ id, candidate_number: `0${id.slice(0, 8)}`, given_name: 'Wren', family_name: 'Test', created_at: 1 })
  await db()('class_students').insert({ class_id: classId, student_id: id })
  return id
}

/** One stamp of a first marking on a response of `questionId` by `marker`, worth so many halves. */
export async function aStamp(scriptId: string, questionId: string, marker: string, worth: number, markPointId: string | null = null): Promise<void> {
  const response = await db()('responses').where({ script_id: scriptId, question_id: questionId }).first<{ id: string }>('id')
  const markingId = newId()
  await db()('markings').insert({ id: markingId, response_id: response.id, round: 'first', marker_id: marker, created_at: 1 })
  await db()('stamps').insert({ id: newId(), marking_id: markingId, version: 1, kind: 'tick', worth, mark_point_id: markPointId, x: 1, y: 1, w: 0, h: 0, saved_at: 1 })
}
