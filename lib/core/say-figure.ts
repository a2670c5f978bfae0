import type { Coefficient, Figure, Interval, Limits, WhyNone } from './moderation-figures'
import { sayMean } from './say-difference'

/** Why there is no figure, short enough for a cell. */
export const sayWhy: Readonly<Record<WhyNone, string>> = { no_pairs: '–', too_few: 'too few', no_spread: 'all alike', unlike_maxima: 'unlike' }

/** The same in a sentence, for below the table. */
export const sayWhyLong: Readonly<Record<WhyNone, string>> = {
  no_pairs: 'nothing has been second-marked yet',
  too_few: 'too few pairs for this figure (a standard deviation wants two, the others three)',
  no_spread: 'every mark was the same, so chance alone would agree',
  unlike_maxima: 'questions with different maxima are not put into one coefficient',
}

/** A coefficient from a number: "0.86", "−0.12". */
function sayShare(value: number): string {
  const text = value.toFixed(2)
  return Number(text) === 0 ? '0.00' : text.replace('-', '−')
}

/** A spread in halves as marks, without a sign. */
export function saySpread(figure: Figure): string {
  return figure.value === null ? sayWhy[figure.why] : (figure.value / 2).toFixed(2)
}

export function sayCoefficient({ figure }: Coefficient): string {
  return figure.value === null ? sayWhy[figure.why] : sayShare(figure.value)
}

export function sayInterval({ interval }: Coefficient): string {
  return interval === null ? '' : `${sayShare(interval[0])} to ${sayShare(interval[1])}`
}

/** An interval of differences in halves, as marks with their signs. */
export function sayMarksInterval(interval: Interval | null): string {
  return interval === null ? '' : `${sayMean(interval[0])} to ${sayMean(interval[1])}`
}

export function sayLimits(limits: Limits): string {
  return limits.why === null ? `${sayMean(limits.low)} to ${sayMean(limits.high)}` : sayWhy[limits.why]
}
