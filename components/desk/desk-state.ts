import { AppError, type ErrorCode, type ErrorDetail } from '@/lib/core/errors'
import { kept, type MarkingState } from '@/lib/core/marking'
import { assertFits, assertSettles, type Scheme } from '@/lib/core/press-rules'
import type { Run, Strip } from '@/lib/core/run'
import { habitOf, type StampPlace } from '@/lib/core/stamp-place'
import type { PressedStamp, Round, Stamp, StampKind } from '@/lib/core/stamp'

/** A place on a page of a script, in paper points. */
export type Spot = Readonly<{ scriptPageId: string | null; x: number; y: number }>

/** What the server has to be told, in this order. */
export type Save = Readonly<{ kind: 'stamp'; stamp: PressedStamp } | { kind: 'settle' | 'reopen'; responseId: string; round: Round }>

/** What one key or click did to one response: each stamp as it was (null: not there) and as it became, and whether it was settled. */
export type Change = Readonly<{ responseId: string; stamps: readonly Readonly<{ before: Stamp | null; after: Stamp }>[]; from: MarkingState; to: MarkingState }>

/** What the desk has to say to the marker: a refusal by its code, or a plain word. */
export type Says = Readonly<{ code: ErrorCode | 'failed'; detail: ErrorDetail } | { words: 'opened-again' | 'run-finished' | 'nothing-to-undo' | 'nothing-to-redo' }>

export type DeskState = Readonly<{
  run: Omit<Run, 'strips'>
  strips: readonly Strip[]
  /** The strip in hand, from 0. */
  hand: number
  selected: string | null
  /** The stamp taken up from the tray with the mouse: it goes where the page is clicked. */
  pen: StampKind | null
  /** A place on the strip in hand that was pressed: the next stamp goes there. */
  pointer: Spot | null
  habits: Readonly<Record<string, StampPlace>>
  done: readonly Change[]
  undone: readonly Change[]
  says: Says | null
}>

export type Stepped = Readonly<{ state: DeskState; saves: readonly Save[] }>

/** The desk as it opens: at the first strip that is not settled, or at a response asked for. */
export function openDesk({ strips, ...run }: Run, responseId?: string | null): DeskState {
  const asked = strips.findIndex((strip) => strip.responseId === responseId)
  const open = strips.findIndex((strip) => toDo(strip))
  const state: DeskState = { run, strips, hand: Math.max(0, asked >= 0 ? asked : open), selected: null, pen: null, pointer: null, habits: {}, done: [], undone: [], says: null }
  return { ...state, habits: habitsOf(strips) }
}

/** Whether a strip is still this person's to mark. One whose page was never scanned can be marked, but is not asked for. */
export function toDo(strip: Strip): boolean {
  return strip.bar === null && strip.marking?.state !== 'settled' && (strip.pictures.length === 0 || strip.pictures.some((picture) => picture.src !== null))
}

/** The stamps that are there on a strip. */
export function stampsOf(strip: Strip | undefined): Stamp[] {
  return kept(strip?.marking?.stamps ?? [])
}

export function schemeOf({ question, step }: DeskState['run']): Scheme {
  return { maximum: question.maximum, step, points: question.points }
}

/** Where the stamps of a run went so far, by mark point or kind: the last one of each. */
function habitsOf(strips: readonly Strip[]): Record<string, StampPlace> {
  const habits: Record<string, StampPlace> = {}
  for (const strip of strips) for (const stamp of stampsOf(strip)) {
    const place = placeOf(strip, stamp)
    if (place && strip.bar === null) habits[habitOf(stamp)] = place
  }
  return habits
}

/** The answer space a spot lies on, or the nearest one of its page; null on a page without one. */
export function placeOf(strip: Strip, spot: Spot): StampPlace | null {
  const away = ({ rect }: Strip['pictures'][number]): number => Math.max(0, rect.y - spot.y, spot.y - rect.y - rect.h) + Math.max(0, rect.x - spot.x, spot.x - rect.x - rect.w)
  const [nearest] = strip.pictures.map((picture, space) => ({ picture, space })).filter(({ picture }) => picture.scriptPageId === spot.scriptPageId)
    .sort((a, b) => away(a.picture) - away(b.picture))
  return nearest ? { space: nearest.space, at: { x: spot.x, y: spot.y } } : null
}

/**
 * Changes some stamps of a strip and whether it is settled, as one step that can be undone. Held against the rules first: what does not fit changes nothing and is said. A settled
 * marking is opened again by a change, but for a second one.
 */
