import type { Role } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import type { Db } from './knex'

export type PaperPerson = Readonly<{ userId: string; givenName: string; familyName: string }>
const names = { userId: 'users.id', givenName: 'users.given_name', familyName: 'users.family_name' }

export async function listOwners(db: Db, paperId: string): Promise<PaperPerson[]> {
  return (await db('paper_owners').join('users', 'users.id', 'paper_owners.user_id').where({ paper_id: paperId }).orderBy('users.family_name').select(names)) as PaperPerson[]
}

export async function addOwner(db: Db, paperId: string, userId: string): Promise<void> {
  await db('paper_owners').insert({ paper_id: paperId, user_id: userId }).onConflict().ignore()
}

export async function dropOwner(db: Db, paperId: string, userId: string): Promise<void> {
  await db('paper_owners').where({ paper_id: paperId, user_id: userId }).delete()
}

/** No question means every question of the paper. */
export type PaperMarker = PaperPerson & Readonly<{ questionId: string | null }>

export async function listMarkers(db: Db, paperId: string): Promise<PaperMarker[]> {
  return (await db('paper_markers').join('users', 'users.id', 'paper_markers.user_id').where({ paper_id: paperId }).orderBy('users.family_name')
    .select({ ...names, questionId: 'paper_markers.question_id' })) as PaperMarker[]
}

/** Puts one marker's questions in place of those before; null every question, an empty list none. */
export async function setMarkerQuestions(db: Db, paperId: string, userId: string, questions: readonly string[] | null): Promise<void> {
  await db('paper_markers').where({ paper_id: paperId, user_id: userId }).delete()
  const rows = questions === null ? [null] : questions
  if (rows.length > 0) await db('paper_markers').insert(rows.map((questionId) => ({ id: newId(), paper_id: paperId, user_id: userId, question_id: questionId })))
}

/** People who can sign in and have the role, by family name. */
export async function listPeopleWith(db: Db, role: Role): Promise<PaperPerson[]> {
  return (await db('users').join('user_roles', 'user_roles.user_id', 'users.id').where({ 'user_roles.role': role }).whereNull('users.disabled_at').orderBy(['users.family_name', 'users.given_name']).select(names)) as PaperPerson[]
}
