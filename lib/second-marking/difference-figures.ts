import type { Figure, Interval, Limits } from '@/lib/core/moderation-figures'
import { tQuantile } from './quantile'

export type DifferenceFigures = Readonly<{ mean: Figure; meanInterval: Interval | null; sd: Figure; limits: Limits }>

/** How many standard deviations the limits lie from the mean: 19 of 20 differences of a normal distribution. */
const usual = 1.96

const around = (middle: number, half: number): Interval => [middle - half, middle + half]

/**
 * Mean and standard deviation (n - 1) of differences, with the limits of agreement, mean ± `times` SD, and 95 % intervals by
 * Student's t: standard error SD/√n of the mean and √3 SD/√n of a limit (Bland and Altman 1986; check-values: bland-altman-1986).
 * Differences are whole numbers, halves as a rule, so that the sums are exact and their order changes nothing.
 * A standard deviation wants two differences, limits three.
 */
export function differenceFigures(differences: readonly number[], times = usual): DifferenceFigures {
  const n = differences.length
  if (n === 0) return { mean: { value: null, why: 'no_pairs' }, meanInterval: null, sd: { value: null, why: 'no_pairs' }, limits: { why: 'no_pairs' } }
  const sum = differences.reduce((a, b) => a + b, 0)
  const mean = sum / n
  if (n === 1) return { mean: { value: mean, why: null }, meanInterval: null, sd: { value: null, why: 'too_few' }, limits: { why: 'too_few' } }
  const squares = differences.reduce((total, difference) => total + difference * difference, 0)
  const sd = Math.sqrt((n * squares - sum * sum) / (n * (n - 1)))
  const [reach, half] = [times * sd, (tQuantile(0.975, n - 1) * sd) / Math.sqrt(n)]
  const [low, high] = [mean - reach, mean + reach]
  const limits: Limits = n < 3 ? { why: 'too_few' } : { low, high, lowInterval: around(low, Math.sqrt(3) * half), highInterval: around(high, Math.sqrt(3) * half), why: null }
  return { mean: { value: mean, why: null }, meanInterval: around(mean, half), sd: { value: sd, why: null }, limits }
}
