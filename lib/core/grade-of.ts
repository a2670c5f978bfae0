import { halves, type HalfMarks } from './marks'
import type { GradeScale, OddHalf } from './paper'

/** A total as it is compared with the boundaries: an odd half is kept, or goes up or down to the whole mark. */
function comparedTotal(total: HalfMarks, oddHalf: OddHalf): HalfMarks {
  if (oddHalf === 'kept' || total % 2 === 0) return total
  return halves(oddHalf === 'up' ? total + 1 : total - 1)
}

/** The grade of a total: the highest one whose boundary it reaches. Null below every boundary, or without a scale. */
export function gradeOf(scale: GradeScale, total: HalfMarks): string | null {
  const compared = comparedTotal(total, scale.oddHalf)
  const reached = scale.boundaries.filter(({ lowest }) => lowest <= compared)
  return reached.reduce<(typeof reached)[number] | null>((best, next) => (best === null || next.lowest > best.lowest ? next : best), null)?.grade ?? null
}
