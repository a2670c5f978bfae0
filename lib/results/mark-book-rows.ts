import type { Attendance } from '@/lib/core/mark-book'

export type Student = Readonly<{ studentId: string; candidateNumber: string; givenName: string; familyName: string; attendance: Attendance }>
export type Script = Readonly<{ scriptId: string; position: number; studentId: string | null; suggestedStudentId: string | null }>
export type Pair = Readonly<{ student: Student | null; script: Script | null; named: boolean }>

const byName = new Intl.Collator('en', { sensitivity: 'base', numeric: true })

/** Students of a list by family name, given name and candidate number, the way a register is kept. */
function inRegisterOrder(a: Student, b: Student): number {
  return byName.compare(a.familyName, b.familyName) || byName.compare(a.givenName, b.givenName) || byName.compare(a.candidateNumber, b.candidateNumber)
}

/**
 * One row for each student of the list with their script: the confirmed one, else the first one suggested. A script left over
 * (its name open, or suggested for someone who has one) gets a row of its own at the end.
 */
export function pairRows(students: readonly Student[], scripts: readonly Script[]): Pair[] {
  const inOrder = [...scripts].sort((a, b) => a.position - b.position)
  const confirmed = new Map(inOrder.filter((script) => script.studentId).map((script) => [script.studentId, script]))
  const open = inOrder.filter((script) => !script.studentId)
  const used = new Set<string>()
  const rows = [...students].sort(inRegisterOrder).map((student): Pair => {
    const script = confirmed.get(student.studentId) ?? open.find((one) => one.suggestedStudentId === student.studentId && !used.has(one.scriptId)) ?? null
    if (script) used.add(script.scriptId)
    return { student, script, named: script?.studentId != null || script === null }
  })
  return [...rows, ...inOrder.filter(({ scriptId }) => !used.has(scriptId)).map((script): Pair => ({ student: null, script, named: false }))]
}
