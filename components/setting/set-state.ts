import type { ErrorCode, ErrorDetail } from '@/lib/core/errors'
import { halves } from '@/lib/core/marks'
import type { PaperRect } from '@/lib/core/paper-space'
import { answersCutAgain, type Setting, type SettingPoint, type SettingQuestion } from '@/lib/core/setting'
import type { SettingView } from '@/lib/core/setting-view'
import {
  addQuestion, dropSpace, nameBox, numberBox, placeBelow, withNameBox, withNumberBox, withPoints, withQuestion, withSpace, type Fresh, type Placed,
} from './setting-edits'
import { onPage, resized } from './snap'

/** The box in hand. */
export type Hand = Readonly<{ kind: 'space'; questionId: string; spaceId: string } | { kind: 'name' } | { kind: 'number' }>
/** What the next drag on the page draws; null draws a new question's space. `more` is a further space of the question in hand. */
export type Tool = 'space' | 'more' | 'name' | 'number'
export type Trouble = Readonly<{ code: ErrorCode | 'failed'; detail: ErrorDetail; offline: boolean }>

export type SetState = Readonly<{
  /** As the server last said; its setting is what is saved. */
  view: SettingView
  /** As it stands here. */
  setting: Setting
  past: readonly Setting[]
  future: readonly Setting[]
  /** Changes with the same key, one after the other, are one undo. */
  lastKey: string | null
  hand: Hand | null
  page: number
  tool: Tool | null
  /** How many answers the last save cut out of the scans anew. */
  cutAgain: number
  trouble: Trouble | null
}>

export type SetEvent =
  | { type: 'opened'; view: SettingView }
  | { type: 'overwriting'; version: number }
  | { type: 'took'; hand: Hand | null }
  | { type: 'turned'; page: number }
  | { type: 'chose'; tool: Tool | null }
  | { type: 'drew'; placed: Placed; ids: Fresh }
  | { type: 'placed'; rect: PaperRect }
  | { type: 'nudged'; dx: number; dy: number; size: boolean }
  | { type: 'wrote'; patch: Partial<Omit<SettingQuestion, 'id' | 'points' | 'spaces'>> }
  | { type: 'pointed'; points: readonly SettingPoint[]; key: string | null }
  | { type: 'halved'; ids: readonly [string, string] }
  | { type: 'ruled'; patch: Partial<Pick<Setting, 'step' | 'tolerance'>> }
  | { type: 'divided'; digits: number }
  | { type: 'copied'; ids: Fresh }
  | { type: 'dropped' }
  | { type: 'undid' }
  | { type: 'redid' }
  | { type: 'saved'; version: number; setting: Setting }
  | { type: 'refused'; trouble: Trouble }

const mostUndo = 200

export function openSet(view: SettingView): SetState {
  return { view, setting: view.setting, past: [], future: [], lastKey: null, hand: null, page: view.pages[0]?.page ?? 1, tool: null, cutAgain: 0, trouble: null }
}

/** The box a hand holds, or null when it is no longer there. */
export function placedIn(setting: Setting, hand: Hand | null): Placed | null {
  if (!hand) return null
  if (hand.kind === 'name') return nameBox(setting.boxes)
  if (hand.kind === 'number') return numberBox(setting.boxes)
  return setting.questions.find(({ id }) => id === hand.questionId)?.spaces.find(({ id }) => id === hand.spaceId) ?? null
}

export function questionInHand({ setting, hand }: Pick<SetState, 'setting' | 'hand'>): SettingQuestion | null {
  return hand?.kind === 'space' ? (setting.questions.find(({ id }) => id === hand.questionId) ?? null) : null
}

function changed(state: SetState, setting: Setting, more: Partial<SetState> = {}, key: string | null = null): SetState {
  if (setting === state.setting) return { ...state, ...more }
  const again = key !== null && key === state.lastKey
  const past = again ? state.past : [...state.past, state.setting].slice(-mostUndo)
  const trouble = state.trouble?.code === 'out_of_date' ? state.trouble : null
  return { ...state, setting, past, future: [], lastKey: key, trouble, ...more }
}

function stepped(state: SetState, setting: Setting, past: readonly Setting[], future: readonly Setting[]): SetState {
  const hand = placedIn(setting, state.hand) ? state.hand : null
  return { ...state, setting, past, future, lastKey: null, hand, page: placedIn(setting, hand)?.page ?? state.page, trouble: state.trouble?.code === 'out_of_date' ? state.trouble : null }
}

const spaceHand = ({ question, space }: Pick<Fresh, 'question' | 'space'>): Hand => ({ kind: 'space', questionId: question, spaceId: space })

function drew(state: SetState, placed: Placed, ids: Fresh): SetState {
  const { setting } = state
  const question = questionInHand(state)
  const done = { tool: null, page: placed.page }
  if (state.tool === 'name') return changed(state, withNameBox(setting, placed), { ...done, hand: { kind: 'name' } })
  if (state.tool === 'number') return changed(state, withNumberBox(setting, placed, numberBox(setting.boxes)?.digits ?? 4), { ...done, hand: { kind: 'number' } })
  if (state.tool === 'more' && question) {
    const next = withQuestion(setting, question.id, (each) => ({ ...each, spaces: [...each.spaces, { id: ids.space, ...placed }] }))
    return changed(state, next, { ...done, hand: spaceHand({ question: question.id, space: ids.space }) })
  }
  return changed(state, addQuestion(setting, placed, ids), { ...done, hand: spaceHand(ids) })
}

