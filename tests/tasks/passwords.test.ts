import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { db } from '@/db/knex'
import { getUser, setPassword } from '@/db/users'
import type { Actor } from '@/lib/core/actor'
import { hashPassword } from '@/lib/infra/passwords'
import { secrets } from '@/lib/infra/secrets'
import { actorOfSession } from '@/lib/tasks/actor-of-session'
import { addPerson } from '@/lib/tasks/add-person'
import { asksAllowed, askNewPassword } from '@/lib/tasks/ask-new-password'
import { changeOwnPassword } from '@/lib/tasks/change-own-password'
import { checkSignIn } from '@/lib/tasks/check-sign-in'
import { disablePerson } from '@/lib/tasks/disable-person'
import { linkLasts } from '@/lib/tasks/issue-link'
import { withTokens } from '@/lib/tasks/link-placeholder'
import { makeFirstAdmin } from '@/lib/tasks/make-first-admin'
import { readLink } from '@/lib/tasks/read-link'
import { schoolIsEmpty } from '@/lib/tasks/school-is-empty'
import { sendLink } from '@/lib/tasks/send-link'
import { setPasswordByLink } from '@/lib/tasks/set-password-by-link'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

const person = { givenName: 'Ines', familyName: 'Okafor', email: 'i.okafor@kestrelbay.example', userName: null, roles: ['teacher' as const] }

/** The token in the newest mail, as its reader gets it. */
async function mailedToken(): Promise<string> {
  const mail = await db()('outbox_mails').orderBy('rowid', 'desc').first<{ text: string }>()
  return /new-password\/(\S+)/.exec(withTokens(mail!.text))![1]!
}

describe('choosing a password by a one-time link', () => {
  beforeEach(openSchool)
  afterEach(async () => {
    vi.useRealTimers()
    await closeSchool()
  })

  async function invited() {
    const admin = await anActor('admin')
    const { userId } = await addPerson(admin, person)
    return { admin, userId, token: await mailedToken() }
  }

  it('sets it once, and the database alone could not have opened the link', async () => {
    const { userId, token } = await invited()
    const everything = JSON.stringify([await db()('one_time_links'), await db()('outbox_mails')])
    expect(everything).not.toContain(token)
    expect(await readLink(token)).toEqual({ givenName: 'Ines', account: person.email })
    await setPasswordByLink({ token, password: 'three quiet words' })
    expect(await checkSignIn({ account: person.email, password: 'three quiet words', address: 'a' })).toEqual({ userId, sessionNumber: 2 })
    await expect(setPasswordByLink({ token, password: 'another quiet word' })).rejects.toMatchObject({ code: 'link_used' })
    await expect(readLink(token)).rejects.toMatchObject({ code: 'link_used' })
  })

  it('used twice at the same moment sets one password', async () => {
    const { token } = await invited()
    const both = await Promise.allSettled(['first quiet words', 'second quiet words'].map((password) => setPasswordByLink({ token, password })))
    expect(both.map((one) => one.status).toSorted()).toEqual(['fulfilled', 'rejected'])
  })

  it('ends the sessions there were', async () => {
    const { userId, token } = await invited()
    expect(await actorOfSession({ userId, sessionNumber: 1 })).not.toBeNull()
    await setPasswordByLink({ token, password: 'three quiet words' })
    expect(await actorOfSession({ userId, sessionNumber: 1 })).toBeNull()
  })

  it('refuses nine characters and leaves the link for the next try', async () => {
    const { token } = await invited()
    await expect(setPasswordByLink({ token, password: 'ninechars' })).rejects.toMatchObject({ code: 'password_weak' })
    await setPasswordByLink({ token, password: 'tenletters' })
  })

  it('refuses a link whose time is over, an older one after a newer, a wrong one, and one of a disabled person', async () => {
    const { admin, userId, token } = await invited()
    await sendLink(admin, userId)
    await expect(readLink(token)).rejects.toMatchObject({ code: 'link_used' })
    const newer = await mailedToken()
    await expect(readLink(`${newer}x`)).rejects.toMatchObject({ code: 'link_used' })
    await disablePerson(admin, userId)
    await expect(setPasswordByLink({ token: newer, password: 'three quiet words' })).rejects.toMatchObject({ code: 'link_used' })
    await addPerson(admin, { ...person, email: 'other@kestrelbay.example' })
    const late = await mailedToken()
    vi.useFakeTimers({ toFake: ['Date'], now: Date.now() + linkLasts.invitation })
    await expect(setPasswordByLink({ token: late, password: 'three quiet words' })).rejects.toMatchObject({ code: 'link_used' })
  })

  it('takes a printed code in any case, with or without dashes', async () => {
    const { code } = await addPerson(await anActor('admin'), { ...person, email: null, userName: 'ines' })
    await setPasswordByLink({ token: code!.toLowerCase().replaceAll('-', ' '), password: 'three quiet words' })
    expect(await checkSignIn({ account: 'ines', password: 'three quiet words', address: 'a' })).not.toBeNull()
  })
})

