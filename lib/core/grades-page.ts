import type { HalfMarks } from './marks'
import type { GradeScale } from './paper'

/** What the grade scale is set with: the paper's maximum and the final totals of its whole scripts, over all class sets. */
export type GradesPage = Readonly<{ paperId: string; maximum: HalfMarks; scale: GradeScale; totals: readonly HalfMarks[]; notWhole: number }>
