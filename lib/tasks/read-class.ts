import { db } from '@/db/knex'
import { listTeachers } from '@/db/classes'
import { listStudentsOfClass } from '@/db/students'
import { listUsers } from '@/db/users'
import type { Actor } from '@/lib/core/actor'
import { gateClass } from './gate-class'

export type ClassStudent = Readonly<{
  studentId: string; candidateNumber: string; givenName: string; familyName: string; email: string | null
  /** Whether the student can sign in: `waiting` has an account and has not chosen a password yet. */
  account: 'none' | 'waiting' | 'ready' | 'disabled'
  signsInAs: string | null
}>
export type ClassView = Readonly<{
  classId: string; name: string; students: readonly ClassStudent[]
  teachers: readonly Readonly<{ userId: string; name: string }>[]
  /** Every teacher of the school, to choose from. */
  choices: readonly Readonly<{ userId: string; name: string }>[]
}>

/** A class with its teachers, its students and how each stands to an account. */
export async function readClass(actor: Actor, classId: string): Promise<ClassView> {
  const { name } = await gateClass(db(), actor, classId)
  const teachers = await listTeachers(db(), [classId])
  const choices = (await listUsers(db(), ['teacher'])).filter((user) => user.disabledAt === null)
  const accounts = new Map((await listUsers(db(), ['student'])).map((user) => [user.id, user]))
  const students = (await listStudentsOfClass(db(), classId)).map(({ id, userId, ...student }) => {
    const user = userId === null ? undefined : accounts.get(userId)
    const account = !user ? 'none' : user.disabledAt !== null ? 'disabled' : user.passwordHash === null ? 'waiting' : 'ready'
    return { studentId: id, candidateNumber: student.candidateNumber, givenName: student.givenName, familyName: student.familyName, email: student.email, account, signsInAs: user ? (user.email ?? user.userName) : null } as const
  })
  const named = (one: { givenName: string; familyName: string }) => `${one.givenName} ${one.familyName}`
  return {
    classId, name, students,
    teachers: teachers.map((one) => ({ userId: one.userId, name: named(one) })),
    choices: choices.map((one) => ({ userId: one.id, name: named(one) })),
  }
}
