import { db } from '@/db/knex'
import { listClassSetStudents } from '@/db/class-set-students'
import { setStudentUser } from '@/db/students'
import { addUser } from '@/db/users'
import { newId } from '@/lib/core/ids'
import { hashPassword } from '@/lib/infra/passwords'
import { demoPassword, demoStudents } from './demo-people'

/** Gives the demo's students of a class set their sign-in: the candidate number as user name. */
export async function addDemoStudents(classSetId: string): Promise<void> {
  const passwordHash = await hashPassword(demoPassword)
  for (const { studentId, candidateNumber, givenName, familyName } of await listClassSetStudents(db(), [classSetId])) {
    if (!demoStudents.some(({ userName }) => userName === candidateNumber)) continue
    const id = newId()
    await addUser(db(), { id, email: null, userName: candidateNumber, givenName, familyName, passwordHash, roles: ['student'] })
    await setStudentUser(db(), studentId, id)
  }
}