describe('asking for a new password', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  it('answers the same whether the account is there or not, and mails only to one that is', async () => {
    const actor = await anActor('teacher')
    const { email } = (await getUser(db(), actor.userId))!
    expect(await askNewPassword({ account: email! }, 'a')).toEqual(await askNewPassword({ account: 'nobody@kestrelbay.example' }, 'a'))
    expect(await db()('outbox_mails').pluck('to_address')).toEqual([email])
  })

  it('is slowed down by account, there or not, without slowing down signing in', async () => {
    const actor = await anActor('teacher')
    await setPassword(db(), actor.userId, await hashPassword('three quiet words'))
    const account = (await getUser(db(), actor.userId))!.email!
    for (const name of [account, 'nobody']) {
      for (let n = 0; n < asksAllowed.account; n++) await askNewPassword({ account: name }, 'a')
      await expect(askNewPassword({ account: name }, 'a')).rejects.toMatchObject({ code: 'too_many_attempts' })
    }
    expect(await checkSignIn({ account, password: 'three quiet words', address: 'a' })).not.toBeNull()
  })
})

describe('one’s own password', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  async function aTeacher(): Promise<Actor> {
    const actor = await anActor('teacher')
    await setPassword(db(), actor.userId, await hashPassword('three quiet words'))
    return actor
  }

  it('asks for the old one and ends the other sessions', async () => {
    const actor = await aTeacher()
    await expect(changeOwnPassword(actor, { old: 'not this one', password: 'four quiet words' })).rejects.toMatchObject({ code: 'password_wrong' })
    expect(await actorOfSession({ userId: actor.userId, sessionNumber: 1 })).not.toBeNull()
    const { account } = await changeOwnPassword(actor, { old: 'three quiet words', password: 'four quiet words' })
    expect(await actorOfSession({ userId: actor.userId, sessionNumber: 1 })).toBeNull()
    expect(await checkSignIn({ account, password: 'four quiet words', address: 'a' })).not.toBeNull()
  })

  it('cannot be guessed at from an open screen', async () => {
    const actor = await aTeacher()
    for (let n = 0; n < 8; n++) await expect(changeOwnPassword(actor, { old: `guess ${n}`, password: 'four quiet words' })).rejects.toMatchObject({ code: 'password_wrong' })
    await expect(changeOwnPassword(actor, { old: 'three quiet words', password: 'four quiet words' })).rejects.toMatchObject({ code: 'too_many_attempts' })
  })
})

describe('the first admin', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)
  const first = () => ({ code: secrets().setUpCode, givenName: 'Ada', familyName: 'Lund', email: 'a.lund@kestrelbay.example', password: 'three quiet words' })

  it('is made once, with the set-up code, and can sign in', async () => {
    expect(await schoolIsEmpty()).toBe(true)
    await expect(makeFirstAdmin({ ...first(), code: 'wrong' }, 'a')).rejects.toMatchObject({ code: 'set_up_code_wrong' })
    await expect(makeFirstAdmin({ ...first(), password: 'short' }, 'a')).rejects.toMatchObject({ code: 'password_weak' })
    expect(await schoolIsEmpty()).toBe(true)
    await makeFirstAdmin(first(), 'a')
    const claims = await checkSignIn({ account: 'a.lund@kestrelbay.example', password: 'three quiet words', address: 'a' })
    expect((await actorOfSession(claims!))?.roles).toEqual(['admin'])
    await expect(makeFirstAdmin({ ...first(), email: 'b@kestrelbay.example' }, 'a')).rejects.toMatchObject({ code: 'not_found' })
  })

  it('is one, though two ask at the same moment', async () => {
    const both = await Promise.allSettled(['a@x.example', 'b@x.example'].map((email) => makeFirstAdmin({ ...first(), email }, 'a')))
    expect(both.map((one) => one.status).toSorted()).toEqual(['fulfilled', 'rejected'])
  })

  it('has to wait after too many wrong codes', async () => {
    for (let n = 0; n < 20; n++) await expect(makeFirstAdmin({ ...first(), code: `${n}` }, 'a')).rejects.toMatchObject({ code: 'set_up_code_wrong' })
    await expect(makeFirstAdmin(first(), 'a')).rejects.toMatchObject({ code: 'too_many_attempts' })
  })
})
