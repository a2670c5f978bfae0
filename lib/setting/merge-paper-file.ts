import { AppError, type ErrorLine } from '@/lib/core/errors'
import type { Question } from '@/lib/core/paper'
import type { Setting, SettingPoint, SettingQuestion } from '@/lib/core/setting'

const same = (a: string, b: string) => a.trim().toLowerCase() === b.trim().toLowerCase()

/**
 * The setting of a file laid over a paper: what has the same label keeps its id. Without stamps the file replaces the paper;
 * with stamps it may only add and change, and anything it leaves out throws has_stamps. What is withdrawn stays as it is.
 */
export function mergePaperFile(stored: readonly Question[], file: Setting, stamped: boolean): Setting {
  const lines: ErrorLine[] = []
  const questions = file.questions.map((question) => {
    const before = stored.find((each) => same(each.label, question.label))
    return before ? mergeQuestion(before, question, stamped, lines) : question
  })
  const left = stored.filter((before) => !file.questions.some((question) => same(before.label, question.label)))
  if (stamped) lines.push(...left.filter(({ withdrawn }) => withdrawn === null).map(({ label }) => ({ path: `Question ${label}`, says: 'is not in the file' })))
  if (lines.length > 0) throw new AppError('has_stamps', { lines })
  return { ...file, questions: stamped ? [...questions, ...left] : questions }
}

function mergeQuestion(before: Question, after: SettingQuestion, stamped: boolean, lines: ErrorLine[]): SettingQuestion {
  const free = [...before.points]
  const ids = new Map<string, string>()
  const matched = after.points.map((point) => {
    const at = free.findIndex((each) => same(each.label, point.label))
    const id = at < 0 ? point.id : free.splice(at, 1)[0]!.id
    ids.set(point.id, id)
    return { ...point, id }
  })
  const points: SettingPoint[] = matched.map((point) => ({ ...point, dependsOn: point.dependsOn && (ids.get(point.dependsOn) ?? null) }))
  if (stamped) {
    lines.push(...free.filter(({ withdrawn }) => !withdrawn).map(({ label }) => ({ path: `Question ${before.label}`, says: `${label}: is not in the file` })))
    points.push(...free.filter(({ withdrawn }) => withdrawn))
  }
  return { ...after, id: before.id, spaces: after.spaces.map((space, k) => ({ ...space, id: before.spaces[k]?.id ?? space.id })), points }
}
