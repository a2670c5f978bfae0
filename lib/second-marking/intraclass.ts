import type { Coefficient, Figure, Interval, Intraclass } from '@/lib/core/moderation-figures'
import { fQuantile } from './quantile'

/** Mean squares of an analysis of variance of targets by judges. */
export type MeanSquares = Readonly<{ n: number; k: number; between: number; within: number; judges: number; residual: number }>

/** Mean squares of whole-number ratings, one row a target. Sums are exact, so neither rows nor their order change them. */
export function meanSquares(ratings: readonly (readonly number[])[]): MeanSquares {
  const [n, k] = [ratings.length, ratings[0]!.length]
  const rowSums = ratings.map((row) => row.reduce((a, b) => a + b, 0))
  const columnSums = ratings[0]!.map((_, j) => ratings.reduce((sum, row) => sum + row[j]!, 0))
  const total = rowSums.reduce((a, b) => a + b, 0)
  const squares = ratings.reduce((sum, row) => sum + row.reduce((inner, x) => inner + x * x, 0), 0)
  const ofRows = rowSums.reduce((sum, x) => sum + x * x, 0)
  const ofColumns = columnSums.reduce((sum, x) => sum + x * x, 0)
  return {
    n, k,
    between: (n * ofRows - total * total) / (n * k * (n - 1)),
    within: (k * squares - ofRows) / (k * n * (k - 1)),
    judges: (k * ofColumns - total * total) / (n * k * (k - 1)),
    residual: (n * k * squares - n * ofRows - k * ofColumns + total * total) / (n * k * (n - 1) * (k - 1)),
  }
}

function ratio(above: number, below: number): Figure {
  return below > 0 ? { value: above / below, why: null } : { value: null, why: 'no_spread' }
}

/** From the interval of one mark to that of the mean of k (Spearman-Brown). */
const ofMean = (k: number, [low, high]: Interval): Interval => [(k * low) / (1 + (k - 1) * low), (k * high) / (1 + (k - 1) * high)]

/** The interval of a one-way or consistency form: by F = between / error with n - 1 and `freedom` degrees of freedom. */
function byF(f: number, freedom: number, { n, k }: MeanSquares): Interval {
  const [low, high] = [f / fQuantile(0.975, n - 1, freedom), f * fQuantile(0.975, freedom, n - 1)]
  return [(low - 1) / (low + k - 1), (high - 1) / (high + k - 1)]
}

/** The interval of the agreement form, with Satterthwaite's degrees of freedom. */
function byAgreement(icc: number, { n, k, between, judges, residual }: MeanSquares): Interval {
  const f = judges / residual
  const mixed = n * (1 + (k - 1) * icc) - k * icc
  const freedom = ((k - 1) * (n - 1) * (k * icc * f + mixed) ** 2) / ((n - 1) * k * k * icc * icc * f * f + mixed * mixed)
  const [up, down] = [fQuantile(0.975, n - 1, freedom), fQuantile(0.975, freedom, n - 1)]
  const both = k * judges + (k * n - k - n) * residual
  return [(n * (between - up * residual)) / (up * both + n * between), (n * (down * between - residual)) / (both + n * down * between)]
}

function pair(one: Figure, mean: Figure, interval: Interval | null, k: number): Intraclass['oneWay'] {
  const fits = interval !== null && interval.every(Number.isFinite) ? interval : null
  const wide = fits && ofMean(k, fits)
  return { one: { figure: one, interval: one.value === null ? null : fits }, mean: { figure: mean, interval: mean.value !== null && wide?.every(Number.isFinite) ? wide : null } }
}

/**
 * The six intraclass correlations of whole-number ratings, one row a target and one column a judge: ICC(1,1), (2,1), (3,1) of one mark and
 * (1,k), (2,k), (3,k) of the mean of k, with 95 % intervals (Shrout and Fleiss 1979; check-values: icc-shrout-fleiss-1979). Not defined under three targets or when the marks do not vary; an interval
 * is null where no error is left to reckon it by.
 */
export function intraclassOf(ratings: readonly (readonly number[])[]): Intraclass {
  if (ratings.length < 3) {
    const none: Coefficient = { figure: { value: null, why: ratings.length === 0 ? 'no_pairs' : 'too_few' }, interval: null }
    return { oneWay: { one: none, mean: none }, agreement: { one: none, mean: none }, consistency: { one: none, mean: none } }
  }
  const squares = meanSquares(ratings)
  const { n, k, between, within, judges, residual } = squares
  const agreement = ratio(between - residual, between + (k - 1) * residual + (k * (judges - residual)) / n)
  return {
    oneWay: pair(ratio(between - within, between + (k - 1) * within), ratio(between - within, between), within > 0 ? byF(between / within, n * (k - 1), squares) : null, k),
    agreement: pair(agreement, ratio(between - residual, between + (judges - residual) / n), agreement.value !== null && residual > 0 ? byAgreement(agreement.value, squares) : null, k),
    consistency: pair(ratio(between - residual, between + (k - 1) * residual), ratio(between - residual, between), residual > 0 ? byF(between / residual, (n - 1) * (k - 1), squares) : null, k),
  }
}
