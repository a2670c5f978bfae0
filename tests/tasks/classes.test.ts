import { readFileSync } from 'node:fs'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { actorOfSession } from '@/lib/tasks/actor-of-session'
import { addClass } from '@/lib/tasks/add-class'
import { addPerson } from '@/lib/tasks/add-person'
import { checkRoster } from '@/lib/tasks/check-roster'
import { checkSignIn } from '@/lib/tasks/check-sign-in'
import { disablePerson } from '@/lib/tasks/disable-person'
import { giveAccounts } from '@/lib/tasks/give-accounts'
import { importRoster } from '@/lib/tasks/import-roster'
import { listClasses } from '@/lib/tasks/list-classes'
import { readClass } from '@/lib/tasks/read-class'
import { renameClass } from '@/lib/tasks/rename-class'
import { setClassTeachers } from '@/lib/tasks/set-class-teachers'
import { setPasswordByLink } from '@/lib/tasks/set-password-by-link'
import { takeOutOfClass } from '@/lib/tasks/take-out-of-class'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

const list = (...lines: string[]) => new TextEncoder().encode(['candidate_number,given_name,family_name,email', ...lines].join('\n'))
const everyday = () => readFileSync('seeds/class-sets/everyday/roster.csv')

async function aClass(teacher: Actor, name = '8K'): Promise<string> {
  return (await addClass(teacher, name)).classId
}
const numbersOf = async (actor: Actor, classId: string) => (await readClass(actor, classId)).students.map((student) => student.candidateNumber).toSorted()

describe('classes', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  it('are seen and managed by those who teach them, and all by an admin', async () => {
    const [teacher, other, admin] = [await anActor('teacher'), await anActor('teacher'), await anActor('admin')]
    const classId = await aClass(teacher)
    await aClass(other, '10A')
    await aClass(other, '9B')
    expect((await listClasses(teacher)).map((one) => one.name)).toEqual(['8K'])
    expect((await listClasses(admin)).map((one) => one.name)).toEqual(['8K', '9B', '10A'])
    const works = (actor: Actor) => [
      () => readClass(actor, classId), () => renameClass(actor, classId, '8L'), () => setClassTeachers(actor, classId, [actor.userId]), () => checkRoster(actor, classId, everyday()),
      () => importRoster(actor, classId, everyday()), () => giveAccounts(actor, classId, { studentIds: [classId], by: 'slips' }), () => takeOutOfClass(actor, classId, classId),
    ]
    for (const work of works(other)) await expect(work()).rejects.toMatchObject({ code: 'not_found' })
    for (const role of ['marker', 'moderator', 'student'] as const) {
      const person = await anActor(role)
      for (const work of [...works(person), () => listClasses(person), () => addClass(person, 'X')]) await expect(work()).rejects.toMatchObject({ code: 'not_allowed' })
    }
    expect(await readClass(admin, classId)).toMatchObject({ name: '8K', students: [] })
  })

  it('bear one name each', async () => {
    const teacher = await anActor('teacher')
    const classId = await aClass(teacher)
    await expect(addClass(teacher, '8K')).rejects.toMatchObject({ code: 'already_there' })
    await aClass(teacher, '8L')
    await expect(renameClass(teacher, classId, '8L')).rejects.toMatchObject({ code: 'already_there' })
    await renameClass(teacher, classId, '8K')
    await renameClass(teacher, classId, '8M')
    expect((await listClasses(teacher)).map((one) => one.name)).toEqual(['8L', '8M'])
  })

  it('are handed on to other teachers, never to nobody and only to teachers', async () => {
    const [teacher, other, marker] = [await anActor('teacher'), await anActor('teacher'), await anActor('marker')]
    const classId = await aClass(teacher)
    await expect(setClassTeachers(teacher, classId, [])).rejects.toMatchObject({ code: 'bad_input' })
    await expect(setClassTeachers(teacher, classId, [marker.userId])).rejects.toMatchObject({ code: 'not_found' })
    await setClassTeachers(teacher, classId, [other.userId])
    await expect(readClass(teacher, classId)).rejects.toMatchObject({ code: 'not_found' })
    expect((await readClass(other, classId)).teachers.map((one) => one.userId)).toEqual([other.userId])
  })
})

