import type { DigitShares } from '@/lib/core/digit-reading'
import { certainName } from '@/lib/core/sorting'
import { matchApart } from './match-apart'
import { boxLikelihoods, isTelling, numberLikelihood, plainNumber, saysNumber } from './number-likelihood'
import { orderShares, orderTrust, type Anchor } from './order-shares'
import { strangerLikelihood } from './stranger-likelihood'
import { suggestNames } from './suggest-names'

/** A script in the order of the pile: its confirmed name, and what its number boxes show (null: none, or not read). */
export type ReadScript = Readonly<{ id: string; student: string | null; boxes: readonly DigitShares[] | null }>
/** A student that may have written, in the list's order. */
export type ListedNumber = Readonly<{ student: string; number: string }>
/** Whose a script may be. From `certainName` on, names may be confirmed together at a glance. */
export type NameSuggestion = Readonly<{ student: string; certainty: number; by: 'number' | 'list_order' }>

/** One script in so many is of somebody who is not on the list. */
const strangers = 0.08
/** Where the pile lies in order, the next on the list is at most so many times likelier than anybody: order never stands in for digits. */
const mostByOrder = 2
/** A name is put forward from this certainty on. */
const worthSaying = 0.3
/** Unless each box says its digit, a suggestion stays below what may be confirmed at a glance. */
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
  const telling = scripts.flatMap(({ id, student, boxes }, at) => (student === null && boxes && isTelling(boxes) ? [{ id, boxes, at }] : []))
  const numbers = new Set(list.map(({ number }) => number))
  const stranger = strangerLikelihood([...numbers])
  const open = list.flatMap(({ number }, k) => (free[k] ? [{ number, k }] : []))
  const even = 1 / Math.max(1, open.length)
  const shares = orderShares(anchors, free, trust)
  const granted = matchApart(telling.map(({ boxes, at }) => {
    const likelihoods = boxLikelihoods(boxes)
    const byOrder = (k: number) => Math.min(mostByOrder * even, Math.max(1e-6, shares[at]?.[k] ?? even))
    const options = new Map(open.map(({ number, k }) => [k, -numberLikelihood(likelihoods, number) - Math.log((1 - strangers) * byOrder(k))]))
    return { options, none: -stranger(likelihoods) - Math.log(strangers) }
  }))
  const said = new Map<string, NameSuggestion>()
  telling.forEach(({ id, boxes }, row) => {
    const { option, margin } = granted[row]!
    const plain = plainNumber(boxes)
    // A number that is plainly somebody's who is not on the list is nobody's of the list.
    if (option === null || (plain !== null && !numbers.has(plain))) return
    const { student, number } = list[option]!
    const certainty = 1 / (1 + Math.exp(-margin))
    if (certainty >= worthSaying) said.set(id, { student, certainty: saysNumber(boxes, number) ? certainty : Math.min(certainty, atMost), by: 'number' })
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
