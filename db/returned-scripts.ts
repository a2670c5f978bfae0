import type { ReturnedDetail, ReturnedScriptLine } from '@/lib/core/returned'
import { newId } from '@/lib/core/ids'
import type { Db } from './knex'

type ReturnedRow = {
  id: string; release_id: string; script_id: string; student_id: string; revision: number; file_id: string | null; built_at: number | null
  content_key: string | null; problem: string | null; first_read_at: number | null
}

/** Puts scripts down for a release, each with its next revision. */
export async function addReturnedScripts(db: Db, releaseId: string, scripts: readonly { scriptId: string; studentId: string }[]): Promise<void> {
  for (const { scriptId, studentId } of scripts) {
    const last = await db('returned_scripts').where({ script_id: scriptId }).whereNotNull('built_at').max({ revision: 'revision' }).first<{ revision: number | null }>()
    await db<ReturnedRow>('returned_scripts').insert({ id: newId(), release_id: releaseId, script_id: scriptId, student_id: studentId, revision: (last?.revision ?? 0) + 1 })
  }
}

export type ScriptToBuild = Readonly<{ id: string; scriptId: string; studentId: string; revision: number }>

/** What of a release is neither built nor stayed behind yet. */
export async function listScriptsToBuild(db: Db, releaseId: string): Promise<ScriptToBuild[]> {
  return (await db('returned_scripts').join('scripts', 'scripts.id', 'returned_scripts.script_id').where({ release_id: releaseId }).whereNull('built_at').whereNull('problem')
    .orderBy('scripts.position').select({ id: 'returned_scripts.id', scriptId: 'script_id', studentId: 'returned_scripts.student_id', revision: 'revision' })) as ScriptToBuild[]
}

export async function isBuilt(db: Db, id: string): Promise<boolean> {
  return Boolean(await db<ReturnedRow>('returned_scripts').where({ id }).whereNotNull('built_at').first('id'))
}

/** Stores one built script with its frozen summary. */
export async function markBuilt(db: Db, id: string, built: Readonly<{ fileId: string; contentKey: string; at: number; detail: ReturnedDetail }>): Promise<void> {
  const { detail } = built
  await db<ReturnedRow>('returned_scripts').where({ id }).update({ file_id: built.fileId, content_key: built.contentKey, built_at: built.at })
  await db('score_summaries').insert({ returned_script_id: id, total: detail.total, maximum: detail.maximum, grade: detail.grade, detail: JSON.stringify(detail) })
}

/** Says why a script stays behind. */
export async function markNotBuilt(db: Db, id: string, problem: string): Promise<void> {
  await db<ReturnedRow>('returned_scripts').where({ id }).whereNull('built_at').update({ problem })
}

export async function countBuilt(db: Db, releaseId: string): Promise<number> {
  return (await db('returned_scripts').where({ release_id: releaseId }).whereNotNull('built_at').count({ n: '*' }).first<{ n: number }>()).n
}

export type Addressed = Readonly<{ id: string; givenName: string; email: string }>

/** The built scripts of a release whose student can be written to: at the account's address, else the student's own of the school's list. */
export async function listAddressed(db: Db, releaseId: string): Promise<Addressed[]> {
  return (await db('returned_scripts').join('students', 'students.id', 'returned_scripts.student_id').leftJoin('users', 'users.id', 'students.user_id')
    .where({ release_id: releaseId }).whereNotNull('built_at').whereRaw(`${address} is not null`)
    .select({ id: 'returned_scripts.id', givenName: 'students.given_name', email: db.raw(address) })) as Addressed[]
}
// An address that two students of the list share is a family's or a form's, not the student's own; a disabled account gets no mail.
const address = `case when users.disabled_at is not null then null else coalesce(users.email, case when students.email is not null
  and not exists (select 1 from students other where other.id <> students.id and lower(other.email) = lower(students.email)) then students.email end) end`

/** Which of some students can be written to. */
export async function addressedStudents(db: Db, classSetId: string): Promise<Set<string>> {
  const ids = (await db('class_set_students').join('students', 'students.id', 'class_set_students.student_id').leftJoin('users', 'users.id', 'students.user_id')
    .where({ class_set_id: classSetId }).whereRaw(`${address} is not null`).pluck('students.id')) as string[]
  return new Set(ids)
}

export type Standing = Readonly<{ id: string; scriptId: string; revision: number; releasedAt: number; firstReadAt: number | null; contentKey: string }>

/** The returned scripts that hold: of every script of released releases the highest revision. */
const newest = (db: Db) => db('returned_scripts').join('releases', 'releases.id', 'returned_scripts.release_id').where('releases.state', 'released').whereNotNull('returned_scripts.built_at').whereNull('returned_scripts.withdrawn_at')
  .whereNotExists((later) => later.select(db.raw('1')).from('returned_scripts as later').join('releases as its', 'its.id', 'later.release_id')
    .whereRaw(`later.script_id = returned_scripts.script_id and its.state = 'released' and later.built_at is not null and later.withdrawn_at is null and later.revision > returned_scripts.revision`))

/** What stands handed back of a class set. */
export async function listStanding(db: Db, classSetId: string): Promise<Standing[]> {
  return (await newest(db).where('releases.class_set_id', classSetId).select({
    id: 'returned_scripts.id', scriptId: 'returned_scripts.script_id', revision: 'returned_scripts.revision', releasedAt: 'releases.released_at',
    firstReadAt: 'returned_scripts.first_read_at', contentKey: 'returned_scripts.content_key',
  })) as Standing[]
}

