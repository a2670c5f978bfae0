'use client'
import { Download, FolderDown, MessageSquareText, Printer } from 'lucide-react'
import { Alarm } from '@/components/ui/alarm'
import { MarkFigure } from '@/components/ui/mark-figure'
import { sayTime } from '@/components/ui/say-time'
import { useOutcome } from '@/components/ui/use-outcome'
import { sayMark } from '@/lib/core/marks'
import type { HandBackView } from '@/lib/core/hand-back'
import type { HandBackActs } from './hand-back-screen'
import { stateWords } from './hand-back-words'
import styles from './hand-back.module.css'

/** Every student of the class set: what was handed back, whether they have read it, and their file. */
export function StudentTable({ view: { students, maximum, classSetId }, acts, again }: { view: HandBackView; acts: HandBackActs; again: () => Promise<void> }) {
  const { busy, trouble, run } = useOutcome()
  const out = students.some(({ returned }) => returned !== null)
  return (
    <section aria-label="Students" className="mb-10">
      <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-6">
        <h2>Students</h2>
        {out && (
          <p className="flex flex-wrap gap-x-5">
            <a className="inline-flex min-h-6 items-center gap-1" href={`/api/class-sets/${classSetId}/returned-zip`} download><FolderDown className="ic" aria-hidden />all files, one ZIP</a>
            <a className="inline-flex min-h-6 items-center gap-1" href={`/api/class-sets/${classSetId}/returned-pdf`} download title="Each script begins on a right-hand page"><Printer className="ic" aria-hidden />one PDF, to print on both sides</a>
          </p>
        )}
      </div>
      {trouble && <Alarm {...trouble} />}
      <div className={styles.scroll} tabIndex={0} role="region" aria-label="Students and their scripts">
        <table className={`tbl ${styles.students}`}>
          <thead><tr><th scope="col">student</th><th scope="col">total of {sayMark(maximum)}</th><th scope="col">grade</th><th scope="col">state</th>{out && <th scope="col">read by the student</th>}<th scope="col">files</th><th scope="col"><span className="vh">this one alone</span></th></tr></thead>
          <tbody>
            {students.map((student) => {
              const { key, name, candidateNumber, scriptNumber, total, grade, returned, changed, keptBack } = student
              return (
                <tr key={key}>
                  <th scope="row" className={styles.name}>{name} <span className="soft">{candidateNumber}</span></th>
                  <td>{total === null ? '–' : <MarkFigure mark={total} />}</td>
                  <td>{grade ?? '–'}</td>
                  <td className={returned && !changed ? undefined : changed ? styles.in : 'soft'}>{stateWords(student)}{returned && returned.revision > 1 ? `, revision ${returned.revision}` : ''}</td>
                  {out && <td className="soft">{returned ? (returned.firstReadAt ? sayTime(returned.firstReadAt) : 'not yet') : ''}</td>}
                  <td>
                    {returned && <a className="inline-flex min-h-6 items-center gap-1" href={`/api/returned/${returned.id}/pdf`} download><Download className="ic" aria-hidden />PDF<span className="vh"> of {name}</span></a>}
                    {scriptNumber !== null && <a className="ml-3 inline-flex min-h-6 items-center gap-1" href={`/api/scripts/${key}/annotated-pdf`} download title="For staff: the marking as annotations, each with who gave it and when"><MessageSquareText className="ic" aria-hidden />annotated<span className="vh"> copy of {name}, for staff</span></a>}
                  </td>
                  <td className="text-right">
                    {(!returned || changed) && keptBack === null && scriptNumber !== null && <button type="button" className="btn plain dense" disabled={busy} onClick={() => void run(acts.handBack(classSetId!, { scriptIds: [key] }), again)}>Hand back<span className="vh"> the script of {name} alone</span></button>}
                    {returned && <button type="button" className="btn plain dense" disabled={busy} onClick={() => void run(acts.withdrawOne(key), again)}>Take back<span className="vh"> the script of {name} alone</span></button>}
                  </td>
                </tr>
              )
            })}
          </tbody>
        </table>
      </div>
    </section>
  )
}
