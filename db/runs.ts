import { newId } from '@/lib/core/ids'
import type { ImagePart } from '@/lib/core/leaf'
import type { Homography } from '@/lib/core/paper-space'
import type { Round } from '@/lib/core/stamp'
import type { Db } from './knex'

/** A response with what its run needs: whose it is only where names are shown. */
export type RunResponse = Readonly<{ id: string; scriptId: string; classSetId: string; className: string; studentName: string | null }>

/** The responses of a question, in the order of the scripts. Only scripts of the paper's class sets. */
export async function listRunResponses(db: Db, questionId: string): Promise<RunResponse[]> {
  const rows = (await db('responses').join('scripts', 'scripts.id', 'responses.script_id').join('class_sets', 'class_sets.id', 'scripts.class_set_id')
    .join('classes', 'classes.id', 'class_sets.class_id')
    .leftJoin('class_set_students', (join) => join.on('class_set_students.class_set_id', 'scripts.class_set_id').andOn('class_set_students.student_id', 'scripts.student_id'))
    .where('responses.question_id', questionId).orderBy(['class_sets.created_at', 'scripts.position'])
    .select({ id: 'responses.id', script: 'scripts.id', set: 'class_sets.id', class: 'classes.name', given: 'class_set_students.given_name', family: 'class_set_students.family_name' })) as {
    id: string; script: string; set: string; class: string; given: string | null; family: string | null
  }[]
  return rows.map((row) => ({ id: row.id, scriptId: row.script, classSetId: row.set, className: row.class, studentName: row.family === null ? null : `${row.given} ${row.family}` }))
}

/** A page of a script with the leaf that shows it now, and since when (ms). Sizes of the leaf in pixels of its stored image; `part` is the leaf's own part of an image that shows two pages. */
export type ScriptPage = Readonly<{
  id: string; scriptId: string; paperPage: number | null; position: number
  leaf: Readonly<{ id: string; width: number; height: number; part: ImagePart | null; homography: Homography; since: number }> | null
}>
type PageRow = {
  id: string; script_id: string; paper_page: number | null; position: number; leaf_id: string | null; width: number | null; height: number | null; homography: string | null; part: string | null; since: number
}

const pagesWithLeaves = (db: Db) => db('script_pages').leftJoin('leaves', 'leaves.id', 'script_pages.leaf_id').orderBy('script_pages.position')
  .select('script_pages.id', 'script_pages.script_id', 'script_pages.paper_page', 'script_pages.position', { leaf_id: 'leaves.id' }, 'leaves.width', 'leaves.height', 'leaves.homography', db.raw('max(leaves.read_at, coalesce(leaves.decided_at, 0)) as since'),
    db.raw(`case when leaves.half is not null then json_extract(leaves.finding, '$.reading.part') end as part`))

function toScriptPage(row: PageRow): ScriptPage {
  const whole = row.leaf_id !== null && row.homography !== null && row.width !== null && row.height !== null
  return {
    id: row.id, scriptId: row.script_id, paperPage: row.paper_page, position: row.position,
    leaf: whole ? { id: row.leaf_id!, width: row.width!, height: row.height!, part: row.part === null ? null : (JSON.parse(row.part) as ImagePart), homography: JSON.parse(row.homography!) as Homography, since: row.since } : null,
  }
}

/** The pages of every script that has a response to the question. */
export async function listRunPages(db: Db, questionId: string): Promise<ScriptPage[]> {
  const scripts = db('responses').where({ question_id: questionId }).select('script_id')
  return ((await pagesWithLeaves(db).whereIn('script_pages.script_id', scripts)) as PageRow[]).map(toScriptPage)
}

export async function listScriptPages(db: Db, scriptId: string): Promise<ScriptPage[]> {
  return ((await pagesWithLeaves(db).where('script_pages.script_id', scriptId)) as PageRow[]).map(toScriptPage)
}

export async function getScriptPage(db: Db, id: string): Promise<ScriptPage | null> {
  const row = (await pagesWithLeaves(db).where('script_pages.id', id).first()) as PageRow | undefined
  return row ? toScriptPage(row) : null
}

/** A response with its paper; null when there is none. */
export async function getResponse(db: Db, id: string): Promise<Readonly<{ id: string; scriptId: string; questionId: string; paperId: string; classSetId: string }> | null> {
  const row = (await db('responses').join('scripts', 'scripts.id', 'responses.script_id').join('class_sets', 'class_sets.id', 'scripts.class_set_id').where('responses.id', id)
    .first({ scriptId: 'scripts.id', questionId: 'responses.question_id', paperId: 'class_sets.paper_id', classSetId: 'class_sets.id' })) as
    { scriptId: string; questionId: string; paperId: string; classSetId: string } | undefined
  return row ? { id, ...row } : null
}

/** The paper and class set of a script. */
export async function placeOfScript(db: Db, scriptId: string): Promise<Readonly<{ paperId: string; classSetId: string }> | null> {
  const row = (await db('scripts').join('class_sets', 'class_sets.id', 'scripts.class_set_id').where('scripts.id', scriptId)
    .first({ paperId: 'class_sets.paper_id', classSetId: 'class_sets.id' })) as { paperId: string; classSetId: string } | undefined
  return row ?? null
}

/** The scripts of a paper that a moderator has in a sample. */
export async function sampledScriptIds(db: Db, moderatorId: string, paperId: string): Promise<Set<string>> {
  const ids = (await db('sample_scripts').join('samples', 'samples.id', 'sample_scripts.sample_id').join('class_sets', 'class_sets.id', 'samples.class_set_id')
    .where({ 'samples.moderator_id': moderatorId, 'class_sets.paper_id': paperId }).pluck('sample_scripts.script_id')) as string[]
  return new Set(ids)
}

/** When each marking of a question in one round was last worked on (ms): its newest stamp, or its settling. */
export async function lastWorkedOn(db: Db, questionId: string, round: Round): Promise<Map<string, number>> {
  const rows = (await db('markings').join('responses', 'responses.id', 'markings.response_id').where({ 'responses.question_id': questionId, 'markings.round': round })
    .select({ id: 'markings.id', at: db.raw('max(coalesce(markings.settled_at, 0), coalesce((select max(saved_at) from stamps where marking_id = markings.id), 0))') })) as { id: string; at: number }[]
  return new Map(rows.map(({ id, at }) => [id, at]))
}

/** The seed a person's order of a question is drawn by: made at the first asking, the same ever after. */
export async function runSeed(db: Db, userId: string, questionId: string, round: Round): Promise<string> {
  await db('run_seeds').insert({ user_id: userId, question_id: questionId, round, seed: newId() }).onConflict(['user_id', 'question_id', 'round']).ignore()
  const row = await db('run_seeds').where({ user_id: userId, question_id: questionId, round }).first<{ seed: string }>('seed')
  return row.seed
}
