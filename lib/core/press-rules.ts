import { AppError } from './errors'
import { isNought, kept, markOf, markOnPoint, saysMark } from './marking'
import { onStep, type HalfMarks, type MarkingStep } from './marks'
import type { MarkPoint } from './paper'
import type { Stamp, StampKind } from './stamp'

/** What stamps are held against: the question's maximum and points, and the paper's marking step. */
export type Scheme = Readonly<{ maximum: HalfMarks; step: MarkingStep; points: readonly MarkPoint[] }>

const canScore: readonly StampKind[] = ['tick', 'half', 'mark', 'code', 'ring', 'note']

/**
 * Whether the stamps of one marking may stand together once `pressed` is among them. Throws bad_input (a kind that carries no mark, a point of another question), off_step,
 * over_maximum (the point's or the question's), or nought_with_marks. Taking back is always allowed: it can only mend.
 */
export function assertFits(stamps: readonly Stamp[], pressed: Stamp, scheme: Scheme): void {
  if (pressed.removed) return
  assertScores(pressed, scheme)
  const there = kept(stamps)
  if (there.some((stamp) => isNought(stamp)) && (markOf(there) > 0 || there.filter((stamp) => isNought(stamp)).length > 1)) throw new AppError('nought_with_marks')
  if (pressed.worth === 0) return
  assertPointFits(there, pressed, scheme)
  const mark = markOf(there)
  if (mark > scheme.maximum) throw new AppError('over_maximum', { mark, maximum: scheme.maximum })
}

function assertScores(pressed: Stamp, { step, points }: Scheme): void {
  if (pressed.worth > 0 && !canScore.includes(pressed.kind)) throw new AppError('bad_input', { kind: pressed.kind })
  if (!onStep(pressed.worth, step)) throw new AppError('off_step', { worth: pressed.worth })
  if (pressed.markPointId !== null && !points.some((point) => point.id === pressed.markPointId)) throw new AppError('bad_input', { markPointId: pressed.markPointId })
}

/** A point's stamps are never worth more than the point. A point taken out of the scheme earns nothing new. */
function assertPointFits(stamps: readonly Stamp[], pressed: Stamp, { points }: Scheme): void {
  const point = points.find((candidate) => candidate.id === pressed.markPointId)
  if (!point) return
  const mark = markOnPoint(stamps, point.id)
  if (mark > point.worth || point.withdrawn) throw new AppError('over_maximum', { mark, maximum: point.withdrawn ? 0 : point.worth, point: point.label })
}

/** Points that were given something although the point they depend on was given nothing, in the scheme's order. */
export function pointsWithoutBase(stamps: readonly Stamp[], points: readonly MarkPoint[]): MarkPoint[] {
  return points.filter((point) => {
    const base = points.find((other) => other.id === point.dependsOn && !other.withdrawn)
    return base !== undefined && markOnPoint(stamps, point.id) > 0 && markOnPoint(stamps, base.id) === 0
  })
}

/**
 * Whether a marking can be settled. Throws nothing_stamped (no stamp says a mark), base_missing (an answer mark without its method mark), over_maximum or off_step (the scheme was
 * changed under it).
 */
export function assertSettles(stamps: readonly Stamp[], { maximum, step, points }: Scheme): void {
  if (!saysMark(stamps)) throw new AppError('nothing_stamped')
  const mark = markOf(stamps)
  if (mark > maximum) throw new AppError('over_maximum', { mark, maximum })
  if (!onStep(mark, step)) throw new AppError('off_step', { worth: mark })
  const [lone] = pointsWithoutBase(stamps, points)
  if (lone) throw new AppError('base_missing', { point: lone.label, base: points.find((point) => point.id === lone.dependsOn)?.label ?? '' })
}
