import type { Db } from '@/db/knex'
import { listWorkingAdmins, type User } from '@/db/users'
import { AppError } from '@/lib/core/errors'

/** Throws last_admin when nobody else could let people in any more. */
export async function assertNotLastAdmin(db: Db, user: User): Promise<void> {
  if (!user.roles.includes('admin')) return
  const others = (await listWorkingAdmins(db)).filter((id) => id !== user.id)
  if (others.length === 0) throw new AppError('last_admin')
}
