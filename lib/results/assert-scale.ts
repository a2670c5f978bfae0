import { AppError, type ErrorLine } from '@/lib/core/errors'
import type { HalfMarks } from '@/lib/core/marks'
import type { GradeScale } from '@/lib/core/paper'

/** Throws bad_input with a line for each grade without a name, named twice, on the boundary of another, or above the paper's maximum. */
export function assertScale({ boundaries }: GradeScale, maximum: HalfMarks): void {
  const lines: ErrorLine[] = []
  for (const [k, { grade, lowest }] of boundaries.entries()) {
    const path = `boundaries.${k}`
    if (grade.trim() === '') lines.push({ path: `${path}.grade`, says: 'Give the grade a name.' })
    if (boundaries.findIndex((one) => one.grade === grade) !== k) lines.push({ path: `${path}.grade`, says: `There are two grades named ${grade}.` })
    if (boundaries.findIndex((one) => one.lowest === lowest) !== k) lines.push({ path: `${path}.lowest`, says: 'Two grades begin at this mark.' })
    if (lowest < 0 || lowest > maximum) lines.push({ path: `${path}.lowest`, says: 'This mark lies above what the paper can give.' })
  }
  if (lines.length > 0) throw new AppError('bad_input', { lines })
}
