'use server'
import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import type { Outcome } from '@/lib/core/outcome'
import { outcome } from '@/lib/infra/outcome'
import { bringBackMarkPoint } from '@/lib/tasks/bring-back-mark-point'
import { bringBackQuestion } from '@/lib/tasks/bring-back-question'
import { withdrawMarkPoint } from '@/lib/tasks/withdraw-mark-point'
import { withdrawQuestion } from '@/lib/tasks/withdraw-question'

const Id = z.string().min(1).max(64)
const Reason = z.string().trim().min(3, 'Say why, in a few words.').max(300)
const OfQuestion = z.object({ questionId: Id })
const OfPoint = z.object({ questionId: Id, pointId: Id })

export async function takeQuestionOut(raw: unknown): Promise<Outcome<void>> {
  return outcome(async () => withdrawQuestion(await requireActor(), OfQuestion.extend({ as: z.enum(['out', 'full']), reason: Reason }).parse(raw)))
}

export async function putQuestionBack(raw: unknown): Promise<Outcome<void>> {
  return outcome(async () => bringBackQuestion(await requireActor(), OfQuestion.parse(raw)))
}

export async function takePointOut(raw: unknown): Promise<Outcome<void>> {
  return outcome(async () => withdrawMarkPoint(await requireActor(), OfPoint.extend({ reason: Reason }).parse(raw)))
}

export async function putPointBack(raw: unknown): Promise<Outcome<void>> {
  return outcome(async () => bringBackMarkPoint(await requireActor(), OfPoint.parse(raw)))
}