/** A returned script of a class set as a file: `sha256` is null while it is being built, and for good where it stayed behind (`problem`). */
export type FileOfSet = Readonly<{ id: string; scriptId: string; studentId: string; revision: number; askedAt: number; sha256: string | null; contentKey: string | null; problem: string | null }>
const fileColumns = {
  id: 'returned_scripts.id', scriptId: 'returned_scripts.script_id', studentId: 'returned_scripts.student_id', revision: 'returned_scripts.revision', askedAt: 'releases.created_at',
  sha256: 'stored_files.sha256', contentKey: 'returned_scripts.content_key', problem: 'returned_scripts.problem',
}

/** The files that stand handed back of a class set. */
export async function listStandingFiles(db: Db, classSetId: string): Promise<FileOfSet[]> {
  return (await newest(db).join('stored_files', 'stored_files.id', 'returned_scripts.file_id').where('releases.class_set_id', classSetId).select(fileColumns)) as FileOfSet[]
}

/** The files of the release that is being built, those already there and those to come. */
export async function listFilesInWork(db: Db, classSetId: string): Promise<FileOfSet[]> {
  return (await db('returned_scripts').join('releases', 'releases.id', 'returned_scripts.release_id').leftJoin('stored_files', 'stored_files.id', 'returned_scripts.file_id')
    .where({ 'releases.class_set_id': classSetId, 'releases.state': 'building' }).select(fileColumns)) as FileOfSet[]
}

/** A file that was still to come: what became of it. `open` while its release is being built and it is not. */
export async function awaitedFile(db: Db, id: string): Promise<{ sha256: string | null; open: boolean }> {
  const row = await db('returned_scripts').join('releases', 'releases.id', 'returned_scripts.release_id').leftJoin('stored_files', 'stored_files.id', 'returned_scripts.file_id').where('returned_scripts.id', id)
    .first<{ sha256: string | null; problem: string | null; state: string } | undefined>({ sha256: 'stored_files.sha256', problem: 'returned_scripts.problem', state: 'releases.state' })
  return { sha256: row?.sha256 ?? null, open: row?.state === 'building' && row.sha256 === null && row.problem === null }
}

/** Scripts that stayed behind in the newest release of a class set, with the code of why. */
export async function listStayedBehind(db: Db, classSetId: string): Promise<{ scriptId: string; problem: string }[]> {
  const last = await db('releases').where({ class_set_id: classSetId }).orderBy('created_at', 'desc').first<{ id: string } | undefined>('id')
  if (!last) return []
  return (await db('returned_scripts').where({ release_id: last.id }).whereNotNull('problem').select({ scriptId: 'script_id', problem: 'problem' })) as { scriptId: string; problem: string }[]
}

export type ReturnedScript = Readonly<{
  id: string; paperId: string; scriptId: string; studentId: string; revision: number; state: string; handedBackAt: number; sha256: string; size: number; detail: ReturnedDetail
  /** False where a later revision has taken its place. */
  holds: boolean
}>

/** One returned script, whatever became of its release; null when it was never built. */
export async function getReturnedScript(db: Db, id: string): Promise<ReturnedScript | null> {
  const row = (await db('returned_scripts').join('releases', 'releases.id', 'returned_scripts.release_id').join('class_sets', 'class_sets.id', 'releases.class_set_id')
    .join('stored_files', 'stored_files.id', 'returned_scripts.file_id').join('score_summaries', 'score_summaries.returned_script_id', 'returned_scripts.id')
    .where('returned_scripts.id', id).first({
      paperId: 'class_sets.paper_id', scriptId: 'returned_scripts.script_id', studentId: 'returned_scripts.student_id', revision: 'returned_scripts.revision', state: 'releases.state',
      handedBackAt: db.raw('coalesce(releases.released_at, releases.created_at)'), sha256: 'stored_files.sha256', size: 'stored_files.size', detail: 'score_summaries.detail',
    })) as (Omit<ReturnedScript, 'id' | 'holds' | 'detail'> & { detail: string }) | undefined
  if (!row) return null
  const holds = Boolean(await newest(db).where('returned_scripts.id', id).first('returned_scripts.id'))
  return { ...row, id, holds, detail: JSON.parse(row.detail) as ReturnedDetail }
}

/** All that stands handed back to a student, the newest first. */
export async function listReturnedTo(db: Db, studentId: string): Promise<ReturnedScriptLine[]> {
  const rows = (await newest(db).join('score_summaries', 'score_summaries.returned_script_id', 'returned_scripts.id').where('returned_scripts.student_id', studentId)
    .orderBy('releases.released_at', 'desc').select({ id: 'returned_scripts.id', revision: 'returned_scripts.revision', at: 'releases.released_at', read: 'returned_scripts.first_read_at', detail: 'score_summaries.detail' })) as
    { id: string; revision: number; at: number; read: number | null; detail: string }[]
  return rows.map((row) => {
    const { title, className, satOn, total, maximum, grade, pen } = JSON.parse(row.detail) as ReturnedDetail
    return { id: row.id, revision: row.revision, handedBackAt: row.at, read: row.read !== null, title, className, satOn, total, maximum, grade, pen }
  })
}

/** Takes back every revision of a script that is out. Returns what it changed. */
export async function withdrawReturned(db: Db, scriptId: string, by: string, at: number): Promise<string[]> {
  const released = db('releases').where({ state: 'released' }).select('id')
  const rows = (await db('returned_scripts').where({ script_id: scriptId }).whereNull('withdrawn_at').whereNotNull('built_at').whereIn('release_id', released)
    .update({ withdrawn_at: at, withdrawn_by: by }).returning('id')) as { id: string }[]
  return rows.map(({ id }) => id)
}

/** Notes the first time a student read it. */
export async function noteRead(db: Db, id: string, at: number): Promise<boolean> {
  return (await db<ReturnedRow>('returned_scripts').where({ id }).whereNull('first_read_at').update({ first_read_at: at })) === 1
}
