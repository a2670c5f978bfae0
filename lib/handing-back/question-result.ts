import { kept, markOf, markOnPoint } from '@/lib/core/marking'
import { halves, sayMark, sum, type HalfMarks } from '@/lib/core/marks'
import type { Question } from '@/lib/core/paper'
import type { AdjustmentLine, PointResult, ReturnedQuestion } from '@/lib/core/returned'
import { sayStamp } from '@/lib/core/say-stamp'
import { penOf, type Stamp } from '@/lib/core/stamp'
import type { GatheredAnswer } from './script-to-return'

/** What a question gave and why, but for where it stands on the pages. */
export function questionResult(question: Question, answer: GatheredAnswer | undefined, withSolution: boolean): Omit<ReturnedQuestion, 'areas'> {
  const marking = answer?.marking ?? null
  const stamps = kept(marking?.stamps ?? [])
  const shown = question.withdrawn === null && marking !== null
  const { points, whole } = pointsOf(question, stamps)
  return {
    label: question.label, text: question.text, maximum: question.maximum, pen: penOf(marking?.round ?? 'first'),
    mark: shown ? markOf(stamps) : null,
    remark: remarkOf(question, answer, stamps) ?? (whole && shown ? 'marked as a whole' : null),
    points: shown && !whole && !nothingWritten(stamps) ? points : [],
    comments: stamps.filter(({ kind, text }) => kind === 'note' && text.trim() !== '').map(({ text }) => text.trim()),
    modelSolution: withSolution && question.modelSolution.trim() !== '' ? question.modelSolution.trim() : null,
    words: stamps.length === 0 ? 'nothing stamped' : stamps.map(sayStamp).join('; '),
  }
}

const nothingWritten = (stamps: readonly Stamp[]): boolean => stamps.some(({ kind }) => kind === 'nothing-written')

function remarkOf({ withdrawn }: Question, answer: GatheredAnswer | undefined, stamps: readonly Stamp[]): string | null {
  if (withdrawn) return withdrawn.as === 'full' ? 'withdrawn: everyone gets full marks' : 'withdrawn: it does not count'
  if (!answer?.marking) return 'no page handed in'
  return nothingWritten(stamps) ? 'nothing written' : null
}

/** Each mark point with what it earned. `whole`: marks were given, and none of them to a point. */
function pointsOf(question: Question, stamps: readonly Stamp[]): { points: PointResult[]; whole: boolean } {
  const points = question.points.map((point) => ({ says: point.label, earned: markOnPoint(stamps, point.id), worth: point.worth, gone: point.withdrawn }))
    .filter(({ earned, gone }) => earned > 0 || !gone).map(({ says, earned, worth }) => ({ says, earned, worth }))
  const free = halves(markOf(stamps) - sum(points.map(({ earned }) => earned)))
  if (free <= 0) return { points, whole: false }
  if (free === markOf(stamps)) return { points: [], whole: true }
  return { points: [...points, { says: 'given besides', earned: free, worth: free }], whole: false }
}

/** What changed a question's mark beside the ticks: adjustments, as far as they fit between nought and the maximum, and full marks for all. */
export function adjustmentsOf(question: Question, answer: GatheredAnswer | undefined): AdjustmentLine[] {
  if (question.withdrawn) {
    return question.withdrawn.as === 'full' ? [{ says: `Question ${question.label} was withdrawn: full marks for everyone`, by: question.maximum }] : []
  }
  if (!answer?.marking) return []
  let mark: HalfMarks = markOf(answer.marking.stamps)
  let asked: number = mark
  const lines = [...answer.adjustments, { halves: 0, reason: `no more than ${sayMark(question.maximum)} can be given` }]
  return lines.flatMap(({ halves: by, reason }) => {
    const before = mark
    asked += by
    mark = halves(Math.min(question.maximum, Math.max(0, asked)))
    return mark === before ? [] : [{ says: `Question ${question.label}: ${reason}`, by: halves(mark - before) }]
  })
}

/** Up to five things to practise, where most was lost first, each in one sentence. */
export function whatToPractise(questions: readonly Omit<ReturnedQuestion, 'areas'>[]): string[] {
  return questions.filter(({ mark, maximum }) => mark !== null && mark < maximum)
    .toSorted((a, b) => b.maximum - b.mark! - (a.maximum - a.mark!)).slice(0, 5).map(practise)
}

function practise({ label, mark, maximum, points, remark }: Omit<ReturnedQuestion, 'areas'>): string {
  if (remark === 'nothing written') return `Try ${label}: nothing was written there.`
  const missed = points.find(({ earned, worth }) => earned < worth)
  const left = halves(maximum - mark!)
  const worth = `${sayMark(left)} ${left <= 2 ? 'mark' : 'marks'}`
  return `Do ${label} again for ${worth} more.${missed ? ` Not earned yet: ${missed.says}.` : ''}`
}
