import type { ErrorCode, ErrorDetail } from '@/lib/core/errors'
import { isNought, markOnPoint } from '@/lib/core/marking'
import { halves, type HalfMarks } from '@/lib/core/marks'
import type { MarkPoint } from '@/lib/core/paper'
import type { Strip } from '@/lib/core/run'
import { placeByHabit, habitOf } from '@/lib/core/stamp-place'
import type { Stamp, StampKind } from '@/lib/core/stamp'
import { commit, placeOf, said, stampsOf, toDo, turnBack, type DeskState, type Spot, type Stepped } from './desk-state'

/** What a marker can do at the desk, by key, mouse or pen. */
export type DeskEvent =
  | Readonly<{ type: 'point'; pointId: string; part: boolean }>
  | Readonly<{ type: 'stamp'; kind: StampKind; at?: Spot; size?: Readonly<{ w: number; h: number }>; text?: string }>
  | Readonly<{ type: 'alone'; kind: 'nought' | 'nothing-written' }>
  | Readonly<{ type: 'settle' }>
  | Readonly<{ type: 'go'; to: 'up' | 'down' | number }>
  | Readonly<{ type: 'select'; id: string | null }>
  | Readonly<{ type: 'nudge'; dx: number; dy: number }>
  | Readonly<{ type: 'put'; id: string; at: Spot }>
  | Readonly<{ type: 'reword'; id: string; text: string }>
  | Readonly<{ type: 'take-back'; id?: string }>
  | Readonly<{ type: 'undo' | 'redo' | 'hush' }>
  | Readonly<{ type: 'take-up'; pen: StampKind | null }>
  | Readonly<{ type: 'pointed'; at: Spot | null }>
  | Readonly<{ type: 'refused'; responseId: string; code: ErrorCode | 'failed'; detail: ErrorDetail; strip: Strip | null }>

/** One event: the desk after it, and what the server is to be told. `newId` makes the ids of new stamps. */
export function stepDesk(state: DeskState, event: DeskEvent, newId: () => string): Stepped {
  const strip = state.strips[state.hand]
  if (event.type === 'refused') return refused(state, event)
  if (!strip) return { state, saves: [] }
  switch (event.type) {
    case 'point': return pressPoint(state, strip, event, newId)
    case 'stamp': return pressFree(state, strip, event, newId)
    case 'alone': return standAlone(state, strip, event.kind, newId)
    case 'settle': return settle(state, strip)
    case 'go': return go(state, event.to === 'up' ? state.hand - 1 : event.to === 'down' ? state.hand + 1 : event.to)
    case 'select': return { state: { ...state, selected: event.id }, saves: [] }
    case 'nudge': return changed(state, strip, state.selected, (stamp) => ({ x: stamp.x + event.dx, y: stamp.y + event.dy }))
    case 'put': return changed({ ...state, selected: event.id }, strip, event.id, () => ({ x: event.at.x, y: event.at.y, scriptPageId: event.at.scriptPageId }))
    case 'reword': return changed(state, strip, event.id, () => (event.text.trim() === '' ? { removed: true } : { text: event.text.trim() }))
    case 'take-back': return changed({ ...state, selected: null }, strip, event.id ?? state.selected, () => ({ removed: true }))
    case 'undo':
    case 'redo': return turnBack(state, event.type)
    case 'hush': return { state: { ...state, says: null }, saves: [] }
    case 'take-up': return { state: { ...state, pen: event.pen, selected: null }, saves: [] }
    case 'pointed': return { state: { ...state, pointer: event.at }, saves: [] }
  }
}

/** The server would not take something: its own state of the strip holds, and why is said. What was done on other strips stays. */
function refused(state: DeskState, { responseId, code, detail, strip }: Extract<DeskEvent, { type: 'refused' }>): Stepped {
  const strips = strip ? state.strips.map((other) => (other.responseId === responseId ? strip : other)) : state.strips
  const others = (changes: DeskState['done']): DeskState['done'] => changes.filter((change) => change.responseId !== responseId)
  return { state: { ...state, strips, selected: null, done: others(state.done), undone: others(state.undone), says: { code, detail } }, saves: [] }
}

function go(state: DeskState, to: number): Stepped {
  const hand = Math.min(Math.max(to, 0), state.strips.length - 1)
  return { state: { ...state, hand, selected: null, pointer: null, says: null }, saves: [] }
}

/** Settles and goes on to the next strip that is to do, after this one first; at the end says that the run is finished. */
function settle(state: DeskState, strip: Strip): Stepped {
  if (strip.bar !== null || strip.marking?.state === 'settled') return { state: onward(state), saves: [] }
  const done = commit(state, [], 'settled')
  if (done.saves.length === 0) return done
  return { state: onward(done.state), saves: done.saves }
}

function onward(state: DeskState): DeskState {
  const next = [...state.strips.keys()].map((k) => (state.hand + 1 + k) % state.strips.length).find((k) => toDo(state.strips[k]!))
  if (next === undefined) return { ...state, selected: null, says: { words: 'run-finished' } }
  return go(state, next).state
}

