import type { DigitShares } from '@/lib/core/digit-reading'
import { certainName } from '@/lib/core/sorting'
import { matchApart } from './match-apart'
import { isTelling, likeliestOther, numberLikelihood, numberShare } from './number-likelihood'
import { orderShares, orderTrust, type Anchor } from './order-shares'
import { suggestNames } from './suggest-names'

/** A script in the order of the pile: its confirmed name, and what its number boxes show (null: none, or not read). */
export type ReadScript = Readonly<{ id: string; student: string | null; boxes: readonly DigitShares[] | null }>
/** A student that may have written, in the list's order. */
export type ListedNumber = Readonly<{ student: string; number: string }>
/** Whose a script may be. From `certainName` on, names may be confirmed together at a glance. */
export type NameSuggestion = Readonly<{ student: string; certainty: number; by: 'number' | 'list_order' }>

/** One script in so many is of somebody who is not on the list. */
const strangers = 0.03
/** The digits must say the number by themselves, to this share together, before a name counts as certain. */
const plainlyRead = 0.75
/** A name is put forward from this certainty on. */
const worthSaying = 0.3
/** Without a plainly read number a suggestion stays below what may be confirmed unseen. */
const atMost = 0.9

/**
 * Whose script each unnamed one may be: one decision over the whole pile, each student at most once. The digits of the number boxes
 * speak first; the order of the pile counts as far as the numbers show that it lies in order. Scripts without a readable number follow the
 * list's order between their neighbours. Certainty is what the next best naming of the whole pile would lose.
 */
export function assignNames(scripts: readonly ReadScript[], list: readonly ListedNumber[]): Map<string, NameSuggestion> {
  const taken = new Set(scripts.flatMap(({ student }) => student ?? []))
  const free = list.map(({ student }) => !taken.has(student))
  const place = new Map(list.map(({ student }, k) => [student, k]))
  const confirmed = scripts.map(({ student }): Anchor => (student === null ? null : (place.get(student) ?? null)))
  const alone = byNumber(scripts, list, free, confirmed, 0)
  const anchors = scripts.map(({ id }, k): Anchor => confirmed[k] ?? sure(alone.get(id), place))
  const trust = orderTrust(anchors)
  const numbered = byNumber(scripts, list, free, anchors, trust)
  return new Map([...numbered, ...byOrder(scripts, list, free, numbered, place, trust)])
}

function sure(said: NameSuggestion | undefined, place: ReadonlyMap<string, number>): Anchor {
  return said && said.certainty >= certainName ? place.get(said.student)! : null
}

/** The best naming of the scripts whose number says something; each may also be nobody's of the list. */
function byNumber(scripts: readonly ReadScript[], list: readonly ListedNumber[], free: readonly boolean[], anchors: readonly Anchor[], trust: number): Map<string, NameSuggestion> {
  const numbers = new Set(list.map(({ number }) => number))
  const telling = scripts.flatMap((script, at) => (script.student === null && script.boxes && isTelling(script.boxes) ? [{ ...script, boxes: script.boxes, at, other: likeliestOther(script.boxes, numbers) }] : []))
  const open = list.filter((_, k) => free[k])
  const even = 1 / Math.max(1, open.length)
  const shares = orderShares(anchors, free, trust)
  const granted = matchApart(telling.map(({ boxes, at, other }) => {
    const byOrder = shares[at]?.filter((_, k) => free[k])
    const cost = (number: string, k: number) => -numberLikelihood(boxes, number) - Math.log((1 - strangers) * Math.max(1e-6, byOrder?.[k] ?? even))
    return { options: new Map(open.map(({ number }, k) => [k, cost(number, k)])), none: -other.likelihood - Math.log(strangers / (3 * list.length)) }
  }))
  const said = new Map<string, NameSuggestion>()
  telling.forEach(({ id, boxes, other }, row) => {
    const { option, margin } = granted[row]!
    const one = option === null ? undefined : open[option]
    // A number that is plainly somebody's who is not on the list is nobody's of the list.
    if (!one || numberShare(boxes, other.number) >= plainlyRead) return
    const certainty = 1 / (1 + Math.exp(-margin))
    const plain = numberShare(boxes, one.number) >= plainlyRead
    if (certainty >= worthSaying) said.set(id, { student: one.student, certainty: plain ? certainty : Math.min(certainty, atMost), by: 'number' })
  })
  return said
}

/** Scripts whose number says nothing, by the list's order between their named neighbours, unless the numbers show that the pile is shuffled. */
function byOrder(scripts: readonly ReadScript[], list: readonly ListedNumber[], free: readonly boolean[], numbered: ReadonlyMap<string, NameSuggestion>, place: ReadonlyMap<string, number>, trust: number): Map<string, NameSuggestion> {
  const known = scripts.map(({ id, student }) => ({ id, student: student ?? numbered.get(id)?.student ?? null }))
  const anchors = known.map(({ student }): Anchor => (student === null ? null : (place.get(student) ?? null)))
  if (anchors.filter((anchor) => anchor !== null).length > 3 && trust < 0.3) return new Map()
  const held = new Set(anchors)
  const shares = orderShares(anchors, free.map((is, k) => is && !held.has(k)), trust)
  const inOrder = suggestNames(known, list.map(({ student }) => student))
  const said = new Map<string, NameSuggestion>()
  scripts.forEach(({ id, boxes }, k) => {
    // A number that is plainly there and fits nobody is no reason to look at the order.
    if (anchors[k] !== null || known[k]!.student !== null || (boxes && isTelling(boxes))) return
    const student = inOrder.get(id)
    if (student) said.set(id, { student, certainty: Math.min(atMost, shares[k]?.[place.get(student)!] ?? 0), by: 'list_order' })
  })
  return said
}
