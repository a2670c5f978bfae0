import type { MarkerPattern, WhyNoAdjustment } from './adjusting'
import { sayMark, type HalfMarks } from './marks'
import { sayMean } from './say-difference'

/** A shift in halves as an act: "raise by ½ mark", "lower by 1 mark". */
export function sayShift(shift: number): string {
  return `${shift > 0 ? 'raise' : 'lower'} by ${sayMarks(shift)}`
}

/** The same done: "raised by ½ mark". */
export function sayShifted(shift: number): string {
  return `${shift > 0 ? 'raised' : 'lowered'} by ${sayMarks(shift)}`
}

function sayMarks(shift: number): string {
  return `${sayMark(Math.abs(shift) as HalfMarks)} ${Math.abs(shift) <= 2 ? 'mark' : 'marks'}`
}

/** Why nothing is offered, with what would mend it. */
export const sayNoAdjustment: Readonly<Record<WhyNoAdjustment, string>> = {
  unread: 'not everything sampled has been second-marked yet',
  all_inside: 'everything lies inside the tolerance, so the first marks stand',
  too_few: 'fewer than seven answers: too few to judge the marker',
  not_one_sided: 'the differences have no clear lean, so no shift mends them: decide on single answers, or have the question marked again by someone else',
  not_steady: 'the differences lean one way but are scattered, so no shift mends them: have the question marked again by someone else',
  too_small: 'the lean is smaller than half a marking step',
}

/** "n = 9, mean +1.06", what a pattern rests on. */
export function sayRests({ n, mean, few }: Pick<MarkerPattern, 'n' | 'mean' | 'few'>): string {
  return `n = ${n}, mean ${sayMean(mean)}${few ? ', few scripts' : ''}`
}
