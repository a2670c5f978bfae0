import { checkKeys, type Check, type CheckKey, type CheckLine, type Closing, type SignOff } from '@/lib/core/hand-back'
import { kept, markOf, markOnPoint } from '@/lib/core/marking'
import { onStep, sayMark } from '@/lib/core/marks'
import type { Paper, Question } from '@/lib/core/paper'
import type { Stamp } from '@/lib/core/stamp'

/** A script as the check looks at it. `who` is its student's name, or "script 12" while that is open. */
export type CheckedScript = Readonly<{
  scriptId: string
  who: string
  named: boolean
  absent: boolean
  /** Another script that bears the same student's name, confirmed or suggested. */
  doubles: string | null
  missingPages: readonly number[]
  answers: readonly Readonly<{ responseId: string; questionId: string; hasPage: boolean; flagged: boolean; stamps: readonly Stamp[] | null }>[]
}>
export type CheckedSet = Readonly<{
  paper: Pick<Paper, 'id' | 'step' | 'questions'>
  scripts: readonly CheckedScript[]
  /** Students of the list who are expected and have no script. */
  without: readonly Readonly<{ studentId: string; name: string }>[]
  loose: readonly Readonly<{ id: string; says: string }>[]
  undecided: readonly Readonly<{ scriptId: string; says: string }>[]
}>

type Found = Readonly<{ subject: string; says: string; scriptId: string | null }>

/** What cannot be signed away: a script without a sure name or without all its marks can only stay behind. */
const closings: Partial<Record<CheckKey, Closing>> = { names: 'keep-back', unsettled: 'keep-back', doubled: 'keep-back' }
const place: Readonly<Record<CheckKey, string>> = {
  names: '/sort', unsettled: '', loose: '/sort', 'no-script': '/sort', doubled: '/sort', missing: '/sort', over: '', method: '', flags: '', sample: '/second-mark',
}

/** The key a signature is kept under. One script kept back is kept back whatever is wrong with it. */
export function signKey(key: CheckKey, subject: string): string {
  return closings[key] === 'keep-back' ? keepBackKey(subject) : `${key}/${subject}`
}
const keepBackKey = (scriptId: string): string => `keep-back/${scriptId}`

/**
 * The clerical check before a release, every item found by itself. A line is closed when what it names is mended, or when it is signed
 * (`signed`, by `signKey`). A script that is kept back is asked nothing else.
 */
export function clericalCheck(set: CheckedSet, signed: ReadonlyMap<string, SignOff>): Check[] {
  const gone = new Set(set.scripts.filter(({ scriptId }) => signed.has(keepBackKey(scriptId))).map(({ scriptId }) => scriptId))
  const found = findings(set)
  return checkKeys.map((key) => {
    const closing = closings[key] ?? 'sign'
    const lines = found[key].filter(({ scriptId }) => closing === 'keep-back' || scriptId === null || !gone.has(scriptId))
    return { key, closing, lines: lines.map((line): CheckLine => ({ ...line, href: `/papers/${set.paper.id}${place[key]}`, signed: signed.get(signKey(key, line.subject)) ?? null })) }
  })
}

function findings({ paper, scripts, without, loose, undecided }: CheckedSet): Record<CheckKey, Found[]> {
  const sat = scripts.filter(({ absent }) => !absent)
  const perScript = (says: (script: CheckedScript) => string | null): Found[] => sat.flatMap((script) => {
    const words = says(script)
    return words === null ? [] : [{ subject: script.scriptId, scriptId: script.scriptId, says: `${script.who}: ${words}` }]
  })
  const perAnswer = (says: (question: Question, answer: CheckedScript['answers'][number]) => string | null): Found[] => sat.flatMap((script) => script.answers.flatMap((answer) => {
    const question = paper.questions.find(({ id }) => id === answer.questionId)
    const words = question && !question.withdrawn ? says(question, answer) : null
    return words === null ? [] : [{ subject: answer.responseId, scriptId: script.scriptId, says: `${script.who}, question ${question!.label}: ${words}` }]
  }))
  return {
    names: perScript(({ named }) => (named ? null : 'no name confirmed')),
    unsettled: perScript((script) => unmarked(paper.questions, script)),
    loose: loose.map(({ id, says }) => ({ subject: id, says, scriptId: null })),
    'no-script': without.map(({ studentId, name }) => ({ subject: studentId, says: `${name}: on the list, no script, not marked absent`, scriptId: null })),
    doubled: perScript(({ doubles }) => doubles && `the same student as ${doubles}`),
    missing: perScript(({ missingPages }) => (missingPages.length === 0 ? null : `page ${missingPages.join(' and ')} missing`)),
    over: perAnswer((question, { stamps }) => stamps && overOrOff(question, stamps, paper.step)),
    method: perAnswer((question, { stamps }) => stamps && withoutBase(question, stamps)),
    flags: perAnswer((_, { flagged }) => (flagged ? 'an open flag' : null)),
    sample: undecided.map(({ scriptId, says }) => ({ subject: scriptId, scriptId, says })),
  }
}

function unmarked(questions: readonly Question[], { answers }: CheckedScript): string | null {
  const labels = questions.filter(({ id, withdrawn }) => !withdrawn && answers.some((answer) => answer.questionId === id && answer.hasPage && answer.stamps === null)).map(({ label }) => label)
  if (labels.length === 0) return null
  return labels.length > 4 ? `${labels.length} answers without a settled mark` : `no settled mark for ${labels.join(', ')}`
}

function overOrOff({ maximum }: Question, stamps: readonly Stamp[], step: Paper['step']): string | null {
  const mark = markOf(stamps)
  if (mark > maximum) return `${sayMark(mark)} of at most ${sayMark(maximum)}`
  return onStep(mark, step) ? null : `${sayMark(mark)} is off the paper’s step`
}

function withoutBase(question: Question, stamps: readonly Stamp[]): string | null {
  const lacking = question.points.find(({ id, dependsOn }) => dependsOn !== null && markOnPoint(kept(stamps), id) > 0 && markOnPoint(kept(stamps), dependsOn) === 0)
  const base = question.points.find(({ id }) => id === lacking?.dependsOn)
  return lacking && base ? `“${lacking.label}” without “${base.label}”` : null
}
