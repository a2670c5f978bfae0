import { isTeacherOf, listClassesOfStudents } from '@/db/classes'
import { db, type Db } from '@/db/knex'
import { findStudentsByNumber, listStudentsOfClass, type Student } from '@/db/students'
import type { Actor } from '@/lib/core/actor'
import { planRoster, type KnownStudent, type RosterPlan } from '@/lib/setting/plan-roster'
import { readRoster } from '@/lib/setting/read-roster'
import { gateClass } from './gate-class'

/** The plan as its screen reads it. */
export type RosterCheck = RosterPlan

/** What importing this file would do, and each faulty line. Changes nothing. */
export async function checkRoster(actor: Actor, classId: string, bytes: Uint8Array): Promise<RosterCheck> {
  await gateClass(db(), actor, classId)
  return planFor(db(), actor, classId, bytes)
}

/** The plan as things stand now, in the transaction that carries it out. */
export async function planFor(db: Db, actor: Actor, classId: string, bytes: Uint8Array): Promise<RosterPlan> {
  const roster = readRoster(bytes)
  const inClass = await listStudentsOfClass(db, classId)
  const numbered = await findStudentsByNumber(db, roster.lines.map((line) => line.candidateNumber))
  const ours = await studentsOf(db, actor, numbered)
  const members = new Set(inClass.map(({ id }) => id))
  const known = new Map([...numbered, ...inClass].map((student) => [student.id, knownAs(student, members.has(student.id), ours)]))
  return planRoster(roster, [...known.values()])
}

function knownAs(student: Student, inClass: boolean, ours: ReadonlySet<string>): KnownStudent {
  return { ...student, inClass, ours: inClass || ours.has(student.id) }
}

/** Those whom the actor may change: anyone for an admin, else students of a class the actor teaches, or of no class. */
async function studentsOf(db: Db, actor: Actor, students: readonly Student[]): Promise<Set<string>> {
  if (actor.roles.includes('admin')) return new Set(students.map(({ id }) => id))
  const places = await listClassesOfStudents(db, students.map(({ id }) => id))
  const placed = new Set(places.map(({ studentId }) => studentId))
  const ours = new Set(students.filter(({ id }) => !placed.has(id)).map(({ id }) => id))
  for (const classId of new Set(places.map((place) => place.classId))) {
    if (await isTeacherOf(db, actor.userId, classId)) for (const place of places) if (place.classId === classId) ours.add(place.studentId)
  }
  return ours
}
