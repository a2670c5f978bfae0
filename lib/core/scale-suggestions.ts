import { halves, type HalfMarks } from './marks'
import type { GradeScale } from './paper'

/** A grade scale to start from; the school decides and may change every line. */
export type ScaleSuggestion = Readonly<{ name: string; says: string; scale: (maximum: HalfMarks) => GradeScale }>

// In whole marks, but never above what the paper can give, so that full marks always reach the top.
function share(maximum: HalfMarks, tenths: number): HalfMarks {
  return halves(Math.min(maximum, Math.ceil((maximum * tenths) / 20) * 2))
}

/**
 * Eight points by equal tenths of the maximum: all of it gives 8, nine tenths 7, eight tenths 6 and so on down; below that 1.
 * An odd half goes up first. Common practice, no source.
 */
export function eightPointScale(maximum: HalfMarks): GradeScale {
  const steps = [8, 7, 6, 5, 4, 3, 2].map((grade) => ({ grade: String(grade), lowest: share(maximum, grade + 2) }))
  return { oddHalf: 'up', boundaries: [...steps, { grade: '1', lowest: halves(0) }] }
}

/** Letters A to E at 80, 70, 60, 50 and 40 percent, U below. An example, no source. */
export function letterScale(maximum: HalfMarks): GradeScale {
  const steps = ['A', 'B', 'C', 'D', 'E'].map((grade, k) => ({ grade, lowest: halves(Math.ceil((maximum * (8 - k)) / 10)) }))
  return { oddHalf: 'kept', boundaries: [...steps, { grade: 'U', lowest: halves(0) }] }
}

/** Reached from half of the marks on. An example, no source. */
export function halfwayScale(maximum: HalfMarks): GradeScale {
  return { oddHalf: 'kept', boundaries: [{ grade: 'Reached', lowest: halves(Math.ceil(maximum / 2)) }, { grade: 'Not yet', lowest: halves(0) }] }
}

export const scaleSuggestions: readonly ScaleSuggestion[] = [
  { name: 'Eight points', says: 'All marks give 8, nine tenths 7, eight tenths 6 and so on down. An odd half goes up.', scale: eightPointScale },
  { name: 'Letters', says: 'A to E at 80, 70, 60, 50 and 40 percent, U below.', scale: letterScale },
  { name: 'Half way', says: '“Reached” from half of the marks on.', scale: halfwayScale },
]
