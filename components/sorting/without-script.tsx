import type { SortStudent, SortingTable } from '@/lib/core/sorting'
import { fullName } from './sorting-words'
import style from './sorting.module.css'

type Attendance = SortStudent['attendance']

/** Students no script bears or is suggested for: expected still, absent, or excused. */
export function WithoutScript({ table, busy, onAttendance }: { table: SortingTable; busy: boolean; onAttendance: (student: SortStudent, attendance: Attendance) => void }) {
  const likely = new Set(table.scripts.flatMap(({ suggestedStudentId }) => suggestedStudentId ?? []))
  const without = table.students.filter(({ scriptId, studentId }) => scriptId === null && !likely.has(studentId))
  if (without.length === 0 || table.scripts.length === 0) return null
  const namesOpen = table.scripts.some(({ studentId }) => studentId === null)
  return (
    <section aria-label="Without a script">
      <h2>Without a script <small>{namesOpen ? 'may change while names are open' : `${without.length} of ${table.students.length}`}</small></h2>
      <table className={style.names}>
        <tbody>
          {without.map((student) => (
            <tr key={`${student.classSetId}/${student.studentId}`}>
              <td><b>{fullName(student)}</b> {student.candidateNumber}</td>
              <td className={style.go}>
                <span className={style.attend} role="radiogroup" aria-label={`${fullName(student)} ${student.candidateNumber}`}>
                  {(['expected', 'absent', 'excused'] as const).map((attendance) => (
                    <label key={attendance} className="chk"><input type="radio" name={`attendance-${student.classSetId}-${student.studentId}`} checked={student.attendance === attendance} disabled={busy} onChange={() => onAttendance(student, attendance)} /> {attendance}</label>
                  ))}
                </span>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  )
}
