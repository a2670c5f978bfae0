import type { Db } from './knex'

type ScriptRow = {
  id: string; class_set_id: string; position: number; student_id: string | null; suggested_student_id: string | null; suggestion_reason: string | null; suggestion_certainty: number | null
  confirmed_by: string | null; confirmed_at: number | null; created_at: number
}
type PageRow = { id: string; script_id: string; paper_page: number | null; extra: 0 | 1; position: number; leaf_id: string | null }

/** One student's answered test. `studentId` is a confirmed name, else the student is only suggested, for a reason. */
export type Script = Readonly<{ id: string; classSetId: string; position: number; studentId: string | null; suggestedStudentId: string | null; suggestionReason: string | null; suggestionCertainty: number | null; confirmedBy: string | null; confirmedAt: number | null }>
/** A page of a script; `leafId` is the scan that holds now. An extra page has no page of the paper behind it. */
export type ScriptPage = Readonly<{ id: string; scriptId: string; paperPage: number | null; extra: boolean; position: number; leafId: string | null }>

function toScript(row: ScriptRow): Script {
  return {
    id: row.id, classSetId: row.class_set_id, position: row.position, studentId: row.student_id, suggestedStudentId: row.suggested_student_id,
    suggestionReason: row.suggestion_reason, suggestionCertainty: row.suggestion_certainty, confirmedBy: row.confirmed_by, confirmedAt: row.confirmed_at,
  }
}

function toPage(row: PageRow): ScriptPage {
  return { id: row.id, scriptId: row.script_id, paperPage: row.paper_page, extra: row.extra === 1, position: row.position, leafId: row.leaf_id }
}

/** The scripts of a paper in the order of scanning. */
export async function listScripts(db: Db, paperId: string): Promise<Script[]> {
  const rows = (await db('scripts').join('class_sets', 'class_sets.id', 'scripts.class_set_id').where('class_sets.paper_id', paperId)
    .orderBy(['scripts.position', 'scripts.created_at']).select('scripts.*')) as ScriptRow[]
  return rows.map(toScript)
}

export async function getScript(db: Db, id: string): Promise<(Script & { paperId: string }) | null> {
  const row = (await db('scripts').join('class_sets', 'class_sets.id', 'scripts.class_set_id').where('scripts.id', id).select('scripts.*', 'class_sets.paper_id').first()) as (ScriptRow & { paper_id: string }) | undefined
  return row ? { ...toScript(row), paperId: row.paper_id } : null
}

export async function addScript(db: Db, script: Script): Promise<void> {
  await db<ScriptRow>('scripts').insert({
    id: script.id, class_set_id: script.classSetId, position: script.position, student_id: script.studentId, suggested_student_id: script.suggestedStudentId,
    suggestion_reason: script.suggestionReason, suggestion_certainty: script.suggestionCertainty, confirmed_by: script.confirmedBy, confirmed_at: script.confirmedAt, created_at: Date.now(),
  })
}

export type ScriptName = Pick<Script, 'classSetId' | 'studentId' | 'suggestedStudentId' | 'suggestionReason' | 'suggestionCertainty' | 'confirmedBy' | 'confirmedAt'>

/** Names a script, or takes its name away. The class set goes with the student. */
export async function setScriptName(db: Db, id: string, name: ScriptName): Promise<void> {
  await db<ScriptRow>('scripts').where({ id }).update({
    class_set_id: name.classSetId, student_id: name.studentId, suggested_student_id: name.suggestedStudentId, suggestion_reason: name.suggestionReason, suggestion_certainty: name.suggestionCertainty, confirmed_by: name.confirmedBy, confirmed_at: name.confirmedAt,
  })
}

/** The position after the last script: positions run over a whole paper, in the order of scanning. */
export async function nextScriptPosition(db: Db, paperId: string): Promise<number> {
  const row = await db('scripts').join('class_sets', 'class_sets.id', 'scripts.class_set_id').where({ paper_id: paperId }).max({ last: 'position' }).first<{ last: number | null }>()
  return (row?.last ?? 0) + 1
}

/** The pages of a paper's scripts, in order within each. */
export async function listScriptPages(db: Db, paperId: string): Promise<ScriptPage[]> {
  const rows = (await db('script_pages').join('scripts', 'scripts.id', 'script_pages.script_id').join('class_sets', 'class_sets.id', 'scripts.class_set_id')
    .where('class_sets.paper_id', paperId).orderBy(['script_pages.script_id', 'script_pages.position']).select('script_pages.*')) as PageRow[]
  return rows.map(toPage)
}

export async function getScriptPage(db: Db, id: string): Promise<ScriptPage | null> {
  const row = await db<PageRow>('script_pages').where({ id }).first()
  return row ? toPage(row) : null
}

