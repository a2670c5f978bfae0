import type { HalfMarks } from '@/lib/core/marks'
import type { ModerationFigures } from '@/lib/core/moderation-figures'
import type { AgreementFigures, ComparedAnswer, DrawnAs, SampledScript, SampleQuestion, Stands } from '@/lib/core/second-marking'
import { agreementOf, withinTolerance } from './agreement'
import { figuresBy } from './figures-by'

/** A sampled answer as it was read: `second` null until it was settled. */
export type Answer = Readonly<{ scriptId: string; questionId: string; responseId: string; markerId: string; marker: string; first: HalfMarks; second: HalfMarks | null; adjustment: number; countingRound: string | null; reason: string | null }>
export type Script = Readonly<{ scriptId: string; number: number; name: string | null; drawnAs: DrawnAs }>
type Column = Readonly<{ id: string; label: string; maximum: HalfMarks; tolerance: HalfMarks }>

/** What was decided after comparing; null while only the settling of the first mark decided. */
export function standsOf(countingRound: string | null, reason: string | null): Stands | null {
  if (reason === null || reason === 'first_mark') return null
  return countingRound === 'second' || countingRound === 'agreed' ? countingRound : 'first'
}

function comparedOf(answer: Answer & { second: HalfMarks }, { tolerance, maximum }: Column, numbers: ReadonlyMap<string, number>): ComparedAnswer {
  const { responseId, questionId, markerId, scriptId, first, second, countingRound, reason } = answer
  const [within, decided] = [withinTolerance({ first, second, tolerance }), standsOf(countingRound, reason)]
  const adjusted = answer.adjustment === 0 ? null : (Math.min(maximum, Math.max(0, first + answer.adjustment)) as HalfMarks)
  const open = !within && decided === null && (adjusted === null || !withinTolerance({ first: adjusted, second, tolerance }))
  return { responseId, questionId, markerId, scriptNumber: numbers.get(scriptId) ?? 0, first, second, within, decided, adjusted, open }
}

type View = Readonly<{ scripts: SampledScript[]; questions: SampleQuestion[]; figures: AgreementFigures; moderation: ModerationFigures; undecided: number }>

/** How far a sample has been read, and what can be compared so far: only answers whose second mark is settled. */
export function sampleView({ answers, scripts, columns, owner }: Readonly<{ answers: readonly Answer[]; scripts: readonly Script[]; columns: readonly Column[]; owner: boolean }>): View {
  const numbers = new Map(scripts.map(({ scriptId, number }) => [scriptId, number]))
  const settled = answers.filter((one): one is Answer & { second: HalfMarks } => one.second !== null)
  const toleranceOf = new Map(columns.map(({ id, tolerance }) => [id, tolerance]))
  const pair = ({ first, second, questionId }: Answer & { second: HalfMarks }) => ({ first, second, tolerance: toleranceOf.get(questionId)! })
  const questions = columns.map((column) => {
    const { id, label, maximum, tolerance } = column
    const own = settled.filter(({ questionId }) => questionId === id)
    const compared = own.map((answer) => comparedOf(answer, column, numbers))
    return { questionId: id, label, maximum, tolerance, read: own.length, answers: answers.filter(({ questionId }) => questionId === id).length, compared, figures: agreementOf(own.map(pair)) }
  }).filter(({ answers: n }) => n > 0)
  return {
    questions, figures: agreementOf(settled.map(pair)),
    moderation: figuresBy({ answers: settled, columns: columns.filter(({ id }) => questions.some(({ questionId }) => questionId === id)), numbers }),
    undecided: questions.flatMap(({ compared }) => compared).filter(({ open }) => open).length,
    scripts: scripts.map(({ scriptId, number, name, drawnAs }) => {
      const own = answers.filter((one) => one.scriptId === scriptId)
      return { scriptId, number, name: owner ? name : null, drawnAs: owner ? drawnAs : null, answers: own.length, read: own.filter(({ second }) => second !== null).length }
    }),
  }
}
