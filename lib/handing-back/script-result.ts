import { createHash } from 'node:crypto'
import { halves, percent, sayMark, sum } from '@/lib/core/marks'
import type { ReturnedDetail } from '@/lib/core/returned'
import { sayDay } from '@/lib/core/say-day'
import { codesOn } from './marked-page'
import { areasOf, pageToReturn, shapeOf, stampsOf } from './page-marks'
import { adjustmentsOf, questionResult, whatToPractise } from './question-result'
import type { ScriptPage } from './returned-page'
import type { GatheredScript } from './script-to-return'
import type { Summary } from './summary'

/** What is handed back of one script: the frozen results and its pages. `key` says what went in: the same as long as nothing of it changes. */
export type ScriptResult = Readonly<{ detail: ReturnedDetail; pages: readonly ScriptPage[]; markers: readonly string[]; key: string }>

/** Works out everything of a returned script that does not depend on the day it is handed back. */
export function scriptResult(script: GatheredScript): ScriptResult {
  const { paper, total, grade } = script
  const answers = new Map(script.answers.map((answer) => [answer.questionId, answer]))
  const questions = paper.questions.map((question) => ({ ...questionResult(question, answers.get(question.id), paper.solutionsReleased), areas: areasOf(question, script.pages) }))
  const adjustments = paper.questions.flatMap((question) => adjustmentsOf(question, answers.get(question.id)))
  const pages = script.pages.map((page, k) => pageToReturn(script, page, k + 1))
  const pens = new Set(questions.flatMap(({ mark, pen }) => (mark === null ? [] : [pen])))
  const detail: ReturnedDetail = {
    format: 1, title: paper.title, className: script.className, satOn: script.satOn, givenName: script.givenName, familyName: script.familyName, candidateNumber: script.candidateNumber,
    total: total.final, ticks: sum(questions.flatMap(({ mark }) => mark ?? [])), adjustments, maximum: total.maximum,
    percent: total.maximum > 0 ? percent(total.final, total.maximum) : null, grade, gradeSays: gradeSays(script), pen: pens.size === 1 ? [...pens][0]! : 'first',
    questions, pages: script.pages.map((page, k) => ({ shape: shapeOf(page), words: pages[k]!.words })), next: whatToPractise(questions),
  }
  const markers = [...new Set(script.answers.flatMap(({ marking }) => (marking ? [marking.marker] : [])))].sort()
  return { detail, pages, markers, key: keyOf(script) }
}

/** Made of marks, stamps, pages and what is said about them, and of none of our own wording: a new edition of Sheafmark changes nobody's script. */
function keyOf({ paper, school: _school, sampled: _sampled, ...own }: GatheredScript): string {
  const questions = paper.questions.map(({ id, label, maximum, points, spaces, withdrawn, modelSolution }) => ({ id, label, maximum, points, spaces, withdrawn, modelSolution: paper.solutionsReleased ? modelSolution : null }))
  return createHash('sha256').update(JSON.stringify([1, paper.title, paper.scale, questions, own])).digest('hex')
}

/** How the grade came about, in one sentence; empty without a scale. */
function gradeSays({ paper: { scale }, total, grade }: GatheredScript): string {
  if (scale.boundaries.length === 0) return ''
  if (total.toCome > 0) return 'There is no grade, because a page is missing.'
  const rounding = total.final % 2 === 0 || scale.oddHalf === 'kept' ? '' : `An odd half goes ${scale.oddHalf} to the whole mark. `
  const reached = scale.boundaries.find((boundary) => boundary.grade === grade)
  const lowest = scale.boundaries.reduce((least, { lowest }) => Math.min(least, lowest), Infinity)
  if (!reached) return `${rounding}The lowest grade begins at ${sayMark(halves(lowest))} under the school’s scale for this test.`
  return `${rounding}Grade ${reached.grade} begins at ${sayMark(reached.lowest)} under the school’s scale for this test.`
}

/** The summary page of a result, with the day and the revision it is handed back in. */
export function summaryOf(script: GatheredScript, { detail, markers }: ScriptResult, on: Readonly<{ day: string; revision: number }>): Summary {
  const about = [`handed back ${sayDay(on.day)}`, ...(on.revision > 1 ? [`revision ${on.revision}`] : []), ...(markers.length > 0 ? [`marked by ${markers.join(' and ')}`] : []), ...(script.sampled ? ['sample second-marked'] : [])]
  const solutions = detail.questions.flatMap(({ label, modelSolution }) => (modelSolution === null ? [] : [`${label}: ${modelSolution}`]))
  return {
    title: detail.title, where: `${script.school}, class ${detail.className}, ${sayDay(detail.satOn)}`, student: `${detail.givenName} ${detail.familyName}`, candidateNumber: detail.candidateNumber,
    about: about.join(', '), total: detail.total, ticks: detail.ticks, adjustments: detail.adjustments, maximum: detail.maximum, percent: detail.percent, grade: detail.grade,
    gradeSays: detail.gradeSays, pen: detail.pen, questions: detail.questions, next: detail.next, solutions, codes: codesOn(stampsOf(script)),
    asking: 'Is a mark not clear to you? Ask your teacher about it.',
  }
}
