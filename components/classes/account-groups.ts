import type { StudentRow } from './student-rows'

/** Whom accounts can be given to at once: those without first, then those who never came in, then all. Groups of nobody are left out. */
export function accountGroups(students: readonly StudentRow[]): { says: string; studentIds: string[] }[] {
  const [only, ...more] = students
  if (only && more.length === 0) return [{ says: `${only.givenName} ${only.familyName}`, studentIds: [only.studentId] }]
  const group = (says: string, members: readonly StudentRow[]) => ({ says: `${members.length} ${says}`, studentIds: members.map((one) => one.studentId) })
  const open = students.filter((one) => one.account !== 'disabled')
  const groups = [
    group('without an account', open.filter((one) => one.account === 'none')),
    group('who have not chosen a password yet', open.filter((one) => one.account === 'waiting')),
    group(open.length === students.length ? 'students, the whole class' : 'students, all but those disabled', open),
  ]
  return groups.filter(({ studentIds }, k) => studentIds.length > 0 && (k === 2 || studentIds.length < open.length))
}
