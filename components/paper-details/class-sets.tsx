'use client'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Field, SelectField } from '@/components/ui/field'
import type { Outcome } from '@/lib/core/outcome'
import type { ClassSetView, PaperDetailsView, SetStudentView } from '@/lib/core/paper-details-view'
import { sayDate } from '@/components/paper/say-date'

export type ClassSetActs = Readonly<Record<'addSet' | 'removeSet' | 'renewSet' | 'setAttendance', (raw: unknown) => Promise<Outcome<unknown>>>>
type ClassSetsProps = Readonly<{ view: PaperDetailsView; acts: ClassSetActs; today: string }>

/** Which classes sat the paper and when, with each list as it stood. */
export function ClassSets({ view, acts, today }: ClassSetsProps) {
  const [said, setSaid] = useState<Outcome<unknown> | null>(null)
  const run = async (work: Promise<Outcome<unknown>>) => setSaid(await work)
  return (
    <>
      {view.classSets.length === 0 && <p className="soft mb-3">No class sits it yet.</p>}
      {view.classSets.map((set) => (
        <details key={set.id} className="border-b border-rule py-2">
          <summary className="cursor-pointer leading-6">
            <b className="font-medium">{set.className}</b>, {sayDate(set.satOn)} <span className="soft">{set.students} {set.students === 1 ? 'student' : 'students'}{set.absent > 0 && `, ${set.absent} away`}{set.scripts > 0 && `, ${set.scripts} ${set.scripts === 1 ? 'script' : 'scripts'}`}{resits(set, view)}</span>
          </summary>
          <StudentTable set={set} onSet={(student, attendance) => void run(acts.setAttendance({ classSetId: set.id, studentId: student.studentId, attendance }))} />
          <p className="flex flex-wrap gap-3 pt-3 pb-2">
            <button type="button" className="btn" onClick={() => void run(acts.renewSet({ classSetId: set.id }))}>Add who joined the class since</button>
            {set.scripts === 0 && <button type="button" className="btn" onClick={() => void run(acts.removeSet({ paperId: view.paperId, classSetId: set.id }))}>Take this class out</button>}
          </p>
        </details>
      ))}
      {said && !said.ok && <div className="mt-3"><Alarm code={said.code} detail={said.detail} /></div>}
      <AddSet view={view} today={today} onAdd={(input) => void run(acts.addSet({ paperId: view.paperId, ...input }))} />
    </>
  )
}

function resits({ resitOf }: ClassSetView, { classSets }: PaperDetailsView): string {
  const first = classSets.find(({ id }) => id === resitOf)
  return first ? `, re-sits ${first.className} of ${sayDate(first.satOn)}` : ''
}

type StudentTableProps = Readonly<{ set: ClassSetView; onSet: (student: SetStudentView, attendance: string) => void }>

function StudentTable({ set, onSet }: StudentTableProps) {
  return (
    <table className="tbl mt-2 max-w-[44rem]">
      <caption className="vh">{set.className} as its list stood</caption>
      <thead><tr><th scope="col">Number</th><th scope="col">Name</th><th scope="col">That day</th></tr></thead>
      <tbody>
        {set.list.map((student) => (
          <tr key={student.studentId}>
            <td>{student.candidateNumber}</td>
            <td>{student.givenName} {student.familyName}</td>
            <td>{student.scriptId ? 'has a script' : (
              <select aria-label={`${student.givenName} ${student.familyName} that day`} value={student.attendance} onChange={(event) => onSet(student, event.target.value)} className="min-h-6 border border-rule-2 bg-paper">
                <option value="expected">expected</option><option value="absent">absent</option><option value="excused">excused</option>
              </select>
            )}</td>
          </tr>
        ))}
      </tbody>
    </table>
  )
}

function AddSet({ view, today, onAdd }: { view: PaperDetailsView; today: string; onAdd: (input: { classId: string; satOn: string; resitOf: string | null }) => void }) {
  const [classId, setClassId] = useState('')
  const [satOn, setSatOn] = useState(today)
  const [resitOf, setResitOf] = useState('')
  if (view.classes.length === 0) return null
  return (
    <form className="mt-4 flex flex-wrap items-end gap-4" onSubmit={(event) => { event.preventDefault(); onAdd({ classId, satOn, resitOf: resitOf || null }); setClassId('') }}>
      <SelectField label="Another class" value={classId} required onChange={(event) => setClassId(event.target.value)} className="w-44">
        <option value="">choose</option>
        {view.classes.map(({ id, name }) => <option key={id} value={id}>{name}</option>)}
      </SelectField>
      <Field label="Date" type="date" value={satOn} required onChange={(event) => setSatOn(event.target.value)} className="w-44" />
      {view.classSets.length > 0 && (
        <SelectField label="Re-sits" value={resitOf} onChange={(event) => setResitOf(event.target.value)} className="w-56">
          <option value="">nothing</option>
          {view.classSets.map((set) => <option key={set.id} value={set.id}>{set.className}, {sayDate(set.satOn)}</option>)}
        </SelectField>
      )}
      <button className="btn">Add</button>
    </form>
  )
}
