import type { HalfMarks } from '@/lib/core/marks'
import type { AnswerSpace, MarkPoint, MarkPointKind, Question } from '@/lib/core/paper'
import type { Db } from './knex'

export type QuestionRow = {
  id: string
  paper_id: string
  label: string
  position: number
  maximum: HalfMarks
  text: string
  answer: string
  model_solution: string
  scheme_note: string
  tolerance: HalfMarks | null
  withdrawn_at: number | null
  withdrawn_by: string | null
  withdrawn_reason: string | null
  withdrawn_as: 'out' | 'full' | null
}
type SpaceRow = { id: string; question_id: string; position: number; page: number; x: number; y: number; w: number; h: number }
type PointRow = {
  id: string
  question_id: string
  position: number
  label: string
  worth: HalfMarks
  kind: MarkPointKind | null
  depends_on: string | null
  note: string
  withdrawn_at: number | null
}

/** A paper's questions in order, with their answer spaces and mark points. */
export async function listQuestions(db: Db, paperId: string): Promise<Question[]> {
  const rows = await db<QuestionRow>('questions').where({ paper_id: paperId }).orderBy('position')
  const ids = rows.map((row) => row.id)
  const spaces = await db<SpaceRow>('answer_spaces').whereIn('question_id', ids).orderBy('position')
  const points = await db<PointRow>('mark_points').whereIn('question_id', ids).orderBy('position')
  return rows.map((row) => toQuestion(row, spaces, points))
}

export async function getQuestion(db: Db, id: string): Promise<(Question & { paperId: string }) | null> {
  const row = await db<QuestionRow>('questions').where({ id }).first()
  if (!row) return null
  const spaces = await db<SpaceRow>('answer_spaces').where({ question_id: id }).orderBy('position')
  const points = await db<PointRow>('mark_points').where({ question_id: id }).orderBy('position')
  return { ...toQuestion(row, spaces, points), paperId: row.paper_id }
}

function toQuestion(row: QuestionRow, spaces: readonly SpaceRow[], points: readonly PointRow[]): Question {
  return {
    id: row.id, label: row.label, position: row.position, maximum: row.maximum, text: row.text, answer: row.answer, modelSolution: row.model_solution,
    schemeNote: row.scheme_note, tolerance: row.tolerance,
    spaces: spaces.filter((space) => space.question_id === row.id).map(toSpace),
    points: points.filter((point) => point.question_id === row.id).map(toPoint),
    withdrawn: row.withdrawn_as ? { as: row.withdrawn_as, reason: row.withdrawn_reason ?? '' } : null,
  }
}

function toSpace({ id, page, x, y, w, h }: SpaceRow): AnswerSpace {
  return { id, page, rect: { x, y, w, h } }
}

function toPoint(row: PointRow): MarkPoint {
  return { id: row.id, label: row.label, worth: row.worth, kind: row.kind, dependsOn: row.depends_on, note: row.note, withdrawn: row.withdrawn_at !== null }
}

/** Adds or changes a question with its spaces and points. What is missing from the lists is left alone: see `dropSpaces`, `dropPoints`. */
export async function putQuestion(db: Db, paperId: string, question: Omit<Question, 'withdrawn'>): Promise<void> {
  const row = {
    id: question.id, paper_id: paperId, label: question.label, position: question.position, maximum: question.maximum, text: question.text, answer: question.answer,
    model_solution: question.modelSolution, scheme_note: question.schemeNote, tolerance: question.tolerance,
  }
  await db<QuestionRow>('questions').insert(row).onConflict('id').merge()
  for (const [position, { id, page, rect }] of question.spaces.entries()) {
    await db<SpaceRow>('answer_spaces').insert({ id, question_id: question.id, position, page, ...rect }).onConflict('id').merge()
  }
  // Without dependencies first: a point may depend on one further down the list.
  for (const pass of ['rows', 'dependencies'] as const) {
    for (const [position, point] of question.points.entries()) {
      const dependsOn = pass === 'rows' ? null : point.dependsOn
      await db<PointRow>('mark_points')
        .insert({ id: point.id, question_id: question.id, position, label: point.label, worth: point.worth, kind: point.kind, depends_on: dependsOn, note: point.note })
        .onConflict('id').merge()
    }
  }
}

/** Takes questions away with the empty responses that wait for them. Only for questions without stamps: see `touchedByMarking`. */
export async function dropQuestions(db: Db, ids: readonly string[]): Promise<void> {
  await db('responses').whereIn('question_id', ids).delete()
  await db('mark_points').whereIn('question_id', ids).update({ depends_on: null })
  await db('questions').whereIn('id', ids).delete()
}

export async function dropSpaces(db: Db, ids: readonly string[]): Promise<void> {
  await db('answer_spaces').whereIn('id', ids).delete()
}

/** Only for points no stamp names. */
export async function dropPoints(db: Db, ids: readonly string[]): Promise<void> {
  await db('mark_points').whereIn('depends_on', ids).update({ depends_on: null })
  await db('mark_points').whereIn('id', ids).delete()
}

/** Frees every label of a paper for a moment, so that two questions may swap theirs in one save. */
export async function parkLabels(db: Db, paperId: string): Promise<void> {
  await db('questions').where({ paper_id: paperId }).update({ label: db.raw(`'~' || id`) })
}

/** Which of the ids name rows of another paper: a save may not reach over. */
export async function idsOfOtherPapers(db: Db, paperId: string, ids: Readonly<{ questions: readonly string[]; points: readonly string[]; spaces: readonly string[] }>): Promise<string[]> {
  const questions = (await db('questions').whereIn('id', ids.questions).whereNot({ paper_id: paperId }).pluck('id')) as string[]
  const inside = async (table: 'mark_points' | 'answer_spaces', wanted: readonly string[]) =>
    (await db(table).join('questions', 'questions.id', `${table}.question_id`).whereIn(`${table}.id`, wanted).whereNot('questions.paper_id', paperId).pluck(`${table}.id`)) as string[]
  return [...questions, ...(await inside('mark_points', ids.points)), ...(await inside('answer_spaces', ids.spaces))]
}

type Withdrawn = Readonly<{ by: string; reason: string; as: 'out' | 'full' }>

/** Null brings the question back. */
export async function setQuestionWithdrawn(db: Db, id: string, withdrawn: Withdrawn | null): Promise<void> {
  await db<QuestionRow>('questions').where({ id }).update({
    withdrawn_at: withdrawn && Date.now(), withdrawn_by: withdrawn?.by ?? null, withdrawn_reason: withdrawn?.reason ?? null, withdrawn_as: withdrawn?.as ?? null,
  })
}

export async function setPointWithdrawn(db: Db, id: string, withdrawn: Omit<Withdrawn, 'as'> | null): Promise<void> {
  await db('mark_points').where({ id }).update({ withdrawn_at: withdrawn && Date.now(), withdrawn_by: withdrawn?.by ?? null, withdrawn_reason: withdrawn?.reason ?? null })
}
