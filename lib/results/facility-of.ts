import type { HalfMarks } from '@/lib/core/marks'
import { mean } from './mean'

export type Facility = Readonly<{ n: number; mean: number | null; facility: number | null }>

/** Mean mark divided by the maximum. `null` marks (absent, unmarked) are left out; nothing written counts 0. The mean is in halves. */
export function facilityOf(marks: readonly (HalfMarks | null)[], maximum: HalfMarks): Facility {
  const given = marks.filter((mark) => mark !== null)
  const middle = mean(given)
  return { n: given.length, mean: middle, facility: middle === null ? null : middle / maximum }
}
