import { copyFileSync } from 'node:fs'
import { mkdtemp } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { db } from '@/db/knex'
import { listLeavesOfPaper } from '@/db/leaves'
import { listClassSetStudents } from '@/db/class-set-students'
import { listScriptPages } from '@/db/scripts'
import type { Actor } from '@/lib/core/actor'
import { confirmName } from '@/lib/tasks/confirm-name'
import { keepSheaf } from '@/lib/tasks/keep-sheaf'
import { noteAttendance } from '@/lib/tasks/note-attendance'
import { runNextJob } from '@/lib/tasks/run-next-job'
import { classSetPath, readTruth, type ClassSetName } from './class-set-files'

type Scanned = Readonly<{ paperId: string; classSetId: string; set: ClassSetName; name: string }>

/** Puts a class set's scan through the real ingest: kept, queued, read by the worker's own task. */
export async function scanDemoSheaf(actor: Actor, { paperId, classSetId, set, name }: Scanned): Promise<void> {
  const file = path.join(await mkdtemp(path.join(tmpdir(), 'sheafmark-seed-')), name)
  copyFileSync(classSetPath(set, 'scan.pdf'), file)
  await keepSheaf(actor, { paperId, file, name, classSetIds: [classSetId] })
  while (await runNextJob('seed', () => false));
}

/** Confirms names as the teacher would who reads each name box, and notes who has no script as absent. */
export async function confirmDemoNames(actor: Actor, { paperId, classSetId, set }: Scanned, most = Infinity): Promise<void> {
  const numbers = new Map(readTruth(set).pages.map((page) => [page.index, page.candidate_number]))
  const students = await listClassSetStudents(db(), [classSetId])
  const leaves = new Map((await listLeavesOfPaper(db(), paperId)).map((leaf) => [leaf.id, leaf]))
  const named = new Set<string>()
  for (const page of await listScriptPages(db(), paperId)) {
    const number = numbers.get(leaves.get(page.leafId ?? '')?.position ?? -1)
    const student = students.find((candidate) => candidate.candidateNumber === number)
    if (!student || named.has(student.studentId) || named.size >= most) continue
    named.add(student.studentId)
    await confirmName(actor, { scriptId: page.scriptId, classSetId, studentId: student.studentId })
  }
  if (most < Infinity) return
  for (const { studentId } of students.filter((student) => !named.has(student.studentId))) await noteAttendance(actor, { classSetId, studentId, attendance: 'absent' })
}
