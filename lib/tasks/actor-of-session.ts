import type { Actor } from '@/lib/core/actor'
import { db } from '@/db/knex'
import { getUser, studentIdOfUser } from '@/db/users'
import type { SignInClaims } from './check-sign-in'

/** Who a session belongs to now: null once the person is disabled or the session number has moved on. */
export async function actorOfSession(claims: SignInClaims): Promise<Actor | null> {
  const user = await getUser(db(), claims.userId)
  if (!user || user.disabledAt !== null || user.sessionNumber !== claims.sessionNumber) return null
  return {
    userId: user.id, givenName: user.givenName, familyName: user.familyName, roles: user.roles,
    studentId: user.roles.includes('student') ? await studentIdOfUser(db(), user.id) : null,
  }
}