function putRect(state: SetState, rect: PaperRect, key: string | null): SetState {
  const at = placedIn(state.setting, state.hand)
  const page = state.view.pages.find((each) => each.page === at?.page)
  if (!state.hand || !at || !page) return state
  const placed = { page: at.page, rect: onPage(rect, page) }
  if (JSON.stringify(placed.rect) === JSON.stringify(at.rect)) return state
  const { hand, setting } = state
  if (hand.kind === 'name') return changed(state, withNameBox(setting, placed), {}, key)
  if (hand.kind === 'number') return changed(state, withNumberBox(setting, placed, numberBox(setting.boxes)!.digits), {}, key)
  return changed(state, withSpace(setting, hand.questionId, hand.spaceId, placed), {}, key)
}

function nudged(state: SetState, dx: number, dy: number, size: boolean): SetState {
  const at = placedIn(state.setting, state.hand)
  if (!at) return state
  const rect = size ? resized(at.rect, { x: 1, y: 1 }, dx, dy) : { ...at.rect, x: at.rect.x + dx, y: at.rect.y + dy }
  return putRect(state, rect, `nudged ${JSON.stringify(state.hand)} ${size}`)
}

function dropped(state: SetState): SetState {
  const { hand, setting } = state
  if (!hand) return state
  if (hand.kind === 'name') return changed(state, withNameBox(setting, null), { hand: null })
  if (hand.kind === 'number') return changed(state, withNumberBox(setting, null, 0), { hand: null })
  return changed(state, dropSpace(setting, hand.questionId, hand.spaceId), { hand: null })
}

/** Half a mark for the working and half for the answer; ids of the first two points stay. */
function halved(state: SetState, ids: readonly [string, string]): SetState {
  const question = questionInHand(state)
  if (!question) return state
  const point = (k: 0 | 1, label: string): SettingPoint => ({ id: question.points[k]?.id ?? ids[k], label, worth: halves(1), kind: null, dependsOn: null, note: '' })
  return changed(state, withPoints(state.setting, question.id, [point(0, 'Working'), point(1, 'Answer')], state.view.withdrawnPoints))
}

function copied(state: SetState, ids: Fresh): SetState {
  const at = placedIn(state.setting, state.hand)
  if (!at || state.hand?.kind !== 'space') return state
  const placed = placeBelow(at, state.view.pages)
  return changed(state, addQuestion(state.setting, placed, ids), { hand: spaceHand(ids), page: placed.page })
}

/** What each event makes of the Set screen. Plain values in and out: the canvas and the fields only report. */
export function setPaper(state: SetState, event: SetEvent): SetState {
  const question = questionInHand(state)
  switch (event.type) {
    case 'opened':
      return { ...stepped(state, event.view.setting, [], []), view: event.view, trouble: null }
    case 'overwriting':
      return { ...state, view: { ...state.view, version: event.version }, trouble: null }
    case 'took':
      return { ...state, hand: event.hand, lastKey: null, page: placedIn(state.setting, event.hand)?.page ?? state.page, tool: event.hand ? null : state.tool }
    case 'turned':
      return { ...state, page: event.page, hand: placedIn(state.setting, state.hand)?.page === event.page || state.tool === 'more' ? state.hand : null }
    case 'chose':
      return { ...state, tool: event.tool === state.tool ? null : event.tool }
    case 'drew':
      return drew(state, event.placed, event.ids)
    case 'placed':
      return putRect(state, event.rect, null)
    case 'nudged':
      return nudged(state, event.dx, event.dy, event.size)
    case 'wrote':
      return question ? changed(state, withQuestion(state.setting, question.id, (each) => ({ ...each, ...event.patch })), {}, `wrote ${question.id} ${Object.keys(event.patch).join()}`) : state
    case 'pointed':
      return question ? changed(state, withPoints(state.setting, question.id, event.points, state.view.withdrawnPoints), {}, event.key) : state
    case 'halved':
      return halved(state, event.ids)
    case 'ruled':
      return changed(state, { ...state.setting, ...event.patch })
    case 'divided':
      return changed(state, withNumberBox(state.setting, numberBox(state.setting.boxes), event.digits))
    case 'copied':
      return copied(state, event.ids)
    case 'dropped':
      return dropped(state)
    case 'undid':
      return state.past.length === 0 ? state : stepped(state, state.past.at(-1)!, state.past.slice(0, -1), [state.setting, ...state.future])
    case 'redid':
      return state.future.length === 0 ? state : stepped(state, state.future[0]!, [...state.past, state.setting], state.future.slice(1))
    case 'saved':
      return { ...state, view: { ...state.view, version: event.version, setting: event.setting }, cutAgain: answersCutAgain(state.view.setting, event.setting, state.view.scanned), trouble: null }
    case 'refused':
      return { ...state, trouble: event.trouble }
  }
}