describe('importing a class list', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  it('adds everyone once, however often the same file comes', async () => {
    const teacher = await anActor('teacher')
    const classId = await aClass(teacher)
    const preview = await checkRoster(teacher, classId, everyday())
    expect(preview.steps.every((step) => step.does === 'new')).toBe(true)
    expect(await numbersOf(teacher, classId)).toEqual([])
    const first = await importRoster(teacher, classId, everyday())
    expect(first).toMatchObject({ new: preview.steps.length, changed: 0, unchanged: 0 })
    expect(await importRoster(teacher, classId, everyday())).toMatchObject({ new: 0, changed: 0, unchanged: first.new })
    expect(await numbersOf(teacher, classId)).toHaveLength(first.new)
  })

  it('updates by candidate number, leaves alone whom the file does not name, and keeps leading noughts apart', async () => {
    const teacher = await anActor('teacher')
    const classId = await aClass(teacher)
    await importRoster(teacher, classId, list('073,Ana,Lund,', '73,Per,Lund,per@example.org'))
    const { students: before } = await readClass(teacher, classId)
    expect(await importRoster(teacher, classId, list('073,Anna,Lund,anna@example.org', '0073,Ida,Berg,'))).toEqual({ new: 1, changed: 1, joins: 0, unchanged: 0, leftAlone: 1 })
    const { students } = await readClass(teacher, classId)
    expect(students.map((student) => [student.candidateNumber, student.givenName, student.email])).toEqual([['0073', 'Ida', null], ['073', 'Anna', 'anna@example.org'], ['73', 'Per', 'per@example.org']])
    expect(students.find((one) => one.candidateNumber === '073')?.studentId).toBe(before.find((one) => one.candidateNumber === '073')?.studentId)
  })

  it('imports nothing while a line is faulty', async () => {
    const teacher = await anActor('teacher')
    const classId = await aClass(teacher)
    const faulty = list('1,Ana,Lund,', ',Per,Lund,')
    expect((await checkRoster(teacher, classId, faulty)).faults).toEqual([{ path: 'line 3', says: 'has no candidate number.' }])
    await expect(importRoster(teacher, classId, faulty)).rejects.toMatchObject({ code: 'roster_invalid', detail: { lines: [{ path: 'line 3' }] } })
    expect(await db()('students').count({ n: '*' }).first()).toEqual({ n: 0 })
  })

  it('lets a teacher put a student of another class in, and change none', async () => {
    const [teacher, other, admin] = [await anActor('teacher'), await anActor('teacher'), await anActor('admin')]
    await importRoster(other, await aClass(other, '9B'), list('1,Ana,Lund,ana@example.org'))
    const classId = await aClass(teacher)
    await expect(importRoster(teacher, classId, list('1,Eve,Other,'))).rejects.toMatchObject({ code: 'roster_invalid' })
    expect(await importRoster(teacher, classId, list('1,Ana,Lund,ana@example.org'))).toMatchObject({ joins: 1, changed: 0 })
    expect(await importRoster(admin, classId, list('1,Anna,Lund,ana@example.org'))).toMatchObject({ changed: 1 })
  })

  it('takes a student out of one class without touching the school’s list', async () => {
    const teacher = await anActor('teacher')
    const classId = await aClass(teacher)
    await importRoster(teacher, classId, list('1,Ana,Lund,'))
    const [student] = (await readClass(teacher, classId)).students
    await takeOutOfClass(teacher, classId, student!.studentId)
    expect(await numbersOf(teacher, classId)).toEqual([])
    expect(await db()('students').pluck('candidate_number')).toEqual(['1'])
  })
})

