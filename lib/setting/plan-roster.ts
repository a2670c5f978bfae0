import type { ErrorLine } from '@/lib/core/errors'
import type { Roster, RosterLine } from './read-roster'

/** A student the school's list has already. `ours`: of a class that whoever imports may change. */
export type KnownStudent = Readonly<{ id: string; candidateNumber: string; givenName: string; familyName: string; email: string | null; inClass: boolean; ours: boolean }>
export type RosterStep = RosterLine & Readonly<{ does: 'new' | 'changed' | 'joins' | 'unchanged'; studentId: string | null; was: string | null }>
export type RosterPlan = Readonly<{ steps: readonly RosterStep[]; faults: readonly ErrorLine[]; leftAlone: number }>

/**
 * What importing a list would do, line by line; the candidate number tells who is who. Students of the class that the file
 * does not name are left alone. A line that would change a student of somebody else's class is a fault.
 */
export function planRoster(roster: Roster, known: readonly KnownStudent[]): RosterPlan {
  const byNumber = new Map(known.map((student) => [student.candidateNumber, student]))
  const steps: RosterStep[] = []
  const faults = [...roster.faults]
  for (const line of roster.lines) {
    const student = byNumber.get(line.candidateNumber)
    const step = student ? stepFor(line, student, roster.hasEmails) : { ...line, does: 'new' as const, studentId: null, was: null }
    if (student && !student.ours && step.was !== null) faults.push({ path: `line ${line.line}`, says: `gives the candidate number ${line.candidateNumber}, which the school’s list has for someone else. Ask the admin.` })
    else steps.push(step)
  }
  const named = new Set(roster.lines.map((line) => line.candidateNumber))
  return { steps, faults, leftAlone: known.filter((student) => student.inClass && !named.has(student.candidateNumber)).length }
}

function stepFor(line: RosterLine, student: KnownStudent, hasEmails: boolean): RosterStep {
  const email = hasEmails ? line.email : student.email
  const differs = [
    (line.givenName !== student.givenName || line.familyName !== student.familyName) && `${student.givenName} ${student.familyName}`,
    email !== student.email && (student.email ?? 'no e-mail'),
  ].filter((part) => part !== false)
  const does = differs.length > 0 ? 'changed' : student.inClass ? 'unchanged' : 'joins'
  return { ...line, email, does, studentId: student.id, was: differs.join(', ') || null }
}
