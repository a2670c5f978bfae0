import { AppError } from './errors'

export const roles = ['teacher', 'marker', 'moderator', 'student', 'admin'] as const
export type Role = (typeof roles)[number]

/** Who asks. Read from the database on every request: a role in a cookie is never believed. */
export type Actor = Readonly<{
  userId: string
  givenName: string
  familyName: string
  roles: readonly Role[]
  /** The row of the school's list this account belongs to, for students. */
  studentId: string | null
}>

/** How an actor stands to one paper. */
export type PaperStanding = Readonly<{ owner: boolean; marks: 'all' | readonly string[]; moderates: boolean }>

export const noStanding: PaperStanding = { owner: false, marks: [], moderates: false }

/** Acts that need no object: the role alone decides. */
export type SchoolAct = 'people' | 'classes' | 'audit' | 'outbox' | 'new-paper' | 'staff'
/** Acts on one paper. `mark` also asks for the question. */
export type PaperAct = 'see' | 'change' | 'mark' | 'second-mark' | 'agree'

/** Whether a role allows an act that belongs to the school as a whole. */
export function maySchool(actor: Actor, act: SchoolAct): boolean {
  if (act === 'new-paper') return actor.roles.includes('teacher')
  if (act === 'staff') return actor.roles.some((role) => role !== 'student')
  if (act === 'classes') return actor.roles.includes('admin') || actor.roles.includes('teacher')
  return actor.roles.includes('admin')
}

/** Throws not_allowed when the role does not allow the act. */
export function assertMaySchool(actor: Actor, act: SchoolAct): void {
  if (!maySchool(actor, act)) throw new AppError('not_allowed')
}

/** A standing as far as a person's roles carry it: who is no teacher any more owns nothing, whatever was written down before. */
export function carriedStanding({ roles }: Pick<Actor, 'roles'>, { owner, marks, moderates }: PaperStanding): PaperStanding {
  return { owner: owner && roles.includes('teacher'), marks: roles.includes('marker') ? marks : [], moderates: moderates && roles.includes('moderator') }
}

/** Role AND standing. An admin sees no marks by default; a student stands to no paper, only to what was handed back. */
export function mayOnPaper(actor: Actor, act: PaperAct, standing: PaperStanding, questionId?: string): boolean {
  const { owner, marks, moderates } = carriedStanding(actor, standing)
  const marksThis = marks === 'all' || (questionId !== undefined && marks.includes(questionId))
  switch (act) {
    case 'see':
      return owner || marks.length > 0 || moderates
    case 'change':
      return owner
    case 'mark':
      return owner || marksThis
    case 'second-mark':
      return moderates
    case 'agree':
      return owner || moderates
  }
}

/** Throws not_found to whom the paper does not concern at all, not_allowed to whom it does but not this far. */
export function assertMayOnPaper(actor: Actor, act: PaperAct, standing: PaperStanding, questionId?: string): void {
  if (mayOnPaper(actor, act, standing, questionId)) return
  throw new AppError(mayOnPaper(actor, 'see', standing) ? 'not_allowed' : 'not_found')
}
