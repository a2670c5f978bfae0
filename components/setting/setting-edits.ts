import { halves, type HalfMarks } from '@/lib/core/marks'
import type { PaperBox, PaperPage } from '@/lib/core/paper'
import type { PaperRect } from '@/lib/core/paper-space'
import type { Setting, SettingPoint, SettingQuestion, SettingSpace } from '@/lib/core/setting'
import { nextLabel } from './next-label'
import { onPage } from './snap'

/** A box on a page: an answer space, the name box, or the number boxes as one. */
export type Placed = Readonly<{ page: number; rect: PaperRect }>
/** Ids made by the caller, so that an edit gives the same value every time. */
export type Fresh = Readonly<{ question: string; space: string; point: string }>

const gap = 6
const margin = 48

/** The number boxes seen as the one box they are drawn as; null when there are none. */
export function numberBox(boxes: readonly PaperBox[]): (Placed & { digits: number }) | null {
  const own = boxes.filter((box) => box.kind === 'number')
  if (own.length === 0) return null
  const x = Math.min(...own.map(({ rect }) => rect.x))
  const y = Math.min(...own.map(({ rect }) => rect.y))
  const right = Math.max(...own.map(({ rect }) => rect.x + rect.w))
  const bottom = Math.max(...own.map(({ rect }) => rect.y + rect.h))
  return { page: own[0]!.page, rect: { x, y, w: right - x, h: bottom - y }, digits: own.length }
}

export function nameBox(boxes: readonly PaperBox[]): Placed | null {
  return boxes.find((box) => box.kind === 'name') ?? null
}

const without = (boxes: readonly PaperBox[], kind: PaperBox['kind']) => boxes.filter((box) => box.kind !== kind)

export function withNameBox(setting: Setting, placed: Placed | null): Setting {
  return { ...setting, boxes: [...(placed ? [{ kind: 'name' as const, ...placed }] : []), ...without(setting.boxes, 'name')] }
}

/** One box divided evenly into so many digits; null takes the number boxes away. */
export function withNumberBox(setting: Setting, placed: Placed | null, digits: number): Setting {
  const rest = without(setting.boxes, 'number')
  if (!placed) return { ...setting, boxes: rest }
  const { page, rect: { x, y, w, h } } = placed
  const round = (value: number) => Math.round(value * 100) / 100
  const boxes = Array.from({ length: digits }, (_, k) => ({ kind: 'number' as const, page, rect: { x: round(x + (w * k) / digits), y, w: round(w / digits), h } }))
  return { ...setting, boxes: [...rest, ...boxes] }
}

export function withQuestion(setting: Setting, id: string, change: (question: SettingQuestion) => SettingQuestion): Setting {
  return { ...setting, questions: setting.questions.map((question) => (question.id === id ? change(question) : question)) }
}

export function withSpace(setting: Setting, questionId: string, spaceId: string, placed: Placed): Setting {
  return withQuestion(setting, questionId, (question) => ({ ...question, spaces: question.spaces.map((space) => (space.id === spaceId ? { ...space, ...placed } : space)) }))
}

/** Points in place of a question's own; while it has any, the most that can be given is what those that count add up to. */
export function withPoints(setting: Setting, questionId: string, points: readonly SettingPoint[], withdrawn: readonly string[]): Setting {
  const own = new Set(points.map(({ id }) => id))
  const kept = points.map((point) => (point.dependsOn && !own.has(point.dependsOn) ? { ...point, dependsOn: null } : point))
  const total = kept.reduce((sum, { id, worth }) => (withdrawn.includes(id) ? sum : sum + worth), 0)
  return withQuestion(setting, questionId, (question) => ({ ...question, points: kept, maximum: total > 0 ? (total as HalfMarks) : question.maximum }))
}

const before = (a: SettingSpace | Placed, b: Placed) => a.page < b.page || (a.page === b.page && (a.rect.y < b.rect.y || (a.rect.y === b.rect.y && a.rect.x < b.rect.x)))

/** A new question in its place in reading order, labelled after the one before it, with one point for the right answer. */
export function addQuestion(setting: Setting, placed: Placed, ids: Fresh): Setting {
  const at = setting.questions.filter(({ spaces }) => spaces[0] && before(spaces[0], placed)).length
  const label = nextLabel(setting.questions[at - 1]?.label ?? null, setting.questions.map((question) => question.label))
  const question: SettingQuestion = {
    id: ids.question, label, maximum: halves(2), text: '', answer: '', modelSolution: '', schemeNote: '', tolerance: null,
    spaces: [{ id: ids.space, ...placed }], points: [{ id: ids.point, label: 'Correct answer', worth: halves(2), kind: null, dependsOn: null, note: '' }],
  }
  return { ...setting, questions: [...setting.questions.slice(0, at), question, ...setting.questions.slice(at)] }
}

/** Takes a space away; with its last space the question goes. */
export function dropSpace(setting: Setting, questionId: string, spaceId: string): Setting {
  const question = setting.questions.find(({ id }) => id === questionId)
  if (question && question.spaces.length > 1) return withQuestion(setting, questionId, (each) => ({ ...each, spaces: each.spaces.filter(({ id }) => id !== spaceId) }))
  return { ...setting, questions: setting.questions.filter(({ id }) => id !== questionId) }
}

/** Where a new space of the same size goes: below `after`, or at the head of the next page when it no longer fits. */
export function placeBelow(after: Placed, pages: readonly PaperPage[]): Placed {
  const page = pages.find((each) => each.page === after.page)!
  const y = after.rect.y + after.rect.h + gap
  const next = pages.find((each) => each.page === after.page + 1)
  if (y + after.rect.h <= page.height || !next) return { page: page.page, rect: onPage({ ...after.rect, y }, page) }
  return { page: next.page, rect: onPage({ ...after.rect, y: margin }, next) }
}

/** Where a new space begins when nobody drew it: below the lowest of the page, else a band near its head. */
export function placeNew(setting: Setting, page: PaperPage): Placed {
  const own = setting.questions.flatMap(({ spaces }) => spaces).filter((space) => space.page === page.page)
  const lowest = own.reduce<SettingSpace | null>((low, space) => (!low || space.rect.y + space.rect.h > low.rect.y + low.rect.h ? space : low), null)
  if (!lowest) return { page: page.page, rect: onPage({ x: margin, y: page.height / 5, w: page.width - 2 * margin, h: 96 }, page) }
  return { page: page.page, rect: onPage({ ...lowest.rect, y: lowest.rect.y + lowest.rect.h + gap }, page) }
}
