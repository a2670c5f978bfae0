import type { HalfMarks } from '@/lib/core/marks'
import { correlation, mean } from './statistics'

export type Facility = Readonly<{ n: number; mean: number | null; facility: number | null }>

/** Mean mark divided by the maximum. `null` marks (absent, unmarked) are left out; nothing written counts 0. The mean is in halves. */
export function facilityOf(marks: readonly (HalfMarks | null)[], maximum: HalfMarks): Facility {
  const given = marks.filter((mark) => mark !== null)
  const middle = mean(given)
  return { n: given.length, mean: middle, facility: middle === null ? null : middle / maximum }
}

/**
 * How far a question separates stronger from weaker scripts: the correlation of its marks with the rest of the total. Only
 * whole scripts are to be handed in. Null when there is nothing to compare.
 */
export function discriminationOf(marks: readonly HalfMarks[], totals: readonly HalfMarks[]): number | null {
  return correlation(marks, totals.map((total, k) => total - marks[k]!))
}
