import type { LeafStub, SortScript, SortStudent, SortingTable } from '@/lib/core/sorting'
import { fullName, whose } from './sorting-words'
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

type ScriptsProps = Readonly<{ table: SortingTable; busy: boolean; onLook: (leafId: string, script: SortScript) => void; onOther: (script: SortScript) => void; onUnname: (script: SortScript) => void }>

/** Every script with its pages: a page can be looked at and taken out, a name changed. */
export function AllScripts({ table, busy, onLook, onOther, onUnname }: ScriptsProps) {
  if (table.scripts.length === 0) return null
  const lacking = table.scripts.filter(({ missing }) => missing.length > 0).length
  return (
    <details className={style.fold}>
      <summary>All scripts <small>{table.scripts.length}{lacking > 0 ? `, ${lacking} with a page missing` : ''}</small></summary>
      <table className={style.names}>
        <tbody>
          {table.scripts.map((script) => {
            const known = whose(script, table)
            return (
              <tr key={script.id}>
                <td>{script.number}</td>
                <td>{script.studentId ? <><b>{known.name}</b> {known.number}</> : <span className="soft">{known.number ? `perhaps ${known.name}` : 'no name yet'}</span>}{script.missing.length > 0 && <span className={style.why}>page {script.missing.join(', ')} missing</span>}</td>
                <td><span className={style.attend}>{script.pages.map((page, k) => page.leafId && <button key={page.id} type="button" className={style.act} onClick={() => onLook(page.leafId!, script)} aria-label={`Look at ${page.paperPage ? `page ${page.paperPage}` : 'the extra page'} of script ${script.number}`}>{page.paperPage ? `page ${page.paperPage}` : `extra ${k + 1 - script.pages.filter(({ paperPage }) => paperPage !== null).length}`}</button>)}</span></td>
                <td className={style.go}>{script.studentId && <span className={style.attend}><button type="button" className={style.act} disabled={busy} onClick={() => onOther(script)}>other name</button> <button type="button" className={style.act} disabled={busy} onClick={() => onUnname(script)}>no name</button></span>}</td>
              </tr>
            )
          })}
        </tbody>
      </table>
    </details>
  )
}

/** Leaves that are kept but not used; each can come back to the table. */
export function KeptLeaves({ title, says, leaves, busy, onBack }: { title: string; says: string; leaves: readonly LeafStub[]; busy: boolean; onBack: (leaf: LeafStub) => void }) {
  if (leaves.length === 0) return null
  return (
    <details className={style.fold}>
      <summary>{title} <small>{leaves.length}, {says}</small></summary>
      <div className={style.stubs}>
        {leaves.map((leaf) => (
          <figure key={leaf.id}>
            <img src={`/api/leaves/${leaf.id}/picture?width=240&turn=${leaf.turn}`} alt={`leaf ${leaf.number} of ${leaf.sheafName}`} loading="lazy" />
            <figcaption className="dense">leaf {leaf.number} <button type="button" className={style.act} disabled={busy} onClick={() => onBack(leaf)} aria-label={`Bring leaf ${leaf.number} back`}>bring back</button></figcaption>
          </figure>
        ))}
      </div>
    </details>
  )
}
