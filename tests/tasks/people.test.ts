import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { getUser, setPassword, setRoles } from '@/db/users'
import type { Actor, Role } from '@/lib/core/actor'
import { hashPassword } from '@/lib/infra/passwords'
import { actorOfSession } from '@/lib/tasks/actor-of-session'
import { addPerson, PersonForm } from '@/lib/tasks/add-person'
import { changePerson } from '@/lib/tasks/change-person'
import { disablePerson } from '@/lib/tasks/disable-person'
import { enablePerson } from '@/lib/tasks/enable-person'
import { listPeople } from '@/lib/tasks/list-people'
import { sendLink } from '@/lib/tasks/send-link'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

const form = (over: Partial<PersonForm> = {}): PersonForm => ({ givenName: 'Ines', familyName: 'Okafor', email: 'i.okafor@kestrelbay.example', userName: null, roles: ['teacher', 'marker'], ...over })

async function workingAdmin(): Promise<Actor> {
  const admin = await anActor('admin')
  await setPassword(db(), admin.userId, 'x')
  return admin
}

describe('the people of a school', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  it('are added by an admin, with several roles and an invitation that waits to be sent', async () => {
    const admin = await workingAdmin()
    const { userId, code } = await addPerson(admin, form())
    expect(code).toBeNull()
    expect((await getUser(db(), userId))?.roles.toSorted()).toEqual(['marker', 'teacher'])
    const mails = await db()('outbox_mails')
    expect(mails.map((mail) => [mail.kind, mail.to_address, mail.state])).toEqual([['invitation', 'i.okafor@kestrelbay.example', 'waiting']])
    expect(await db()('audit_lines').pluck('act')).toEqual(['person.added', 'link.invitation'])
  })

  it('get a code to hand over when they have no e-mail, kept as a hash only', async () => {
    const { code } = await addPerson(await workingAdmin(), form({ email: null, userName: 'i.okafor' }))
    expect(code).toMatch(/^[A-Z2-9]{4}-[A-Z2-9]{4}-[A-Z2-9]{4}$/)
    expect(await db()('outbox_mails').count({ n: '*' }).first()).toEqual({ n: 0 })
    const [link] = await db()('one_time_links')
    expect(JSON.stringify(link)).not.toContain(code)
  })

  it('share no e-mail and no user name, whichever of the two the other wrote it in', async () => {
    const admin = await workingAdmin()
    await addPerson(admin, form({ userName: 'ines' }))
    await expect(addPerson(admin, form())).rejects.toMatchObject({ code: 'email_taken' })
    await expect(addPerson(admin, form({ email: null, userName: 'ines' }))).rejects.toMatchObject({ code: 'user_name_taken' })
    expect(await listPeople(admin, 'staff')).toHaveLength(2)
  })

  it('need an e-mail or a user name, a name and a role', () => {
    expect(PersonForm.safeParse({ ...form(), email: '', userName: '' }).success).toBe(false)
    expect(PersonForm.safeParse({ ...form(), givenName: '  ' }).success).toBe(false)
    expect(PersonForm.safeParse({ ...form(), roles: ['student'] }).success).toBe(false)
    expect(PersonForm.parse({ ...form(), email: ' I.Okafor@KestrelBay.example ' }).email).toBe('i.okafor@kestrelbay.example')
  })

  it('are for admins alone to see and change', async () => {
    const admin = await workingAdmin()
    const { userId } = await addPerson(admin, form())
    for (const role of ['teacher', 'marker', 'moderator', 'student'] satisfies Role[]) {
      const other = await anActor(role)
      for (const work of [() => listPeople(other, 'staff'), () => addPerson(other, form({ email: 'x@y.example' })), () => changePerson(other, userId, form()), () => disablePerson(other, userId), () => enablePerson(other, userId), () => sendLink(other, userId)]) {
        await expect(work()).rejects.toMatchObject({ code: 'not_allowed' })
      }
    }
    expect((await getUser(db(), userId))?.disabledAt).toBeNull()
  })

  it('are signed out at once when disabled, and come back with what they had', async () => {
    const admin = await workingAdmin()
    const { userId } = await addPerson(admin, form())
    const claims = { userId, sessionNumber: 1 }
    expect((await actorOfSession(claims))?.userId).toBe(userId)
    await disablePerson(admin, userId)
    await disablePerson(admin, userId)
    expect(await actorOfSession(claims)).toBeNull()
    await expect(sendLink(admin, userId)).rejects.toMatchObject({ code: 'not_allowed' })
    await enablePerson(admin, userId)
    expect(await actorOfSession(claims)).toBeNull()
    expect((await actorOfSession({ userId, sessionNumber: 2 }))?.roles.toSorted()).toEqual(['marker', 'teacher'])
    expect((await db()('audit_lines').pluck('act')).filter((act: string) => act === 'person.disabled')).toHaveLength(1)
  })

  it('always keep one admin who can sign in', async () => {
    const admin = await workingAdmin()
    await anActor('admin') // invited, has no password yet: cannot let anybody in
    await expect(disablePerson(admin, admin.userId)).rejects.toMatchObject({ code: 'last_admin' })
    await expect(changePerson(admin, admin.userId, form())).rejects.toMatchObject({ code: 'last_admin' })
    const second = await workingAdmin()
    await changePerson(admin, admin.userId, form())
    expect((await getUser(db(), admin.userId))?.roles).not.toContain('admin')
    await expect(disablePerson(second, second.userId)).rejects.toMatchObject({ code: 'last_admin' })
  })

  it('change roles at once, told in the audit as values and never as names', async () => {
    const admin = await workingAdmin()
    const { userId } = await addPerson(admin, form())
    await changePerson(admin, userId, form({ familyName: 'Okafor-Lund', roles: ['moderator'] }))
    expect((await actorOfSession({ userId, sessionNumber: 1 }))?.roles).toEqual(['moderator'])
    const lines = await db()('audit_lines').where({ object_id: userId })
    expect(lines.find((line) => line.act === 'person.roles')).toMatchObject({ from_value: 'marker teacher', to_value: 'moderator' })
    expect(JSON.stringify(lines)).not.toMatch(/Okafor|kestrelbay/)
  })

  it('a student account keeps its one role', async () => {
    const admin = await workingAdmin()
    const { userId } = await addPerson(admin, form())
    await setRoles(db(), userId, ['student'])
    await expect(changePerson(admin, userId, form({ roles: ['admin'] }))).rejects.toMatchObject({ code: 'not_found' })
    await setPassword(db(), userId, await hashPassword('three quiet words'))
    await sendLink(admin, userId)
    expect(await db()('outbox_mails').orderBy('created_at').pluck('kind')).toContain('reset')
  })
})
