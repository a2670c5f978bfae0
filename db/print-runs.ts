import type { CodeSpot, PrintedPage } from '@/lib/core/printed-code'
import type { Db } from './knex'

/** One print of a class set's papers. `scripts` are in printing order; a spare one has no student. */
export type PrintRun = Readonly<{
  id: string
  paperId: string
  classSetId: string
  blankFileId: string
  twoSided: boolean
  spots: readonly CodeSpot[]
  scripts: readonly Readonly<{ id: string; studentId: string | null; tokens: readonly string[] }>[]
  createdBy: string
}>

const chunk = 300

/** Keeps what was printed, token by token. `tokens` stand for the pages from 1 on. */
export async function addPrintRun(db: Db, run: PrintRun): Promise<void> {
  const spares = run.scripts.filter(({ studentId }) => studentId === null).length
  await db('print_runs').insert({
    id: run.id, paper_id: run.paperId, class_set_id: run.classSetId, blank_file_id: run.blankFileId, two_sided: run.twoSided ? 1 : 0, spares, created_by: run.createdBy, created_at: Date.now(),
  })
  await db('print_run_spots').insert(run.spots.map(({ page, rect }) => ({ print_run_id: run.id, page, x: rect.x, y: rect.y, side: rect.w })))
  const scripts = run.scripts.map(({ id, studentId }, position) => ({ id, print_run_id: run.id, position, student_id: studentId }))
  const pages = run.scripts.flatMap(({ id, tokens }) => tokens.map((token, k) => ({ token, printed_script_id: id, page: k + 1 })))
  await db.batchInsert('printed_scripts', scripts, chunk)
  await db.batchInsert('printed_pages', pages, chunk)
}

/** Whom a printed page is for: the student of a class set, or a spare script. */
export type PrintedFor = Readonly<{ printedScriptId: string; classSetId: string; studentId: string | null }>

/** Every code ever printed for a paper, with what it stands for. */
export async function listPrintedPages(db: Db, paperId: string): Promise<(Omit<PrintedPage, 'script'> & PrintedFor & { token: string })[]> {
  const rows = (await db('printed_pages').join('printed_scripts', 'printed_scripts.id', 'printed_pages.printed_script_id').join('print_runs', 'print_runs.id', 'printed_scripts.print_run_id')
    .join('print_run_spots', (join) => join.on('print_run_spots.print_run_id', 'print_runs.id').andOn('print_run_spots.page', 'printed_pages.page'))
    .where('print_runs.paper_id', paperId)
    .select('printed_pages.token', 'printed_pages.page', 'printed_pages.printed_script_id', 'printed_scripts.student_id', 'print_runs.class_set_id', 'print_run_spots.x', 'print_run_spots.y', 'print_run_spots.side')) as
    { token: string; page: number; printed_script_id: string; student_id: string | null; class_set_id: string; x: number; y: number; side: number }[]
  return rows.map((row) => ({
    token: row.token, paperPage: row.page, rect: { x: row.x, y: row.y, w: row.side, h: row.side },
    printedScriptId: row.printed_script_id, classSetId: row.class_set_id, studentId: row.student_id,
  }))
}

/** A spare script: its class set, and the script its sheets went into. Null when it is no spare one of this paper. */
export async function getSpareScript(db: Db, paperId: string, printedScriptId: string): Promise<{ classSetId: string; scriptId: string | null } | null> {
  const row = (await db('printed_scripts').join('print_runs', 'print_runs.id', 'printed_scripts.print_run_id').where({ 'printed_scripts.id': printedScriptId, paper_id: paperId }).whereNull('student_id')
    .first('class_set_id', 'script_id')) as { class_set_id: string; script_id: string | null } | undefined
  return row ? { classSetId: row.class_set_id, scriptId: row.script_id } : null
}

export async function setSpareScript(db: Db, printedScriptId: string, scriptId: string): Promise<void> {
  await db('printed_scripts').where({ id: printedScriptId }).update({ script_id: scriptId })
}

/** How often each class set of a paper was printed, and when last. */
export async function listPrintCounts(db: Db, paperId: string): Promise<{ classSetId: string; runs: number; last: number }[]> {
  const rows = (await db('print_runs').where({ paper_id: paperId }).groupBy('class_set_id').select('class_set_id').count({ runs: '*' }).max({ last: 'created_at' })) as { class_set_id: string; runs: number; last: number }[]
  return rows.map((row) => ({ classSetId: row.class_set_id, runs: row.runs, last: row.last }))
}

/** How many spare scripts of a class set were printed before: their numbers go on from there. */
export async function countSpares(db: Db, classSetId: string): Promise<number> {
  const row = await db('print_runs').where({ class_set_id: classSetId }).sum({ spares: 'spares' }).first<{ spares: number | null }>()
  return row.spares ?? 0
}
