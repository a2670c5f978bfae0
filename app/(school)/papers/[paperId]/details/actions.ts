'use server'
import { refresh } from 'next/cache'
import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import type { Actor } from '@/lib/core/actor'
import type { Outcome } from '@/lib/core/outcome'
import { outcome } from '@/lib/infra/outcome'
import { addClassSet } from '@/lib/tasks/add-class-set'
import { assignMarker } from '@/lib/tasks/assign-marker'
import { noteAttendance } from '@/lib/tasks/note-attendance'
import { removeClassSet } from '@/lib/tasks/remove-class-set'
import { renewClassSet } from '@/lib/tasks/renew-class-set'
import { savePaperDetails } from '@/lib/tasks/save-paper-details'
import { sharePaper } from '@/lib/tasks/share-paper'
import { stopSharingPaper } from '@/lib/tasks/stop-sharing-paper'

const Id = z.string().min(1).max(64)
const Details = z.object({
  title: z.string().trim().min(1, 'Write a title.').max(200),
  keepUntil: z.iso.date('Write a date.'),
  namesHidden: z.boolean(),
  sampleSize: z.int().min(1).max(500).nullable(),
  solutionsReleased: z.boolean(),
})

/** Every act of this page: who asks, is it well formed, one task, then the page is drawn again. */
async function act<S extends z.ZodType, T>(raw: unknown, schema: S, task: (actor: Actor, input: z.output<S>) => Promise<T>): Promise<Outcome<T>> {
  return outcome(async () => {
    const value = await task(await requireActor(), schema.parse(raw))
    refresh()
    return value
  })
}

export async function saveDetails(raw: unknown): Promise<Outcome<void>> {
  return act(raw, z.object({ paperId: Id, before: Details, after: Details }), savePaperDetails)
}

export async function addSet(raw: unknown): Promise<Outcome<{ classSetId: string }>> {
  return act(raw, z.object({ paperId: Id, classId: Id, satOn: z.iso.date('Write a date.'), resitOf: Id.nullable() }), addClassSet)
}

export async function removeSet(raw: unknown): Promise<Outcome<void>> {
  return act(raw, z.object({ paperId: Id, classSetId: Id }), removeClassSet)
}

export async function renewSet(raw: unknown): Promise<Outcome<{ added: number }>> {
  return act(raw, z.object({ classSetId: Id }), renewClassSet)
}

export async function setAttendance(raw: unknown): Promise<Outcome<void>> {
  return act(raw, z.object({ classSetId: Id, studentId: Id, attendance: z.enum(['expected', 'absent', 'excused']) }), noteAttendance)
}

export async function share(raw: unknown): Promise<Outcome<void>> {
  return act(raw, z.object({ paperId: Id, userId: Id }), sharePaper)
}

export async function stopSharing(raw: unknown): Promise<Outcome<void>> {
  return act(raw, z.object({ paperId: Id, userId: Id }), stopSharingPaper)
}

export async function assign(raw: unknown): Promise<Outcome<void>> {
  return act(raw, z.object({ paperId: Id, userId: Id, questionIds: z.array(Id).max(200).nullable() }), assignMarker)
}
