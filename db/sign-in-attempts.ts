import type { Db } from './knex'

type AttemptRow = { id: number; account: string; address: string; ok: 0 | 1; at: number }

export async function addSignInAttempt(db: Db, attempt: { account: string; address: string; ok: boolean; at: number }): Promise<void> {
  await db<AttemptRow>('sign_in_attempts').insert({ ...attempt, ok: attempt.ok ? 1 : 0 })
  await db<AttemptRow>('sign_in_attempts').where('at', '<', attempt.at - 86_400_000).delete()
}

/** Failures of one account since its last success, and of one address, both after `since`. */
export async function countFailures(db: Db, account: string, address: string, since: number): Promise<{ account: number; address: number }> {
  const success = await db<AttemptRow>('sign_in_attempts').where({ account, ok: 1 }).where('at', '>', since).max({ at: 'at' }).first<{ at: number | null }>()
  const of = async (where: Partial<AttemptRow>, after: number) =>
    (await db<AttemptRow>('sign_in_attempts').where({ ...where, ok: 0 }).where('at', '>', after).count({ n: '*' }).first<{ n: number }>())?.n ?? 0
  return { account: await of({ account }, Math.max(since, success?.at ?? 0)), address: await of({ address }, since) }
}
