import { type APIRequestContext, request } from '@playwright/test'
import { demoPassword } from '@/seeds/demo-people'
import { demoAddress, expect } from '../fixtures'

/** Everyone who knocks at every door, in the order of the columns of the tables. */
export const everyone = ['nobody', 'owner', 'other', 'marker', 'moderator', 'admin', 'student', 'mate'] as const
export type Who = (typeof everyone)[number]
export type Sessions = Readonly<Record<Who, APIRequestContext>>

/** `other` is a teacher with a paper of her own; `mate` sat the same test as `student`. */
export const userNames: Readonly<Record<Exclude<Who, 'nobody'>, string>> = {
  owner: 'r.adeyemi', other: 'h.moss', marker: 'm.osei', moderator: 'k.lindqvist', admin: 'a.whitcombe', student: '6113', mate: '6115',
}

/** A session for everyone, signed in where the browser signs in. Dispose of them after use. */
export async function signEveryoneIn(): Promise<Sessions> {
  const sessions: Partial<Record<Who, APIRequestContext>> = {}
  for (const who of everyone) {
    const context = await request.newContext({ baseURL: demoAddress })
    if (who !== 'nobody') await signIn(context, userNames[who])
    sessions[who] = context
  }
  return sessions as Sessions
}

async function signIn(context: APIRequestContext, account: string): Promise<void> {
  const { csrfToken } = (await (await context.get('/api/auth/csrf')).json()) as { csrfToken: string }
  await context.post('/api/auth/callback/credentials', { form: { csrfToken, account, password: demoPassword, json: 'true', callbackUrl: demoAddress } })
  const session = (await (await context.get('/api/auth/session')).json()) as { userId?: string }
  expect(session.userId, `${account} is signed in`).toBeTruthy()
}
