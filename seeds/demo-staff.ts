import { db } from '@/db/knex'
import { addUser } from '@/db/users'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { hashPassword } from '@/lib/infra/passwords'
import { demoPassword, demoStaff } from './demo-people'

export type DemoStaff = Readonly<Record<string, Actor>>

/** Adds the school's staff; by user name. */
export async function addDemoStaff(): Promise<DemoStaff> {
  const passwordHash = await hashPassword(demoPassword)
  const staff: Record<string, Actor> = {}
  for (const { userName, givenName, familyName, roles } of demoStaff) {
    const userId = newId()
    await addUser(db(), { id: userId, email: `${userName}@kestrelbay.example`, userName, givenName, familyName, passwordHash, roles })
    staff[userName] = { userId, givenName, familyName, roles, studentId: null }
  }
  return staff
}
