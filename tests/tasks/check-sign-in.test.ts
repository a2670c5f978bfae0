import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { endSessions, setDisabled, setPassword } from '@/db/users'
import { hashPassword } from '@/lib/infra/passwords'
import { actorOfSession } from '@/lib/tasks/actor-of-session'
import { checkSignIn, failuresAllowed } from '@/lib/tasks/check-sign-in'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

const password = 'three quiet words'

describe('signing in', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  async function aPerson() {
    const actor = await anActor('teacher')
    await setPassword(db(), actor.userId, await hashPassword(password))
    const { email } = await db()('users').where({ id: actor.userId }).first<{ email: string }>()
    return { actor, account: email }
  }

  it('lets in by e-mail whatever case it is typed in, and refuses a wrong password', async () => {
    const { actor, account } = await aPerson()
    expect(await checkSignIn({ account: account.toUpperCase(), password, address: 'a' })).toEqual({ userId: actor.userId, sessionNumber: 1 })
    expect(await checkSignIn({ account, password: 'another', address: 'a' })).toBeNull()
    expect(await checkSignIn({ account: 'nobody@kestrelbay.example', password, address: 'a' })).toBeNull()
  })

  it('slows one account down and leaves another at the same address alone', async () => {
    const { account } = await aPerson()
    const other = await aPerson()
    for (let n = 0; n < failuresAllowed.account; n++) await checkSignIn({ account, password: 'no', address: 'a' })
    await expect(checkSignIn({ account, password, address: 'a' })).rejects.toMatchObject({ code: 'too_many_attempts' })
    expect(await checkSignIn({ account: other.account, password, address: 'a' })).not.toBeNull()
  })

  it('ends a session at once when the person is disabled or the session number moves on', async () => {
    const { actor, account } = await aPerson()
    const claims = (await checkSignIn({ account, password, address: 'a' }))!
    expect((await actorOfSession(claims))?.userId).toBe(actor.userId)
    await endSessions(db(), actor.userId)
    expect(await actorOfSession(claims)).toBeNull()
    await setDisabled(db(), actor.userId, 1)
    expect(await actorOfSession({ ...claims, sessionNumber: 2 })).toBeNull()
    expect(await checkSignIn({ account, password, address: 'a' })).toBeNull()
  })
})
