import { z } from 'zod'
import { db } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { now } from '@/lib/infra/clock'
import { env } from '@/lib/infra/env'
import { buildSlips } from '@/lib/printing/build-slips'
import { gateClass } from './gate-class'

export const SlipsForm = z.object({
  sheet: z.enum(['a4', 'letter']),
  slips: z.array(z.object({ name: z.string().min(1).max(200), userName: z.string().min(1).max(200), code: z.string().min(1).max(40) })).min(1).max(500),
})

/**
 * Slips of a class as a PDF to print and cut. Their codes are known only to who has just given them out (`giveAccounts`): nothing is
 * looked up here, and no code is kept. Throws not_found or not_allowed.
 */
export async function printSlips(actor: Actor, classId: string, { sheet, slips }: z.output<typeof SlipsForm>): Promise<{ bytes: Uint8Array; name: string }> {
  const { name } = await gateClass(db(), actor, classId)
  const bytes = await buildSlips({ slips, sheet, className: name, school: env.schoolName, address: env.url.replace(/^https?:\/\//, ''), builtAt: new Date(now()) })
  return { bytes, name: `Sign-in slips, ${name}.pdf` }
}
