'use server'
import { refresh } from 'next/cache'
import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import type { Outcome } from '@/lib/core/outcome'
import { outcome } from '@/lib/infra/outcome'
import { retryMail } from '@/lib/tasks/retry-mail'

export async function retry(mailId: unknown): Promise<Outcome<void>> {
  return outcome(async () => {
    await retryMail(await requireActor(), z.uuid().parse(mailId))
    refresh()
  })
}
