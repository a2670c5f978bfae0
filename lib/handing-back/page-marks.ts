import { kept, markOf } from '@/lib/core/marking'
import { sum } from '@/lib/core/marks'
import type { Paper, Question } from '@/lib/core/paper'
import { compose, corners, toPixels, turning, turnOf, type PaperRect } from '@/lib/core/paper-space'
import type { AnswerArea } from '@/lib/core/returned'
import { penOf } from '@/lib/core/stamp'
import { drawMarkedPage, sayMarkedPage, type PressedStamp, type SpaceMark } from './marked-page'
import type { ScriptPage } from './returned-page'
import type { GatheredAnswer, GatheredPage, GatheredScript } from './script-to-return'

type Marked = Readonly<{ question: Question; answer: GatheredAnswer }>

function stampsOn(page: GatheredPage, marked: readonly Marked[]): PressedStamp[] {
  return marked.flatMap(({ question, answer: { marking } }) => kept(marking?.stamps ?? []).filter(({ scriptPageId }) => scriptPageId === page.id)
    .map((stamp) => ({ stamp, pen: penOf(marking!.round), label: question.label })))
}

/** A question's mark stands beside its last space; where that page is missing, beside the last one that is there. */
function marksOn(page: GatheredPage, pages: readonly GatheredPage[], marked: readonly Marked[]): SpaceMark[] {
  const there = new Set(pages.map(({ paperPage }) => paperPage))
  return marked.flatMap(({ question, answer: { marking } }) => {
    const space = question.spaces.filter((one) => there.has(one.page)).at(-1)
    return marking && !question.withdrawn && space?.page === page.paperPage ? [{ label: question.label, space: space.rect, mark: markOf(marking.stamps), pen: penOf(marking.round) }] : []
  })
}

/** One page of a script with its marking, ready to be built. `number` counts from 1; a page of which only some questions are shown gets no sum. */
export function pageToReturn(script: GatheredScript, page: GatheredPage, number: number, withSum = true): ScriptPage {
  const { leaf } = page
  const marked = script.paper.questions.flatMap((question) => {
    const answer = script.answers.find(({ questionId }) => questionId === question.id)
    return answer ? [{ question, answer }] : []
  })
  const stamps = stampsOn(page, marked)
  const marks = marksOn(page, script.pages, marked)
  const image = { width: leaf.width, height: leaf.height }
  const total = withSum && marks.length > 1 ? { mark: sum(marks.map(({ mark }) => mark)), pen: marks[0]!.pen } : null
  return {
    sheaf: leaf.sheafId, index: leaf.position, ...(leaf.half === null ? {} : { half: leaf.half, part: leaf.part ?? null }), homography: leaf.homography, image,
    drawings: leaf.homography ? drawMarkedPage({ paper: paperSize(script.paper, page), image, homography: leaf.homography, stamps, marks, total }) : [],
    words: sayMarkedPage({ stamps, marks }, number),
  }
}

/** An extra page is as large as the paper's first. */
function paperSize(paper: Paper, page: GatheredPage): { width: number; height: number } {
  return paper.pages.find((one) => one.page === page.paperPage) ?? paper.pages[0] ?? { width: 595.28, height: 841.89 }
}

/** All stamps of a script that are drawn on a page, for the key of codes. */
export function stampsOf(script: GatheredScript): PressedStamp[] {
  return script.pages.flatMap((page) => stampsOn(page, script.paper.questions.flatMap((question) => {
    const answer = script.answers.find(({ questionId }) => questionId === question.id)
    return answer ? [{ question, answer }] : []
  })))
}

/** Width over height of a page as it is shown upright. */
export function shapeOf({ leaf: { width, height, homography } }: GatheredPage): number {
  return homography && turnOf(homography, { x: 250, y: 350 }) % 180 !== 0 ? height / width : width / height
}

/** Where a question's spaces stand on the pages as shown upright, in shares. */
export function areasOf(question: Question, pages: readonly GatheredPage[]): AnswerArea[] {
  return question.spaces.flatMap(({ page, rect }) => {
    const index = pages.findIndex(({ paperPage }) => paperPage === page)
    return index < 0 ? [] : areaOn(pages[index]!, rect).map((area) => ({ page: index, ...area }))
  })
}

function areaOn({ leaf: { width, height, homography } }: GatheredPage, rect: PaperRect): Omit<AnswerArea, 'page'>[] {
  if (!homography) return []
  const turn = turnOf(homography, { x: 250, y: 350 })
  const upright = compose(turning(turn, width, height), homography)
  const [w, h] = turn % 180 === 0 ? [width, height] : [height, width]
  const at = corners(rect).map((corner) => toPixels(upright, corner))
  const share = (value: number, of: number): number => Math.round(Math.min(1, Math.max(0, value / of)) * 10_000) / 10_000
  const [left, right] = [share(Math.min(...at.map(({ x }) => x)), w), share(Math.max(...at.map(({ x }) => x)), w)]
  const [top, bottom] = [share(Math.min(...at.map(({ y }) => y)), h), share(Math.max(...at.map(({ y }) => y)), h)]
  return right > left && bottom > top ? [{ x: left, y: top, w: right - left, h: bottom - top }] : []
}
