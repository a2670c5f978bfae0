import { AppError, type ErrorLine } from '@/lib/core/errors'
import { sayMark } from '@/lib/core/marks'
import type { Paper } from '@/lib/core/paper'
import type { Setting } from '@/lib/core/setting'

/**
 * Once a sample is drawn the tolerances stand as they were: nobody moves the line after seeing on which side the marks fall. A question that is
 * new may bring its own. Throws tolerance_fixed with a line for each change.
 */
export function assertToleranceKept(stored: Pick<Paper, 'tolerance' | 'questions'>, next: Setting): void {
  const lines: ErrorLine[] = stored.tolerance === next.tolerance ? [] : [{ path: 'Paper', says: `its tolerance stays at ${sayMark(stored.tolerance)}` }]
  for (const { id, label, tolerance } of stored.questions) {
    const after = next.questions.find((question) => question.id === id)
    const held = tolerance ?? stored.tolerance
    if (after && (after.tolerance ?? next.tolerance) !== held && (after.tolerance !== tolerance || stored.tolerance === next.tolerance)) lines.push({ path: `Question ${label}`, says: `its tolerance stays at ${sayMark(held)}` })
  }
  if (lines.length > 0) throw new AppError('tolerance_fixed', { lines })
}
