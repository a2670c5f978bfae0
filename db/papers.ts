import type { HalfMarks, MarkingStep } from '@/lib/core/marks'
import type { GradeBoundary, OddHalf, Paper, PaperBox, PaperPage } from '@/lib/core/paper'
import type { PaperDetails } from '@/lib/core/paper-details-view'
import { newId } from '@/lib/core/ids'
import type { Db } from './knex'
import { listQuestions } from './questions'

type PaperRow = {
  id: string
  title: string
  blank_file_id: string | null
  marking_step: MarkingStep
  tolerance: HalfMarks
  sample_size: number | null
  names_hidden: 0 | 1
  scheme_version: number
  solutions_released: 0 | 1
  odd_half: OddHalf
  keep_until: string
  created_by: string
  created_at: number
  archived_at: number | null
}
type BoxRow = { id: string; paper_id: string; kind: 'name' | 'number'; position: number; page: number; x: number; y: number; w: number; h: number }
type PageRow = { paper_id: string; page: number; width: number; height: number }
type BoundaryRow = { paper_id: string; grade: string; lowest: HalfMarks }

/** A paper with its pages, boxes, questions and grade scale; null when there is none. */
export async function getPaper(db: Db, id: string): Promise<Paper | null> {
  const row = await db<PaperRow>('papers').where({ id }).first()
  if (!row) return null
  const pages = await db<PageRow>('paper_pages').where({ paper_id: id }).orderBy('page')
  const boxes = await db<BoxRow>('paper_boxes').where({ paper_id: id }).orderBy(['kind', 'position'])
  const boundaries = await db<BoundaryRow>('grade_boundaries').where({ paper_id: id }).orderBy('lowest', 'desc')
  return {
    id: row.id, title: row.title, blankFileId: row.blank_file_id, step: row.marking_step, tolerance: row.tolerance, sampleSize: row.sample_size,
    namesHidden: row.names_hidden === 1, schemeVersion: row.scheme_version, solutionsReleased: row.solutions_released === 1, keepUntil: row.keep_until,
    createdAt: row.created_at, archivedAt: row.archived_at,
    pages: pages.map(({ page, width, height }) => ({ page, width, height })),
    boxes: boxes.map(({ kind, page, x, y, w, h }) => ({ kind, page, rect: { x, y, w, h } })),
    questions: await listQuestions(db, id),
    scale: { oddHalf: row.odd_half, boundaries: boundaries.map(({ grade, lowest }) => ({ grade, lowest })) },
  }
}

export type NewPaper = Readonly<{ id: string; title: string; step: MarkingStep; tolerance: HalfMarks; keepUntil: string; createdBy: string }>

/** Adds a paper and makes its maker the first owner. */
export async function addPaper(db: Db, paper: NewPaper): Promise<void> {
  await db('papers').insert({
    id: paper.id, title: paper.title, marking_step: paper.step, tolerance: paper.tolerance, keep_until: paper.keepUntil, created_by: paper.createdBy, created_at: Date.now(),
  })
  await db('paper_owners').insert({ paper_id: paper.id, user_id: paper.createdBy })
}

export async function setBlankPaper(db: Db, paperId: string, fileId: string, pages: readonly PaperPage[]): Promise<void> {
  await db('papers').where({ id: paperId }).update({ blank_file_id: fileId })
  await setPaperPages(db, paperId, pages)
}

export async function setPaperBoxes(db: Db, paperId: string, boxes: readonly PaperBox[]): Promise<void> {
  await db('paper_boxes').where({ paper_id: paperId }).delete()
  if (boxes.length === 0) return
  await db('paper_boxes').insert(boxes.map(({ kind, page, rect }, position) => ({ id: newId(), paper_id: paperId, kind, position, page, ...rect })))
}

export async function setGradeScale(db: Db, paperId: string, oddHalf: OddHalf, boundaries: readonly GradeBoundary[]): Promise<void> {
  await db('papers').where({ id: paperId }).update({ odd_half: oddHalf })
  await db('grade_boundaries').where({ paper_id: paperId }).delete()
  if (boundaries.length > 0) await db('grade_boundaries').insert(boundaries.map((boundary) => ({ paper_id: paperId, ...boundary })))
}

export async function putPaperDetails(db: Db, paperId: string, details: PaperDetails): Promise<void> {
  await db<PaperRow>('papers').where({ id: paperId }).update({
    title: details.title, keep_until: details.keepUntil, names_hidden: details.namesHidden ? 1 : 0, sample_size: details.sampleSize, solutions_released: details.solutionsReleased ? 1 : 0,
  })
}

/** The marking step and the tolerance, both in half marks. */
export async function putMarkingRules(db: Db, paperId: string, step: MarkingStep, tolerance: HalfMarks): Promise<void> {
  await db<PaperRow>('papers').where({ id: paperId }).update({ marking_step: step, tolerance })
}

/** Sizes of pages that are known before the blank paper itself is. */
export async function setPaperPages(db: Db, paperId: string, pages: readonly PaperPage[]): Promise<void> {
  await db('paper_pages').where({ paper_id: paperId }).delete()
  if (pages.length > 0) await db('paper_pages').insert(pages.map((page) => ({ paper_id: paperId, ...page })))
}

/** Whether a paper's scripts have pages in paper space already. */
export async function hasScripts(db: Db, paperId: string): Promise<boolean> {
  return Boolean(await db('scripts').join('class_sets', 'class_sets.id', 'scripts.class_set_id').where('class_sets.paper_id', paperId).first<unknown>('scripts.id'))
}

/** Who made a paper; null when there is none. */
export async function paperMaker(db: Db, id: string): Promise<string | null> {
  const row = await db<PaperRow>('papers').where({ id }).first('created_by')
  return row?.created_by ?? null
}
