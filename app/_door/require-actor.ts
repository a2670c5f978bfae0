import { cache } from 'react'
import { getServerSession } from 'next-auth'
import { redirect } from 'next/navigation'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { actorOfSession } from '@/lib/tasks/actor-of-session'
import { schoolIsEmpty } from '@/lib/tasks/school-is-empty'
import { authOptions } from './auth-options'

/** Who asks, or null when nobody is signed in. One look-up a request. */
export const currentActor = cache(async (): Promise<Actor | null> => {
  const session = await getServerSession(authOptions())
  if (!session?.userId || session.sessionNumber === undefined) return null
  return actorOfSession({ userId: session.userId, sessionNumber: session.sessionNumber })
})

/** For actions and routes: throws signed_out. */
export async function requireActor(): Promise<Actor> {
  const actor = await currentActor()
  if (!actor) throw new AppError('signed_out')
  return actor
}

/** For pages: leads to the sign-in page, in an empty school to where its first admin is made. */
export async function actorOrSignIn(): Promise<Actor> {
  const actor = await currentActor()
  if (!actor) redirect((await schoolIsEmpty()) ? '/first-admin' : '/sign-in')
  return actor
}
