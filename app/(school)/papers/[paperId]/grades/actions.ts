'use server'
import { refresh } from 'next/cache'
import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { halves } from '@/lib/core/marks'
import type { Outcome } from '@/lib/core/outcome'
import { outcome } from '@/lib/infra/outcome'
import { saveGrades } from '@/lib/tasks/save-grades'

const Scale = z.object({
  oddHalf: z.enum(['kept', 'up', 'down']),
  boundaries: z.array(z.object({ grade: z.string().max(20), lowest: z.int().min(0).max(4000).transform(halves) })).max(30),
})

export async function save(paperId: unknown, raw: unknown): Promise<Outcome<void>> {
  return outcome(async () => {
    await saveGrades(await requireActor(), z.string().min(1).parse(paperId), Scale.parse(raw))
    refresh()
  })
}
