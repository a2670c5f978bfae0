import { readFileSync } from 'node:fs'
import path from 'node:path'
import { db } from '@/db/knex'
import { addPaper, setBlankPaper, setPaperBoxes } from '@/db/papers'
import { putQuestion } from '@/db/questions'
import { addStoredFile } from '@/db/stored-files'
import { keepBytes } from '@/lib/infra/file-store'
import { newId } from '@/lib/core/ids'
import { readPaperFile } from '@/lib/setting/read-paper-file'
import { halves } from '@/lib/core/marks'

export type ClassSetName = 'one-page' | 'everyday' | 'booklet' | 'bitonal'
type TruePage = Readonly<{ index: number; kind: 'script' | 'blank' | 'foreign'; candidate_number?: string; paper_page?: number; rotation: number; homography: number[][] | null }>
type Made = Readonly<{ paperId: string; classSetId: string; students: Readonly<Record<string, string>>; truth: readonly TruePage[]; scan: string }>

/** The path of a file of one of the class sets that ship with the product. */
export function classSetFile(name: ClassSetName, file: string): string {
  return path.join(import.meta.dirname, '../../seeds/class-sets', name, file)
}

/** A paper set up from a class set's own files: blank PDF, answer spaces, one class with its roster; nothing scanned. `students` by candidate number. */
export async function aClassSetPaper(owner: string, name: ClassSetName): Promise<Made> {
  const { title, pages, setting } = readPaperFile(JSON.parse(readFileSync(classSetFile(name, 'paper.json'), 'utf8')))
  const paperId = newId()
  await addPaper(db(), { id: paperId, title, step: 1, tolerance: halves(1), keepUntil: '2028-01-31', createdBy: owner })
  const fileId = newId()
  await addStoredFile(db(), { id: fileId, ...(await keepBytes(readFileSync(classSetFile(name, 'paper.pdf')))), mediaType: 'application/pdf', originalName: 'paper.pdf', createdBy: owner })
  await setBlankPaper(db(), paperId, fileId, pages)
  await setPaperBoxes(db(), paperId, setting.boxes)
  for (const [position, question] of setting.questions.entries()) await putQuestion(db(), paperId, { ...question, position, points: question.points.map((point) => ({ ...point, withdrawn: false })) })
  const { classSetId, students } = await aClassOf(paperId, name)
  const { pages: truth } = JSON.parse(readFileSync(classSetFile(name, 'truth.json'), 'utf8')) as { pages: TruePage[] }
  return { paperId, classSetId, students, truth, scan: classSetFile(name, 'scan.pdf') }
}

async function aClassOf(paperId: string, name: ClassSetName): Promise<{ classSetId: string; students: Record<string, string> }> {
  const classId = newId()
  const classSetId = newId()
  await db()('classes').insert({ id: classId, name: `${name} ${classId.slice(0, 4)}`, created_at: Date.now() })
  await db()('class_sets').insert({ id: classSetId, paper_id: paperId, class_id: classId, sat_on: '2026-11-12', created_at: Date.now() })
  const students: Record<string, string> = {}
  const lines = readFileSync(classSetFile(name, 'roster.csv'), 'utf8').trim().split(/\r?\n/).slice(1)
  for (const [number, given, family] of lines.map((line) => line.split(',') as [string, string, string])) {
    const id = newId()
    students[number] = id
    const row = { candidate_number: number, given_name: given, family_name: family }
    await db()('students').insert({ id, ...row, candidate_number: `${number}-${id.slice(0, 4)}`, created_at: Date.now() })
    await db()('class_set_students').insert({ class_set_id: classSetId, student_id: id, ...row })
  }
  return { classSetId, students }
}
