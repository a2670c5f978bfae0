import { sayMark, type HalfMarks } from './marks'
import type { Stamp, StampKind } from './stamp'

/** What the text codes stand for. A code that is not here is said as it is written. */
const meaning: Readonly<Partial<Record<string, string>>> = {
  ft: 'follow through',
  ecf: 'error carried forward',
  isw: 'ignore subsequent working',
  bod: 'benefit of the doubt',
  oe: 'or equivalent',
  sc: 'special case',
}

const plainName: Readonly<Record<StampKind, string>> = {
  tick: 'Tick',
  half: 'Half tick',
  cross: 'Cross',
  ring: 'Ring',
  underline: 'Underline',
  wavy: 'Wavy line',
  caret: 'Caret',
  seen: 'Seen',
  code: 'Code',
  note: 'Note',
  pen: 'Pen line',
  mark: 'Mark',
  nought: 'Nought',
  'nothing-written': 'Nothing written',
}

/** A stamp in words, as its text equivalent says it: "Tick, one mark", "Note: check the last step". */
export function sayStamp(stamp: Pick<Stamp, 'kind' | 'worth' | 'text'>): string {
  const name = plainName[stamp.kind]
  if (stamp.kind === 'mark') return `Mark ${sayMark(stamp.worth)}`
  const says = stamp.kind === 'code' ? sayCode(stamp.text) : stamp.text.trim() === '' ? name : `${name}: ${stamp.text.trim()}`
  const scores = stamp.worth > 0 || stamp.kind === 'tick' || stamp.kind === 'half' || stamp.kind === 'cross'
  return scores ? `${says}, ${sayWorth(stamp.worth)}` : says
}

/** What a text code stands for, whatever its capitals; null for a code of the school's own. */
export function meaningOfCode(code: string): string | null {
  return meaning[code.trim().toLowerCase()] ?? null
}

function sayCode(code: string): string {
  const words = meaningOfCode(code)
  return words ? `Code ${code}, ${words}` : `Code ${code}`
}

/** A worth in words: "no mark", "half a mark", "one mark", "1½ marks". */
export function sayWorth(worth: HalfMarks): string {
  if (worth === 0) return 'no mark'
  if (worth === 1) return 'half a mark'
  return worth === 2 ? 'one mark' : `${sayMark(worth)} marks`
}
