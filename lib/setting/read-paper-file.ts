import { AppError, type ErrorLine } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { halves, halvesOfMarks } from '@/lib/core/marks'
import type { GradeScale, PaperBox, PaperPage } from '@/lib/core/paper'
import type { Setting, SettingPoint, SettingQuestion } from '@/lib/core/setting'
import { checkSetting } from './check-setting'
import { PaperFile, type FilePoint, type FileQuestion } from './paper-file'
import { faultLines, pathInFile } from './setting-fault'

/** What a paper.json says. Ids are new; a detail the file leaves out is undefined. */
export type ReadPaper = Readonly<{
  title: string
  pages: readonly PaperPage[]
  setting: Setting
  sampleSize?: number | null
  namesHidden?: boolean
  solutionsReleased?: boolean
  scale?: GradeScale
}>

/** A difference of page sizes under this many points is only rounding. */
const samePage = 1.5

/**
 * Reads a paper.json that was parsed already. `pdfPages` are the pages of the blank paper it belongs to, when there is one.
 * Throws paper_invalid with every fault by its path.
 */
export function readPaperFile(raw: unknown, pdfPages?: readonly PaperPage[]): ReadPaper {
  const parsed = PaperFile.safeParse(raw, { reportInput: true })
  if (!parsed.success) throw new AppError('paper_invalid', { lines: parsed.error.issues.map(sayIssue) })
  const file = parsed.data
  const pages = pagesOf(file)
  const lines: ErrorLine[] = []
  const setting: Setting = {
    step: file.marking_step === 1 ? 2 : 1,
    tolerance: file.tolerance === undefined ? halves(1) : halvesOfMarks(file.tolerance),
    boxes: boxesOf(file),
    questions: file.questions.map((question, k) => toQuestion(question, k, lines)),
  }
  lines.push(...pageFaults(file, pages, pdfPages), ...faultLines(checkSetting(setting, pages), pathInFile))
  if (lines.length > 0) throw new AppError('paper_invalid', { lines })
  return {
    title: file.title, pages, setting, sampleSize: file.sample_size, namesHidden: file.names_hidden, solutionsReleased: file.solutions_released,
    scale: file.grade_scale && { oddHalf: file.grade_scale.odd_half, boundaries: file.grade_scale.boundaries.map(({ grade, lowest }) => ({ grade, lowest: halvesOfMarks(lowest) })) },
  }
}

type Issue = Readonly<{ path: readonly PropertyKey[]; message: string; code?: string; expected?: unknown; input?: unknown }>

function sayIssue({ path, message, code, expected, input }: Issue): ErrorLine {
  const place = path.map((part, k) => (typeof part === 'number' ? `[${part}]` : `${k > 0 ? '.' : ''}${String(part)}`)).join('')
  if (code === 'invalid_type') return { path: place || 'the file', says: input === undefined ? 'is missing' : `should be ${sayKind(String(expected))}` }
  return { path: place || 'the file', says: message.charAt(0).toLowerCase() + message.slice(1) }
}

function pagesOf(file: PaperFile): PaperPage[] {
  return Array.from({ length: file.pages }, (_, k) => {
    const other = file.other_page_sizes?.find((each) => each.page === k + 1)
    return { page: k + 1, width: other?.width ?? file.page_width, height: other?.height ?? file.page_height }
  })
}

function pageFaults(file: PaperFile, pages: readonly PaperPage[], pdfPages?: readonly PaperPage[]): ErrorLine[] {
  if (!pdfPages) return []
  if (pdfPages.length !== pages.length) return [{ path: 'pages', says: `is ${file.pages}, and the PDF has ${pdfPages.length}` }]
  const differs = pages.find((each, k) => Math.abs(each.width - pdfPages[k]!.width) > samePage || Math.abs(each.height - pdfPages[k]!.height) > samePage)
  if (!differs) return []
  const real = pdfPages[differs.page - 1]!
  return [{ path: 'page_width', says: `page ${differs.page} is ${differs.width} × ${differs.height} pt here, and ${real.width} × ${real.height} pt in the PDF` }]
}

function boxesOf(file: PaperFile): PaperBox[] {
  const boxes: PaperBox[] = []
  if (file.name_region) {
    const { page, x, y, w, h } = file.name_region
    boxes.push({ kind: 'name', page, rect: { x, y, w, h } })
  }
  const page = file.name_region?.page ?? 1
  for (const box of file.candidate_number_boxes) boxes.push({ kind: 'number', page: box.page ?? page, rect: { x: box.x, y: box.y, w: box.w, h: box.h } })
  return boxes
}

function toQuestion(file: FileQuestion, index: number, lines: ErrorLine[]): SettingQuestion {
  const ids = file.mark_points.map(newId)
  return {
    id: newId(), label: file.label, maximum: halvesOfMarks(file.max_marks), text: file.text ?? '', answer: file.answer, modelSolution: file.model_solution ?? '',
    schemeNote: file.scheme_note ?? '', tolerance: file.tolerance == null ? null : halvesOfMarks(file.tolerance),
    spaces: [{ page: file.page, region: file.region }, ...(file.more_spaces ?? [])].map(({ page, region }) => ({ id: newId(), page, rect: { ...region } })),
    points: file.mark_points.map((point, k): SettingPoint => ({
      id: ids[k]!, label: point.label, worth: halvesOfMarks(point.marks), kind: point.kind ?? null, note: point.note ?? '',
      dependsOn: dependency(point, file.mark_points, ids, `questions[${index}].mark_points[${k}].depends_on`, lines),
    })),
  }
}

/** By label, or by number where labels repeat. A wrong one is added to the faults. */
function dependency({ depends_on: on }: FilePoint, points: readonly FilePoint[], ids: readonly string[], path: string, lines: ErrorLine[]): string | null {
  if (on == null) return null
  const found = typeof on === 'number' ? (points[on - 1] ? [on - 1] : []) : points.flatMap((point, k) => (point.label === on.trim() ? [k] : []))
  if (found.length === 1) return ids[found[0]!]!
  lines.push({ path, says: found.length === 0 ? `${JSON.stringify(on)} is no mark point of this question` : `${JSON.stringify(on)} could be several mark points: give its number instead` })
  return null
}

function sayKind(expected: string): string {
  return ({ string: 'text', array: 'a list', object: 'an object with keys', boolean: 'true or false', int: 'a whole number' } as Record<string, string>)[expected] ?? `a ${expected}`
}
