'use server'
import { refresh } from 'next/cache'
import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import type { Outcome } from '@/lib/core/outcome'
import { decisionReasons } from '@/lib/core/second-marking'
import { outcome } from '@/lib/infra/outcome'
import { addToSample } from '@/lib/tasks/add-to-sample'
import { adjustMarker } from '@/lib/tasks/adjust-marker'
import { beginAgreedMarking } from '@/lib/tasks/begin-agreed-marking'
import { closeSample } from '@/lib/tasks/close-sample'
import { decideMarking } from '@/lib/tasks/decide-marking'
import { drawSample } from '@/lib/tasks/draw-sample'
import { undoAdjustment } from '@/lib/tasks/undo-adjustment'

const Id = z.string().min(1).max(64)
const Draw = z.object({ classSetId: Id, moderatorId: Id, size: z.int().min(1).max(1000) })
const Adjust = z.object({ sampleId: Id, questionId: Id, markerId: Id, key: Id })
const Decide = z.object({ responseId: Id, stands: z.enum(['first', 'second', 'agreed']), reason: z.enum(decisionReasons) })

/** After a change the page is read again. */
async function changed<T>(work: () => Promise<T>): Promise<Outcome<T>> {
  return outcome(async () => {
    const value = await work()
    refresh()
    return value
  })
}

export async function draw(raw: unknown): Promise<Outcome<{ sampleId: string }>> {
  return changed(async () => drawSample(await requireActor(), Draw.parse(raw)))
}

export async function addScript(raw: unknown): Promise<Outcome<void>> {
  return changed(async () => addToSample(await requireActor(), z.object({ sampleId: Id, scriptId: Id }).parse(raw)))
}

export async function close(raw: unknown): Promise<Outcome<void>> {
  return changed(async () => closeSample(await requireActor(), Id.parse(raw)))
}

export async function decide(raw: unknown): Promise<Outcome<void>> {
  return changed(async () => decideMarking(await requireActor(), Decide.parse(raw)))
}

export async function adjust(raw: unknown): Promise<Outcome<{ adjustmentId: string }>> {
  return changed(async () => adjustMarker(await requireActor(), Adjust.parse(raw)))
}

export async function undo(raw: unknown): Promise<Outcome<void>> {
  return changed(async () => undoAdjustment(await requireActor(), Id.parse(raw)))
}

export async function beginAgreed(raw: unknown): Promise<Outcome<{ markingId: string }>> {
  return outcome(async () => beginAgreedMarking(await requireActor(), z.object({ responseId: Id, copyOf: Id }).parse(raw)))
}
