import { AppError } from '@/lib/core/errors'
import type { Actor } from '@/lib/core/actor'
import { addAuditLine } from '@/db/audit'
import { getAttendance, setAttendance, type Attendance } from '@/db/class-set-students'
import { transaction, type Db } from '@/db/knex'
import { getLeaf, moveLeaf, type LeafPlace } from '@/db/leaves'
import { ensureResponses } from '@/db/responses'
import { dropScript, dropScriptPage, getScript, getScriptPage, hasStamps, putScript, putScriptPage, setCurrentLeaf, setScriptName, type Script, type ScriptPage } from '@/db/scripts'
import { addSortingDecision } from '@/db/sorting-decisions'
import { gatePaper } from './gate-paper'
import { renewInk } from './renew-ink'
import { renewSuggestions } from './renew-suggestions'

/** The rows one decision at the sorting table touched. Null: the row was not there. Attendance by class set and student. */
export type SortingRows = Readonly<{
  leaves: Record<string, LeafPlace>
  pages: Record<string, ScriptPage | null>
  scripts: Record<string, Script | null>
  attendance: Record<string, Attendance>
}>
/** Told of every row before it is changed. */
export type Touch = Readonly<{ leaf(id: string): Promise<void>; page(id: string): Promise<void>; script(id: string): Promise<void>; student(classSetId: string, studentId: string): Promise<void> }>
type Ids = Readonly<{ leaves: readonly string[]; pages: readonly string[]; scripts: readonly string[]; students: readonly string[] }>

/**
 * One decision of a person at the sorting table: allowed, done, written down with the rows before and after (so that it can be
 * undone), audited, and the suggestions that follow from it made anew. `object` is what the audit line speaks of.
 */
export async function decideSorting(actor: Actor, paperId: string, act: string, object: { kind: string; id: string; to?: string }, work: (trx: Db, touch: Touch) => Promise<void>): Promise<void> {
  await transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    const before: SortingRows = { leaves: {}, pages: {}, scripts: {}, attendance: {} }
    await work(trx, recorder(trx, before))
    const after = await rowsNow(trx, idsOf(before))
    await addSortingDecision(trx, { paperId, act, before, after, decidedBy: actor.userId })
    await addAuditLine(trx, actor, { act, objectKind: object.kind, objectId: object.id, paperId, to: object.to })
    await ensureResponses(trx, paperId)
    const touched = await scriptsIn(trx, before)
    await renewInk(trx, paperId, ({ scriptId }) => touched.has(scriptId))
    await renewSuggestions(trx, paperId)
  })
}

function recorder(trx: Db, before: SortingRows): Touch {
  const once = async (part: keyof Ids, id: string) => {
    const held = part === 'students' ? before.attendance : before[part]
    if (id in held) return
    const rows = await rowsNow(trx, { leaves: [], pages: [], scripts: [], students: [], [part]: [id] })
    Object.assign(held, part === 'students' ? rows.attendance : rows[part])
  }
  return { leaf: (id) => once('leaves', id), page: (id) => once('pages', id), script: (id) => once('scripts', id), student: (classSetId, studentId) => once('students', `${classSetId}/${studentId}`) }
}

export function idsOf(rows: SortingRows): Ids {
  return { leaves: Object.keys(rows.leaves), pages: Object.keys(rows.pages), scripts: Object.keys(rows.scripts), students: Object.keys(rows.attendance) }
}

/** The scripts that a decision touched, in whole or a page of them. */
export async function scriptsIn(db: Db, rows: SortingRows): Promise<Set<string>> {
  const scripts = new Set(Object.keys(rows.scripts))
  for (const [id, was] of Object.entries(rows.pages)) {
    const now = await getScriptPage(db, id)
    for (const page of [was, now]) if (page) scripts.add(page.scriptId)
  }
  return scripts
}

/** The rows of these ids as they stand. */
export async function rowsNow(db: Db, ids: Ids): Promise<SortingRows> {
  const rows: SortingRows = { leaves: {}, pages: {}, scripts: {}, attendance: {} }
  for (const id of ids.leaves) {
    const leaf = await getLeaf(db, id)
    if (!leaf) throw new AppError('not_found')
    const { state, turn, homography, paperPage, scriptPageId, decidedBy, decidedAt } = leaf
    rows.leaves[id] = { state, turn, homography, paperPage, scriptPageId, decidedBy, decidedAt }
  }
  for (const id of ids.pages) rows.pages[id] = await getScriptPage(db, id)
  for (const id of ids.scripts) rows.scripts[id] = withoutPaper(await getScript(db, id))
  for (const id of ids.students) {
    const [classSetId, studentId] = id.split('/') as [string, string]
    rows.attendance[id] = (await getAttendance(db, classSetId, studentId)) ?? 'expected'
  }
  return rows
}

function withoutPaper(script: Script | null): Script | null {
  if (!script) return null
  const { id, classSetId, position, studentId, suggestedStudentId, suggestionReason, suggestionCertainty, confirmedBy, confirmedAt } = script
  return { id, classSetId, position, studentId, suggestedStudentId, suggestionReason, suggestionCertainty, confirmedBy, confirmedAt }
}

/** Whether rows stand as they were left. What is only suggested may have changed meanwhile. */
export function sameRows(a: SortingRows, b: SortingRows): boolean {
  const plain = (rows: SortingRows) => JSON.stringify([rows.leaves, rows.pages, Object.entries(rows.scripts).map(([id, script]) => [id, script && [script.position, script.studentId]]), rows.attendance])
  return plain(a) === plain(b)
}

/** Puts rows back. Order matters: nothing may point at a row that is not there, nor two pages hold one leaf. Throws has_stamps. */
export async function putRowsBack(trx: Db, rows: SortingRows): Promise<void> {
  const scripts = Object.entries(rows.scripts)
  const pages = Object.entries(rows.pages)
  for (const [id, script] of scripts) if (script && (await getScript(trx, id))) await setScriptName(trx, id, { ...script, studentId: null, confirmedBy: null, confirmedAt: null })
  for (const [, script] of scripts) if (script) await putScript(trx, script)
  for (const [, page] of pages) if (page) await putScriptPage(trx, page)
  for (const [id] of pages) await setCurrentLeaf(trx, id, null)
  for (const [id, place] of Object.entries(rows.leaves)) await moveLeaf(trx, id, place)
  for (const [id, page] of pages) if (page) await setCurrentLeaf(trx, id, page.leafId)
  for (const [id, page] of pages) if (!page) await dropUnmarked(trx, { scriptPageId: id })
  for (const [id, script] of scripts) if (!script) await dropUnmarked(trx, { scriptId: id })
  for (const [id, attendance] of Object.entries(rows.attendance)) await setAttendance(trx, ...(id.split('/') as [string, string]), attendance)
}

async function dropUnmarked(trx: Db, what: { scriptPageId: string } | { scriptId: string }): Promise<void> {
  if (await hasStamps(trx, what)) throw new AppError('has_stamps')
  if ('scriptPageId' in what) await dropScriptPage(trx, what.scriptPageId)
  else await dropScript(trx, what.scriptId)
}
