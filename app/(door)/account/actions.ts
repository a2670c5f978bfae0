'use server'
import { requireActor } from '@/app/_door/require-actor'
import type { Outcome } from '@/lib/core/outcome'
import { outcome } from '@/lib/infra/outcome'
import { changeOwnPassword, OwnPassword } from '@/lib/tasks/change-own-password'

export async function changePassword(raw: unknown): Promise<Outcome<{ account: string }>> {
  return outcome(async () => changeOwnPassword(await requireActor(), OwnPassword.parse(raw)))
}