/** A nought or "nothing written" takes the marks away, stands alone and settles. */
function standAlone(state: DeskState, strip: Strip, kind: 'nought' | 'nothing-written', newId: () => string): Stepped {
  const away = stampsOf(strip).filter((stamp) => stamp.worth > 0 || (isNought(stamp) && stamp.kind !== kind)).map(takenBack)
  const there = stampsOf(strip).some((stamp) => stamp.kind === kind)
  if (there && away.length === 0 && strip.marking?.state === 'settled') return { state: onward(state), saves: [] }
  const last = Math.max(0, strip.pictures.length - 1)
  const rect = strip.pictures[last]?.rect ?? { x: 0, y: 0, w: 0, h: 0 }
  const habit = state.habits[kind] ?? { space: last, at: kind === 'nought' ? { x: rect.x + rect.w * 0.9, y: rect.y + rect.h * 0.7 } : { x: rect.x + rect.w * 0.5, y: rect.y + rect.h * 0.55 } }
  const spot = spotOf(strip, placeByHabit(habit, rects(strip), [], 0, 1))
  const done = commit(state, there ? away : [...away, newStamp(newId, kind, 0, spot)], 'settled')
  return done.saves.length === 0 ? done : { state: onward(done.state), saves: done.saves }
}

/** A point's key gives it, and takes it back again; with the part key it steps down by the marking step. */
function pressPoint(state: DeskState, strip: Strip, { pointId, part }: Extract<DeskEvent, { type: 'point' }>, newId: () => string): Stepped {
  const point = state.run.question.points.find((candidate) => candidate.id === pointId)
  if (!point) return { state, saves: [] }
  const there = stampsOf(strip).filter((stamp) => stamp.markPointId === pointId)
  const given = markOnPoint(there, pointId)
  const worth = part ? Math.max(0, (given || point.worth) - state.run.step) : given > 0 ? 0 : point.worth
  if (part && given === 0 && worth === 0) return said(state, { code: 'off_step', detail: {} })
  const [first, ...rest] = there
  if (worth === 0) return commit(state, there.map(takenBack))
  if (first) return commit(state, [{ ...first, worth: halves(worth), kind: tickOf(worth), version: first.version + 1 }, ...rest.map(takenBack)])
  const rank = state.run.question.points.indexOf(point)
  const spot = state.pointer ?? spotOf(strip, placeByHabit(state.habits[pointId], rects(strip), takenPlaces(strip), rank, state.run.question.points.length))
  return commit(state, [...noughts(strip), { ...newStamp(newId, tickOf(worth), worth, spot), markPointId: pointId }])
}

/** A stamp that belongs to no point: a plain tick or half tick, or a sign without a mark. */
function pressFree(state: DeskState, strip: Strip, { kind, at, size, text }: Extract<DeskEvent, { type: 'stamp' }>, newId: () => string): Stepped {
  const worth = kind === 'tick' ? 2 : kind === 'half' ? 1 : 0
  const spot = at ?? freeSpot(state, kind)
  const stamp = { ...newStamp(newId, kind, worth, spot), ...(size ?? {}), text: text?.trim() ?? '' }
  const done = commit(state, [...(worth > 0 ? noughts(strip) : []), stamp])
  return done.saves.length === 0 ? done : { ...done, state: { ...done.state, selected: stamp.id } }
}

/** Where a stamp without a point goes on the strip in hand: the place that was pressed, or where the last one of its kind went. */
export function freeSpot(state: DeskState, kind: StampKind): Spot {
  const strip = state.strips[state.hand]
  if (state.pointer || !strip) return state.pointer ?? { scriptPageId: null, x: 0, y: 0 }
  const points = state.run.question.points.length
  return spotOf(strip, placeByHabit(state.habits[habitOf({ kind, markPointId: null })], rects(strip), takenPlaces(strip), points, points + 1))
}

function changed(state: DeskState, strip: Strip, id: string | null, change: (stamp: Stamp) => Partial<Stamp>): Stepped {
  const stamp = stampsOf(strip).find((candidate) => candidate.id === id)
  return stamp ? commit(state, [{ ...stamp, ...change(stamp), version: stamp.version + 1 }]) : { state, saves: [] }
}

const tickOf = (worth: number): StampKind => (worth === 1 ? 'half' : 'tick')
const takenBack = (stamp: Stamp): Stamp => ({ ...stamp, removed: true, version: stamp.version + 1 })
const noughts = (strip: Strip): Stamp[] => stampsOf(strip).filter(isNought).map(takenBack)
const rects = (strip: Strip) => strip.pictures.map((picture) => picture.rect)
const takenPlaces = (strip: Strip) => stampsOf(strip).flatMap((stamp) => placeOf(strip, stamp) ?? [])
const spotOf = (strip: Strip, place: ReturnType<typeof placeByHabit>): Spot => ({ scriptPageId: strip.pictures[place.space]?.scriptPageId ?? null, ...place.at })

function newStamp(newId: () => string, kind: StampKind, worth: number, { scriptPageId, x, y }: Spot): Stamp {
  const round = (value: number): number => Math.round(value * 100) / 100
  return { id: newId(), markingId: '', version: 1, kind, worth: halves(worth), markPointId: null, scriptPageId, x: round(x), y: round(y), w: 0, h: 0, text: '', path: [], removed: false }
}

/** What a point has been given on a strip, in halves. */
export function givenOn(strip: Strip, point: Pick<MarkPoint, 'id'>): HalfMarks {
  return markOnPoint(stampsOf(strip), point.id)
}
