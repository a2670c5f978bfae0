import type { HalfMarks } from '@/lib/core/marks'
import type { Coefficient, Figure, Intraclass, MarkFigures } from '@/lib/core/moderation-figures'
import { agreementOf } from './agreement'
import { differenceFigures } from './difference-figures'
import { intraclassOf } from './intraclass'
import { apartBy, kappaOf, type Apart } from './kappa-of'

/** Both marks of one answer or script, in halves, with the tolerance they are held to; null when none is set. */
export type Compared = Readonly<{ first: HalfMarks; second: HalfMarks; tolerance: HalfMarks | null }>

function kappaBy(apart: Apart, pairs: readonly Compared[]): Coefficient {
  const { kappa, standardError } = kappaOf(pairs.map(({ first, second }) => [first, second] as const), apart)
  const reach = 1.96 * (standardError ?? 0)
  return { figure: kappa, interval: kappa.value === null || reach === 0 ? null : [kappa.value - reach, Math.min(1, kappa.value + reach)] }
}

function noCoefficients(n: number): Pick<MarkFigures, 'kappaLinear' | 'kappaQuadratic' | 'icc'> {
  const figure: Figure = { value: null, why: n === 0 ? 'no_pairs' : 'unlike_maxima' }
  const none: Coefficient = { figure, interval: null }
  const both = { one: none, mean: none }
  return { kappaLinear: none, kappaQuadratic: none, icc: { oneWay: both, agreement: both, consistency: both } satisfies Intraclass }
}

/**
 * Every figure of the pairs of one kind: blind and seen second marks are never handed in together. `oneScale`: all were marked out of the same
 * maximum; otherwise the spread of the maxima alone would make the coefficients large, and there are none.
 */
export function markFigures(pairs: readonly Compared[], oneScale: boolean): MarkFigures {
  const { within, ...agreement } = agreementOf(pairs.map(({ first, second, tolerance }) => ({ first, second, tolerance: tolerance ?? (0 as HalfMarks) })))
  const { meanInterval, sd, limits } = differenceFigures(pairs.map(({ first, second }) => first - second))
  return {
    ...agreement, meanInterval, sd, limits,
    within: pairs.some(({ tolerance }) => tolerance === null) ? null : within,
    largest: pairs.length === 0 ? null : Math.max(...pairs.map(({ first, second }) => Math.abs(first - second))),
    ...(oneScale ? { kappaLinear: kappaBy(apartBy.linear, pairs), kappaQuadratic: kappaBy(apartBy.quadratic, pairs), icc: intraclassOf(pairs.map(({ first, second }) => [first, second])) } : noCoefficients(pairs.length)),
  }
}
