import { AppError, type ErrorLine } from '@/lib/core/errors'
import { sayMark, type HalfMarks } from '@/lib/core/marks'
import type { Question } from '@/lib/core/paper'
import type { Setting, SettingQuestion } from '@/lib/core/setting'

/** What marking has touched: it is never deleted, and nothing falls under what was given. */
export type Touched = Readonly<{
  questions: ReadonlySet<string>
  points: ReadonlySet<string>
  /** The most given on one response of a question, in half marks. */
  given: ReadonlyMap<string, HalfMarks>
  /** Whether any stamp of the paper is worth an odd half. */
  oddHalves: boolean
}>

export type Plan = Readonly<{ dropQuestions: readonly string[]; dropPoints: readonly string[]; dropSpaces: readonly string[] }>

const gone = (before: readonly { id: string }[], after: readonly { id: string }[]) => before.filter(({ id }) => !after.some((each) => each.id === id)).map(({ id }) => id)

/** What has to go to get from the stored questions to the next setting. Throws has_stamps when marking forbids it. */
export function planChanges(stored: readonly Question[], next: Setting, touched: Touched): Plan {
  const kept = stored.filter((question) => next.questions.some(({ id }) => id === question.id))
  const pairs = kept.map((question) => ({ question, after: next.questions.find(({ id }) => id === question.id)! }))
  const plan: Plan = {
    dropQuestions: gone(stored, next.questions),
    dropPoints: pairs.flatMap(({ question, after }) => gone(question.points, after.points)),
    dropSpaces: pairs.flatMap(({ question, after }) => gone(question.spaces, after.spaces)),
  }
  const lines = [
    ...stored.filter(({ id }) => plan.dropQuestions.includes(id) && touched.questions.has(id)).map(({ label }) => ({ path: `Question ${label}`, says: 'has marks: withdraw it instead' })),
    ...pairs.flatMap(({ question, after }) => pairFaults(question, after, touched)),
    ...(next.step === 2 && touched.oddHalves ? [{ path: 'Marking step', says: 'half marks have been given: it stays at a half' }] : []),
  ]
  if (lines.length > 0) throw new AppError('has_stamps', { lines })
  return plan
}

function pairFaults(before: Question, after: SettingQuestion, touched: Touched): ErrorLine[] {
  const dropped = gone(before.points, after.points)
  const lines = before.points.filter(({ id }) => dropped.includes(id) && touched.points.has(id)).map(({ label }) => ({ path: `Question ${before.label}`, says: `${label}: has marks, withdraw it instead` }))
  const given = touched.given.get(before.id)
  if (given !== undefined && after.maximum < given) lines.push({ path: `Question ${before.label}`, says: `${sayMark(given)} has been given, so the most cannot be ${sayMark(after.maximum)}` })
  return lines
}
