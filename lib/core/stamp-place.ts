import type { PaperPoint, PaperRect } from './paper-space'
import type { Stamp } from './stamp'

/** A place on one of a response's answer spaces: `space` counts from 0, the point is in paper points. */
export type StampPlace = Readonly<{ space: number; at: PaperPoint }>

/** What a marker's habit is kept by: the mark point, or the kind of a stamp that has none. */
export function habitOf(stamp: Pick<Stamp, 'kind' | 'markPointId'>): string {
  return stamp.markPointId ?? stamp.kind
}

/** Two stamps nearer than this, in points, would lie on each other. */
const crowded = 10
const sideways = 26

/** The question is printed at the top of a space: about this much of it, in points. */
const printed = (rect: PaperRect): number => Math.min(20, rect.h * 0.22)

/**
 * Where a stamp goes that nobody pointed a place for: where the last one like it went, else down the right half of the first space in the scheme's order (`rank` of `of`).
 * Moves on along the line while another stamp lies there.
 */
export function placeByHabit(habit: StampPlace | undefined, spaces: readonly PaperRect[], taken: readonly StampPlace[], rank: number, of: number): StampPlace {
  const space = habit && spaces[habit.space] ? habit.space : 0
  const rect = spaces[space]
  if (!rect) return { space: 0, at: habit?.at ?? { x: 0, y: 0 } }
  const wanted = habit && spaces[habit.space] ? habit.at : { x: rect.x + rect.w * 0.62, y: rect.y + printed(rect) + ((rect.h - printed(rect)) * (rank + 1)) / (of + 1) }
  for (let k = 0; k < 12; k++) {
    const at = within(rect, { x: wanted.x + k * sideways, y: wanted.y })
    if (!taken.some((other) => other.space === space && Math.hypot(other.at.x - at.x, other.at.y - at.y) < crowded)) return { space, at }
  }
  return { space, at: within(rect, { x: wanted.x, y: wanted.y + sideways }) }
}

/** Keeps a place inside a box, wrapping to the left of where it began when it runs out on the right. */
function within(rect: PaperRect, at: PaperPoint): PaperPoint {
  const over = at.x > rect.x + rect.w - 8
  const x = over ? rect.x + 20 + ((at.x - rect.x) % Math.max(1, rect.w - 40)) : at.x
  return { x: Math.max(rect.x + 4, x), y: Math.min(Math.max(at.y, rect.y + 10), rect.y + rect.h - 4) }
}