describe('accounts of students', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  async function withStudents(...lines: string[]) {
    const teacher = await anActor('teacher')
    const classId = await aClass(teacher)
    await importRoster(teacher, classId, list(...lines))
    const students = async () => (await readClass(teacher, classId)).students
    return { teacher, classId, students, studentIds: (await students()).map((student) => student.studentId) }
  }

  it('go by mail to an address of one’s own, and by slip to a sibling who shares it or has none', async () => {
    const { teacher, classId, students, studentIds } = await withStudents('81,Ana,Lund,home@example.org', '82,Per,Lund,home@example.org', '83,Ida,Berg,')
    const given = await giveAccounts(teacher, classId, { studentIds, by: 'mail' })
    expect(given.mailed).toBe(1)
    expect(given.slips.map((slip) => [slip.name, slip.userName])).toEqual([['Ida Berg', '83'], ['Per Lund', '82']])
    expect((await students()).map((student) => [student.givenName, student.account, student.signsInAs])).toEqual([['Ida', 'waiting', '83'], ['Ana', 'waiting', 'home@example.org'], ['Per', 'waiting', '82']])
    expect(JSON.stringify([await db()('one_time_links'), await db()('audit_lines'), await db()('outbox_mails')])).not.toContain(given.slips[0]!.code)
  })

  it('open with the code of the slip and then read as that student', async () => {
    const { teacher, classId, studentIds, students } = await withStudents('0083,Ida,Berg,')
    const { slips: [slip] } = await giveAccounts(teacher, classId, { studentIds, by: 'mail' })
    await setPasswordByLink({ token: slip!.code, password: 'three quiet words' })
    const claims = await checkSignIn({ account: '0083', password: 'three quiet words', address: 'a' })
    expect(await actorOfSession(claims!)).toMatchObject({ roles: ['student'], studentId: studentIds[0] })
    expect((await students())[0]?.account).toBe('ready')
  })

  it('given again are the same accounts with a new way in', async () => {
    const { teacher, classId, studentIds } = await withStudents('83,Ida,Berg,')
    const first = await giveAccounts(teacher, classId, { studentIds, by: 'slips' })
    const second = await giveAccounts(teacher, classId, { studentIds, by: 'slips' })
    expect(await db()('users').join('user_roles', 'user_id', 'id').where({ role: 'student' }).count({ n: '*' }).first()).toEqual({ n: 1 })
    await expect(setPasswordByLink({ token: first.slips[0]!.code, password: 'three quiet words' })).rejects.toMatchObject({ code: 'link_used' })
    await setPasswordByLink({ token: second.slips[0]!.code, password: 'three quiet words' })
  })

  it('open again by a slip only through an admin once they have a password, or by mail to their own address', async () => {
    const { teacher, classId, studentIds } = await withStudents('83,Ida,Berg,', '84,Per,Lund,per@example.org')
    const { slips } = await giveAccounts(teacher, classId, { studentIds, by: 'slips' })
    for (const slip of slips) await setPasswordByLink({ token: slip.code, password: 'three quiet words' })
    const other = await anActor('teacher')
    const others = await aClass(other, '9B')
    await importRoster(other, others, list('83,Ida,Berg,', '84,Per,Lund,per@example.org'))
    await importRoster(other, others, list('84,Per,Lund,other@example.org'))
    for (const by of ['slips', 'mail'] as const) await expect(giveAccounts(other, others, { studentIds, by })).rejects.toMatchObject({ code: 'password_there' })
    expect(await giveAccounts(other, others, { studentIds: studentIds.slice(1), by: 'mail' })).toEqual({ mailed: 1, slips: [] })
    expect(await db()('outbox_mails').pluck('to_address')).toEqual(['per@example.org'])
    expect((await giveAccounts(await anActor('admin'), others, { studentIds, by: 'slips' })).slips).toHaveLength(2)
  })

  it('never take over an address or a user name somebody else signs in with', async () => {
    const admin = await anActor('admin')
    await addPerson(admin, { givenName: 'Ada', familyName: 'Holm', email: 'ada@example.org', userName: '83', roles: ['admin'] })
    const { teacher, classId, studentIds } = await withStudents('83,Ida,Berg,ada@example.org')
    const { slips, mailed } = await giveAccounts(teacher, classId, { studentIds, by: 'mail' })
    expect([mailed, slips[0]?.userName]).toEqual([0, '83.2'])
  })

  it('are given only to students of the class, and not again to a disabled one', async () => {
    const { teacher, classId, studentIds } = await withStudents('83,Ida,Berg,')
    const stranger = await withStudents2()
    await expect(giveAccounts(teacher, classId, { studentIds: [...studentIds, stranger], by: 'slips' })).rejects.toMatchObject({ code: 'not_found' })
    await giveAccounts(teacher, classId, { studentIds, by: 'slips' })
    const { user_id: userId } = await db()('students').where({ id: studentIds[0] }).first<{ user_id: string }>()
    await disablePerson(await anActor('admin'), userId)
    expect(await giveAccounts(teacher, classId, { studentIds, by: 'slips' })).toEqual({ mailed: 0, slips: [] })
  })

  async function withStudents2(): Promise<string> {
    const other = await anActor('teacher')
    const classId = await aClass(other, '9B')
    await importRoster(other, classId, list('99,Noor,Haddad,'))
    return (await readClass(other, classId)).students[0]!.studentId
  }

  it('follow the list when a name or an address changes', async () => {
    const { teacher, classId, studentIds } = await withStudents('83,Ida,Berg,ida@example.org', '84,Per,Lund,')
    await giveAccounts(teacher, classId, { studentIds, by: 'mail' })
    await importRoster(teacher, classId, list('83,Ida,Berg-Lund,', '84,Per,Lund,per@example.org'))
    const accounts = await db()('users').join('user_roles', 'user_id', 'id').where({ role: 'student' }).orderBy('user_name').select('user_name', 'family_name', 'email')
    expect(accounts).toEqual([{ user_name: '83', family_name: 'Berg-Lund', email: null }, { user_name: '84', family_name: 'Lund', email: 'per@example.org' }])
  })
})
