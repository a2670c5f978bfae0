import { z } from 'zod'
import type { HalfMarks } from './marks'
import type { Paper, PaperBox } from './paper'

/** What a teacher sets on the blank paper, as one value: it is saved whole, and an undo is an earlier value. */

const Halves = z.int().min(1).max(400).transform((value) => value as HalfMarks)
const Rect = z.object({ x: z.number().min(-10).max(5000), y: z.number().min(-10).max(5000), w: z.number().positive().max(5000), h: z.number().positive().max(5000) })

export const SettingPoint = z.object({
  id: z.uuid(),
  label: z.string().trim().max(300),
  /** Half marks. */
  worth: Halves,
  kind: z.enum(['M', 'A', 'B']).nullable(),
  /** Another mark point of the same question. */
  dependsOn: z.uuid().nullable(),
  note: z.string().trim().max(2000),
})
export type SettingPoint = Readonly<z.output<typeof SettingPoint>>

export const SettingSpace = z.object({ id: z.uuid(), page: z.int().min(1).max(40), rect: Rect })
export type SettingSpace = Readonly<z.output<typeof SettingSpace>>

export const SettingQuestion = z.object({
  id: z.uuid(),
  label: z.string().trim().max(20),
  /** Half marks. */
  maximum: Halves,
  text: z.string().trim().max(4000),
  answer: z.string().trim().max(1000),
  modelSolution: z.string().trim().max(8000),
  schemeNote: z.string().trim().max(4000),
  /** Half marks; null: the paper's tolerance holds. */
  tolerance: z.int().min(0).max(200).transform((value) => value as HalfMarks).nullable(),
  spaces: z.array(SettingSpace).max(20).readonly(),
  points: z.array(SettingPoint).max(40).readonly(),
})
export type SettingQuestion = Readonly<z.output<typeof SettingQuestion>>

export const Setting = z.object({
  step: z.union([z.literal(1), z.literal(2)]),
  tolerance: z.int().min(0).max(200).transform((value) => value as HalfMarks),
  boxes: z.array(z.object({ kind: z.enum(['name', 'number']), page: z.int().min(1).max(40), rect: Rect })).max(40) as unknown as z.ZodType<readonly PaperBox[]>,
  questions: z.array(SettingQuestion).max(120).readonly(),
})
export type Setting = Readonly<z.output<typeof Setting>>

/** The setting of a stored paper: what of it the teacher may change as one value. */
export function settingOf(paper: Pick<Paper, 'step' | 'tolerance' | 'boxes' | 'questions'>): Setting {
  return {
    step: paper.step,
    tolerance: paper.tolerance,
    boxes: paper.boxes.map(({ kind, page, rect }) => ({ kind, page, rect })),
    questions: paper.questions.map(({ id, label, maximum, text, answer, modelSolution, schemeNote, tolerance, spaces, points }) => ({
      id, label, maximum, text, answer, modelSolution, schemeNote, tolerance,
      spaces: spaces.map(({ id: spaceId, page, rect }) => ({ id: spaceId, page, rect: { ...rect } })),
      points: points.map(({ id: pointId, label: earns, worth, kind, dependsOn, note }) => ({ id: pointId, label: earns, worth, kind, dependsOn, note })),
    })),
  }
}

/**
 * How many answers are cut out of the scans anew when one setting takes the place of another: those whose space was moved or put elsewhere.
 * Marks lie on the page and stay. @param scanned how many scripts have a scan of each page
 */
export function answersCutAgain(before: Pick<Setting, 'questions'>, after: Pick<Setting, 'questions'>, scanned: Readonly<Record<number, number>>): number {
  const place = ({ page, rect: { x, y, w, h } }: SettingSpace): string => [page, x, y, w, h].join()
  return after.questions.reduce((sum, question) => {
    const old = before.questions.find(({ id }) => id === question.id)?.spaces ?? []
    const moved = question.spaces.filter((space) => !old.some((was) => place(was) === place(space)))
    return sum + Math.max(0, ...moved.map(({ page }) => scanned[page] ?? 0))
  }, 0)
}
