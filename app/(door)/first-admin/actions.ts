'use server'
import { callerAddress } from '@/app/_door/caller-address'
import type { Outcome } from '@/lib/core/outcome'
import { outcome } from '@/lib/infra/outcome'
import { FirstAdminForm, makeFirstAdmin } from '@/lib/tasks/make-first-admin'

export async function beFirstAdmin(raw: unknown): Promise<Outcome<{ account: string }>> {
  return outcome(async () => makeFirstAdmin(FirstAdminForm.parse(raw), await callerAddress()))
}
