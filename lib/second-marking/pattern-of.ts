import type { Pattern } from '@/lib/core/adjusting'
import type { HalfMarks, MarkingStep } from '@/lib/core/marks'
import { withinTolerance, type MarkPair } from './agreement'
import { differenceFigures } from './difference-figures'

/** Fewer pairs than this say nothing about a marker ("n = 6: too few" is the caution of the trade; seven is the least that is heard at all). */
const least = 7
/** What "steady" and "one-sided" leave room for: one in ten. */
const strays = 0.1

type Asked = Readonly<{ pairs: readonly MarkPair[]; /** Sampled answers of this marker in this question, read or not. */ sampled: number; maximum: HalfMarks; step: MarkingStep }>

/** The mean taken back, on the step; what lies midway between two steps goes to the smaller shift. */
function onStepOf(mean: number, step: MarkingStep): number {
  const size = Math.ceil(Math.abs(mean) / step - 0.5) * step
  return size === 0 ? 0 : -Math.sign(mean) * size
}

/**
 * Whether a marker's first marks in a question call for one adjustment. It is offered only when everything sampled has been read; something lies outside the
 * tolerance (else all first marks stand); seven pairs or more are there; the pattern is one-sided: no more than one difference in ten points the other way, and the 95 % interval of the mean
 * leaves out nought; and it is steady: with the shift, kept between nought and the maximum, nine pairs in ten lie within the tolerance. The shift is the mean of
 * first minus second taken back, on the marking step. What is erratic is for a re-mark: no shift can mend it.
 */
export function patternOf({ pairs, sampled, maximum, step }: Asked): Pattern {
  const no = (why: NonNullable<Pattern['why']>): Pattern => ({ shift: null, why })
  if (pairs.length < sampled) return no('unread')
  if (pairs.every(withinTolerance)) return no('all_inside')
  if (pairs.length < least) return no('too_few')
  const differences = pairs.map(({ first, second }) => first - second)
  const { mean, meanInterval } = differenceFigures(differences)
  const side = Math.sign(mean.value!)
  const against = differences.filter((difference) => difference !== 0 && Math.sign(difference) !== side).length
  if (against > strays * pairs.length || (meanInterval![0] <= 0 && meanInterval![1] >= 0)) return no('not_one_sided')
  const shift = onStepOf(mean.value!, step)
  if (shift === 0) return no('too_small')
  const mended = pairs.filter(({ first, second, tolerance }) => withinTolerance({ first: Math.min(maximum, Math.max(0, first + shift)) as HalfMarks, second, tolerance })).length
  return mended >= (1 - strays) * pairs.length ? { shift, why: null } : no('not_steady')
}