/** The page of a script that answers a page of the paper. */
export async function findScriptPage(db: Db, scriptId: string, paperPage: number): Promise<ScriptPage | null> {
  const row = await db<PageRow>('script_pages').where({ script_id: scriptId, paper_page: paperPage }).first()
  return row ? toPage(row) : null
}

export async function addScriptPage(db: Db, page: ScriptPage): Promise<void> {
  await db<PageRow>('script_pages').insert({ id: page.id, script_id: page.scriptId, paper_page: page.paperPage, extra: page.extra ? 1 : 0, position: page.position, leaf_id: page.leafId })
}

/** Makes another leaf the one that holds for a page, or none. Stamps lie on the page, so they stay. */
export async function setCurrentLeaf(db: Db, pageId: string, leafId: string | null): Promise<void> {
  await db<PageRow>('script_pages').where({ id: pageId }).update({ leaf_id: leafId })
}

/** Whether anything was stamped on a page or a script, even if it was taken back later. */
export async function hasStamps(db: Db, where: { scriptPageId: string } | { scriptId: string }): Promise<boolean> {
  if ('scriptPageId' in where) return Boolean(await db('stamps').where({ script_page_id: where.scriptPageId }).first<unknown>('id'))
  return Boolean(await db('markings').join('responses', 'responses.id', 'markings.response_id').where('responses.script_id', where.scriptId).first<unknown>('markings.id'))
}

export async function dropScriptPage(db: Db, pageId: string): Promise<void> {
  await db<PageRow>('script_pages').where({ id: pageId }).delete()
}

/** Removes a script nobody has marked, with its responses and empty pages. */
export async function dropScript(db: Db, scriptId: string): Promise<void> {
  await db<ScriptRow>('scripts').where({ id: scriptId }).delete()
}

/** Puts a script back as it was, whether it is still there or not. */
export async function putScript(db: Db, script: Script): Promise<void> {
  const there = await db<ScriptRow>('scripts').where({ id: script.id }).first('id')
  if (there) await setScriptName(db, script.id, script)
  else await addScript(db, script)
}

/** Puts a script page back as it was, without its leaf: see `setCurrentLeaf`. */
export async function putScriptPage(db: Db, page: ScriptPage): Promise<void> {
  const there = await db<PageRow>('script_pages').where({ id: page.id }).first('id')
  if (there) await db<PageRow>('script_pages').where({ id: page.id }).update({ script_id: page.scriptId, paper_page: page.paperPage, extra: page.extra ? 1 : 0, position: page.position })
  else await addScriptPage(db, { ...page, leafId: null })
}

/** The pages of one script. */
export async function listPagesOfScript(db: Db, scriptId: string): Promise<ScriptPage[]> {
  return (await db<PageRow>('script_pages').where({ script_id: scriptId }).orderBy('position')).map(toPage)
}

/** The script that bears a student's name in a class set. */
export async function findScriptOfStudent(db: Db, classSetId: string, studentId: string): Promise<Script | null> {
  const row = await db<ScriptRow>('scripts').where({ class_set_id: classSetId, student_id: studentId }).first()
  return row ? toScript(row) : null
}

/** The scripts all of whose pages were scanned in one sheaf, and those of them in which somebody gave a mark or raised a flag. */
export async function scriptsOfSheafAlone(db: Db, sheafId: string): Promise<{ ids: string[]; marked: string[] }> {
  const ids = (await db('scripts').whereExists(db('script_pages').join('leaves', 'leaves.script_page_id', 'script_pages.id').whereRaw('script_pages.script_id = scripts.id').where('leaves.sheaf_id', sheafId))
    .whereNotExists(db('script_pages').join('leaves', 'leaves.script_page_id', 'script_pages.id').whereRaw('script_pages.script_id = scripts.id').whereNot('leaves.sheaf_id', sheafId)).pluck('scripts.id')) as string[]
  const touched = (table: 'markings' | 'flags') => db('responses').join(table, `${table}.response_id`, 'responses.id').whereIn('responses.script_id', ids).distinct('responses.script_id').pluck('responses.script_id')
  const marked = new Set<string>([...((await touched('markings')) as string[]), ...((await touched('flags')) as string[])])
  return { ids, marked: [...marked] }
}

/** How many scripts of a paper have a scan of each of its pages. */
export async function countScannedPages(db: Db, paperId: string): Promise<Record<number, number>> {
  const rows = (await db('script_pages').join('scripts', 'scripts.id', 'script_pages.script_id').join('class_sets', 'class_sets.id', 'scripts.class_set_id')
    .where('class_sets.paper_id', paperId).whereNotNull('script_pages.paper_page').whereNotNull('script_pages.leaf_id').groupBy('script_pages.paper_page')
    .select({ page: 'script_pages.paper_page' }).count({ n: '*' })) as { page: number; n: number }[]
  return Object.fromEntries(rows.map(({ page, n }) => [page, n]))
}
