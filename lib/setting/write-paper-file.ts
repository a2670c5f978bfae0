import { marksOf } from '@/lib/core/marks'
import type { MarkPoint, Paper, PaperBox, PaperPage, Question } from '@/lib/core/paper'
import { paperFileFormat, type FileQuestion, type PaperFile } from './paper-file'
import { paperSizeOf } from './paper-size'

/**
 * A paper as the value of a paper.json: all that is needed to set it again. What is withdrawn was found wanting and is left out;
 * a key that says nothing is left out too.
 */
export function writePaperFile(paper: Paper): Partial<PaperFile> {
  const first = paper.pages[0]
  const name = paper.boxes.find((box) => box.kind === 'name')
  return {
    format: paperFileFormat,
    title: paper.title,
    ...(first && { page_size: paperSizeOf(first) ?? 'other', page_width: first.width, page_height: first.height }),
    pages: paper.pages.length,
    ...otherSizes(paper.pages),
    name_region: name ? { page: name.page, ...name.rect } : null,
    candidate_number_boxes: paper.boxes.filter((box) => box.kind === 'number').map((box) => numberBox(box, name?.page ?? 1)),
    marking_step: paper.step === 2 ? 1 : 0.5,
    tolerance: marksOf(paper.tolerance),
    ...(paper.sampleSize !== null && { sample_size: paper.sampleSize }),
    names_hidden: paper.namesHidden,
    solutions_released: paper.solutionsReleased,
    ...(paper.scale.boundaries.length > 0 && {
      grade_scale: { odd_half: paper.scale.oddHalf, boundaries: paper.scale.boundaries.map(({ grade, lowest }) => ({ grade, lowest: marksOf(lowest) })) },
    }),
    questions: paper.questions.filter((question) => question.withdrawn === null && question.spaces.length > 0).map(toFile),
  }
}

function otherSizes(pages: readonly PaperPage[]): Pick<PaperFile, 'other_page_sizes'> {
  const other = pages.filter((page) => page.width !== pages[0]!.width || page.height !== pages[0]!.height)
  return other.length > 0 ? { other_page_sizes: other.map(({ page, width, height }) => ({ page, width, height })) } : {}
}

function numberBox({ page, rect }: PaperBox, usual: number): PaperFile['candidate_number_boxes'][number] {
  return page === usual ? { ...rect } : { page, ...rect }
}

function toFile(question: Question): FileQuestion {
  const [first, ...more] = question.spaces
  const points = question.points.filter((point) => !point.withdrawn)
  return {
    label: question.label,
    page: first!.page,
    region: { ...first!.rect },
    ...(more.length > 0 && { more_spaces: more.map(({ page, rect }) => ({ page, region: { ...rect } })) }),
    max_marks: marksOf(points.length > 0 ? (points.reduce((total, point) => total + point.worth, 0) as typeof question.maximum) : question.maximum),
    mark_points: points.map((point) => toFilePoint(point, points)),
    answer: question.answer,
    ...(question.text && { text: question.text }),
    ...(question.modelSolution && { model_solution: question.modelSolution }),
    ...(question.schemeNote && { scheme_note: question.schemeNote }),
    ...(question.tolerance !== null && { tolerance: marksOf(question.tolerance) }),
  }
}

function toFilePoint(point: MarkPoint, points: readonly MarkPoint[]): FileQuestion['mark_points'][number] {
  const on = points.findIndex((each) => each.id === point.dependsOn)
  const label = points[on]?.label
  const clear = points.filter((each) => each.label === label).length === 1
  return {
    label: point.label,
    marks: marksOf(point.worth),
    ...(point.kind && { kind: point.kind }),
    ...(point.note && { note: point.note }),
    ...(label !== undefined && { depends_on: clear ? label : on + 1 }),
  }
}
