import type { HalfMarks } from './marks'
import type { Round, Stamp } from './stamp'

/** Work in hand, or finished. Only a settled marking can count. */
export type MarkingState = 'open' | 'settled'

/** One person's stamps on one response in one round. Stamps taken back are in it too, as tombstones. */
export type Marking = Readonly<{ id: string; responseId: string; round: Round; markerId: string; state: MarkingState; stamps: readonly Stamp[] }>

type Scored = Pick<Stamp, 'kind' | 'worth' | 'removed' | 'markPointId'>

/** The stamps that are still there. */
export function kept<S extends Pick<Stamp, 'removed'>>(stamps: readonly S[]): S[] {
  return stamps.filter((stamp) => !stamp.removed)
}

/** A raw mark is never stored: it is what the stamps of one marking add up to, in halves. Reading never throws; pressing does. */
export function markOf(stamps: readonly Pick<Stamp, 'worth' | 'removed'>[]): HalfMarks {
  return kept(stamps).reduce((total, stamp) => total + stamp.worth, 0) as HalfMarks
}

/** What one mark point has been given, in halves. */
export function markOnPoint(stamps: readonly Scored[], markPointId: string): HalfMarks {
  return markOf(stamps.filter((stamp) => stamp.markPointId === markPointId))
}

/** How a response stands: unmarked, a nought and nothing written are three different things. */
export type ResponseState = 'unmarked' | 'open' | 'marked' | 'nought' | 'nothing-written'

/** The state of a response by the one marking looked at; null when nobody has begun it. */
export function responseState(marking: Pick<Marking, 'state' | 'stamps'> | null): ResponseState {
  if (!marking || (marking.state === 'open' && kept(marking.stamps).length === 0)) return 'unmarked'
  if (marking.state === 'open') return 'open'
  if (kept(marking.stamps).some((stamp) => stamp.kind === 'nothing-written')) return 'nothing-written'
  return markOf(marking.stamps) === 0 ? 'nought' : 'marked'
}

/** Whether the stamps say a mark at all: a ring or a note alone does not, a cross or a nought does. */
export function saysMark(stamps: readonly Scored[]): boolean {
  return kept(stamps).some((stamp) => stamp.worth > 0 || stamp.kind === 'cross' || isNought(stamp))
}

/** A nought or "nothing written": worth 0, and alone in saying what the response is worth. */
export function isNought(stamp: Pick<Stamp, 'kind'>): boolean {
  return stamp.kind === 'nought' || stamp.kind === 'nothing-written'
}
