import { z } from 'zod'
import type { HalfMarks } from './marks'

/** What a marker can put on a script. `nought` and `nothing-written` are stamps worth 0: unmarked is neither. */
export const stampKinds = ['tick', 'half', 'cross', 'ring', 'underline', 'wavy', 'caret', 'seen', 'code', 'note', 'pen', 'mark', 'nought', 'nothing-written'] as const
export type StampKind = (typeof stampKinds)[number]

/**
 * One stamp of one marking. Place and size are paper points on the page of `scriptPageId`. `x`, `y` is the stamp's anchor:
 * the corner of a tick, the middle of a cross, the tip of a caret, the top left of a ring's box, the left end of a line, the left
 * end of the first baseline of a note, a code or "seen", the middle of a typed mark, a nought or "nr". `w`, `h` only matter to rings and lines. `worth` is in half marks and stays what it was when pressed.
 */
export const Stamp = z.object({
  id: z.uuid(),
  markingId: z.string().min(1),
  version: z.int().min(1),
  kind: z.enum(stampKinds),
  worth: z.int().min(0).max(400).transform((value) => value as HalfMarks),
  markPointId: z.string().nullable(),
  scriptPageId: z.string().nullable(),
  x: z.number().min(-2000).max(4000),
  y: z.number().min(-2000).max(4000),
  w: z.number().min(0).max(3000).default(0),
  h: z.number().min(0).max(3000).default(0),
  text: z.string().max(600).default(''),
  /** A pen line: x, y, x, y ... in paper points. */
  path: z.array(z.number()).max(4000).default([]),
  /** Taken back: kept as a tombstone so that a late repeat cannot bring it back. */
  removed: z.boolean().default(false),
})
export type Stamp = z.infer<typeof Stamp>

/** Rounds in the order of work; `blind` markings never see another round's stamps. */
export const rounds = ['standardising', 'first', 're-mark', 'second', 'third', 'agreed', 'review'] as const
export type Round = (typeof rounds)[number]

/** The three pens of the design: which one a round writes with. */
export type Pen = 'first' | 'second' | 'agreed'
export function penOf(round: Round): Pen {
  if (round === 'second' || round === 'third' || round === 'review') return 'second'
  return round === 'agreed' ? 'agreed' : 'first'
}

/** A stamp as it comes from the desk: it names its response and round, and the server finds or begins the marking. */
export const PressedStamp = Stamp.omit({ markingId: true }).extend({ responseId: z.string().min(1), round: z.enum(rounds) })
export type PressedStamp = z.infer<typeof PressedStamp>
