'use server'
import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import type { Outcome } from '@/lib/core/outcome'
import type { CodeSpot } from '@/lib/core/printed-code'
import { outcome } from '@/lib/infra/outcome'
import { saveCodeSpots } from '@/lib/tasks/save-code-spots'
import { suggestCodeSpots } from '@/lib/tasks/suggest-code-spots'

const PaperId = z.string().min(1).max(64)
const Measure = z.number().min(-10_000).max(10_000)
const Spot = z.object({ page: z.int().min(1).max(40), rect: z.object({ x: Measure, y: Measure, w: Measure, h: Measure }) })

export async function saveSpots(raw: unknown): Promise<Outcome<void>> {
  return outcome(async () => saveCodeSpots(await requireActor(), z.object({ paperId: PaperId, spots: z.array(Spot).max(40) }).parse(raw)))
}

export async function suggestSpots(raw: unknown): Promise<Outcome<CodeSpot[]>> {
  return outcome(async () => suggestCodeSpots(await requireActor(), z.object({ paperId: PaperId, same: z.boolean() }).parse(raw)))
}
