import type { Actor } from '@/lib/core/actor'
import type { AdjustmentPlan } from '@/lib/core/adjusting'
import { AppError } from '@/lib/core/errors'
import { db } from '@/db/knex'
import { gateSample } from './gate-sample'
import { planAdjustment, type AskedAdjustment } from './plan-adjustment'

/** What one adjustment of a marker's answers to a question would do to every script of the class set, for an owner to see before deciding. Throws what the gate says, not_allowed, or no_pattern. */
export async function readAdjustment(actor: Actor, asked: AskedAdjustment): Promise<AdjustmentPlan> {
  const { owner, ...sample } = await gateSample(db(), actor, asked.sampleId)
  if (!owner) throw new AppError('not_allowed')
  const { paperId, sampleId, className, maximum, graded, pattern, lines, key } = await planAdjustment(db(), sample, asked)
  return { paperId, sampleId, className, maximum, graded, pattern, lines, key }
}