export function commit(state: DeskState, stamps: readonly Stamp[], to: MarkingState = 'open', responseId = state.strips[state.hand]?.responseId): Stepped {
  const strip = state.strips.find((candidate) => candidate.responseId === responseId)
  if (!strip) return { state, saves: [] }
  if (strip.bar !== null) return said(state, { code: 'begun_by_other', detail: {} })
  if (standsForGood(state, strip)) return said(state, standing)
  const before = strip.marking?.stamps ?? []
  const from = strip.marking?.state ?? 'open'
  const after = stamps.reduce<readonly Stamp[]>((list, stamp) => [...list.filter((other) => other.id !== stamp.id), stamp], before)
  try {
    stamps.forEach((stamp) => assertFits(after, stamp, schemeOf(state.run)))
    if (to === 'settled') assertSettles(after, schemeOf(state.run))
  } catch (error) {
    if (!(error instanceof AppError)) throw error
    return said(state, { code: error.code, detail: error.detail })
  }
  const change: Change = { responseId: strip.responseId, from, to, stamps: stamps.map((stamp) => ({ before: before.find((other) => other.id === stamp.id) ?? null, after: stamp })) }
  const says: Says | null = from === 'settled' && to === 'open' ? { words: 'opened-again' } : null
  return { state: { ...state, strips: withMarking(state.strips, strip, after, to), habits: learned(state, strip, stamps), done: [...state.done, change], undone: [], says, pointer: null }, saves: savesOf(state.run.round, change) }
}

const standing: Says = { code: 'marking_settled', detail: { round: 'second' } }

/** A second marking may have been compared with the first once it is settled, so no key changes it any more. */
function standsForGood({ run }: DeskState, strip: Strip): boolean {
  return run.round === 'second' && strip.marking?.state === 'settled'
}

export function said(state: DeskState, says: Says): Stepped {
  return { state: { ...state, says }, saves: [] }
}

function withMarking(strips: readonly Strip[], strip: Strip, stamps: readonly Stamp[], state: MarkingState): readonly Strip[] {
  const marking = { id: strip.marking?.id ?? '', state, stamps }
  return strips.map((other) => (other === strip ? { ...strip, marking } : other))
}

function learned({ habits }: DeskState, strip: Strip, stamps: readonly Stamp[]): DeskState['habits'] {
  const places = stamps.filter((stamp) => !stamp.removed).flatMap((stamp) => {
    const place = placeOf(strip, stamp)
    return place ? [[habitOf(stamp), place] as const] : []
  })
  return places.length === 0 ? habits : { ...habits, ...Object.fromEntries(places) }
}

/** Opened before it is changed; what goes before what comes, so that the server never sees too much; settled last. */
function savesOf(round: Round, { responseId, stamps, from, to }: Change): Save[] {
  const pressed = (stamp: Stamp): Save => {
    const sent: PressedStamp & { markingId?: string } = { ...stamp, responseId, round }
    delete sent.markingId
    return { kind: 'stamp', stamp: sent }
  }
  const less = ({ before, after }: Change['stamps'][number]): number => (after.removed ? 0 : after.worth) - (before && !before.removed ? before.worth : 0)
  const sorted = [...stamps].sort((a, b) => less(a) - less(b) || Number(b.after.removed) - Number(a.after.removed))
  return [
    ...(from === 'settled' && (to === 'open' || stamps.length > 0) ? [{ kind: 'reopen', responseId, round } as const] : []),
    ...sorted.map(({ after }) => pressed(after)),
    ...(to === 'settled' && (from === 'open' || stamps.length > 0) ? [{ kind: 'settle', responseId, round } as const] : []),
  ]
}

/** Takes the last step back, or does it again: the stamps get new versions, so that it holds whatever order things arrive in. */
export function turnBack(state: DeskState, way: 'undo' | 'redo'): Stepped {
  const [from, to] = way === 'undo' ? [state.done, state.undone] : [state.undone, state.done]
  const change = from.at(-1)
  const strip = state.strips.find((candidate) => candidate.responseId === change?.responseId)
  if (!change || !strip) return said(state, { words: way === 'undo' ? 'nothing-to-undo' : 'nothing-to-redo' })
  if (standsForGood(state, strip)) return said({ ...state, hand: state.strips.indexOf(strip), selected: null, pointer: null }, standing)
  const now = strip.marking?.stamps ?? []
  const stamps = change.stamps.map(({ before, after }) => {
    const current = now.find((stamp) => stamp.id === after.id) ?? after
    const goal = way === 'undo' ? (before ?? { ...after, removed: true }) : after
    return { before: current, after: { ...goal, version: current.version + 1 } }
  })
  const turned: Change = { responseId: change.responseId, stamps, from: strip.marking?.state ?? 'open', to: way === 'undo' ? change.from : change.to }
  const after = stamps.reduce<readonly Stamp[]>((list, { after: stamp }) => [...list.filter((other) => other.id !== stamp.id), stamp], now)
  const rest = from.slice(0, -1)
  return {
    state: {
      ...state, strips: withMarking(state.strips, strip, after, turned.to), hand: state.strips.indexOf(strip), selected: null, pointer: null, says: null,
      done: way === 'undo' ? rest : [...to, change], undone: way === 'undo' ? [...to, change] : rest,
    },
    saves: savesOf(state.run.round, turned),
  }
}
