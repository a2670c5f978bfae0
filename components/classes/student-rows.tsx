export type StudentRow = Readonly<{
  studentId: string; candidateNumber: string; givenName: string; familyName: string; email: string | null
  account: 'none' | 'waiting' | 'ready' | 'disabled'; signsInAs: string | null
}>
type StudentRowsProps = Readonly<{ students: readonly StudentRow[]; busy: boolean; onGive: (student: StudentRow) => void; onTakeOut: (student: StudentRow) => void }>

const says = { none: 'none', waiting: 'no password yet', ready: 'can sign in', disabled: 'disabled' }

/** One line a student. */
export function StudentRows({ students, busy, onGive, onTakeOut }: StudentRowsProps) {
  return (
    <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Students">
      <table className="tbl">
        <thead><tr><th>No.</th><th>Student</th><th>E-mail</th><th>Account</th><th><span className="vh">What can be done</span></th></tr></thead>
        <tbody>
          {students.map((student) => (
            <tr key={student.studentId}>
              <td>{student.candidateNumber}</td>
              <td className="whitespace-nowrap"><b className="font-semibold">{student.familyName}</b>, {student.givenName}</td>
              <td className="break-all">{student.email ?? <span className="soft">none</span>}</td>
              <td className="whitespace-nowrap">{says[student.account]}{student.signsInAs !== null && student.signsInAs !== student.email && <span className="soft">, as {student.signsInAs}</span>}</td>
              <td className="pr-0 text-right whitespace-nowrap">
                {student.account !== 'disabled' && <button className="btn plain" aria-label={`${student.account === 'none' ? 'Give account' : 'New link or slip'} to ${student.givenName} ${student.familyName}, ${student.candidateNumber}`} onClick={() => onGive(student)}>{student.account === 'none' ? 'Give account' : 'New link or slip'}</button>}
                <button className="btn plain ml-4" disabled={busy} aria-label={`Take out ${student.givenName} ${student.familyName}, ${student.candidateNumber}`} onClick={() => onTakeOut(student)}>Take out</button>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}
