import { readMark, sayMark, type HalfMarks } from '@/lib/core/marks'
import type { GradeScale, OddHalf } from '@/lib/core/paper'

/** A line of the scale as it is being typed: the mark may still be no mark. */
export type ScaleLine = Readonly<{ key: number; grade: string; lowest: string }>
export type ScaleInWork = Readonly<{ oddHalf: OddHalf; lines: readonly ScaleLine[]; nextKey: number }>

/** A stored scale opened for typing, highest grade first. */
export function openScale({ oddHalf, boundaries }: GradeScale): ScaleInWork {
  const lines = [...boundaries].sort((a, b) => b.lowest - a.lowest).map(({ grade, lowest }, key) => ({ key, grade, lowest: sayMark(lowest) }))
  return { oddHalf, lines, nextKey: lines.length }
}

/** What is wrong with a line's mark as typed; null when nothing is. */
export function faultOfMark(typed: string, maximum: HalfMarks): string | null {
  const mark = readMark(typed)
  if (mark === null) return 'Write a mark like 8 or 8½.'
  return mark > maximum ? `The paper gives at most ${sayMark(maximum)}.` : null
}

/** The scale as it would be stored: lines whose mark cannot be read are left out of it. */
export function scaleOf({ oddHalf, lines }: ScaleInWork): GradeScale {
  return { oddHalf, boundaries: lines.flatMap(({ grade, lowest }) => { const mark = readMark(lowest); return mark === null ? [] : [{ grade, lowest: mark }] }) }
}
