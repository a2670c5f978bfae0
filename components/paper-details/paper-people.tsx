'use client'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { SelectField } from '@/components/ui/field'
import type { Outcome } from '@/lib/core/outcome'
import type { PaperDetailsView } from '@/lib/core/paper-details-view'

export type PeopleActs = Readonly<Record<'share' | 'stopSharing' | 'assign', (raw: unknown) => Promise<Outcome<unknown>>>>
type PaperPeopleProps = Readonly<{ view: PaperDetailsView; acts: PeopleActs }>
type Person = Readonly<{ userId: string; givenName: string; familyName: string }>
const sayName = ({ givenName, familyName }: Person) => `${givenName} ${familyName}`

/** Whose paper it is, and who marks what. */
export function PaperPeople({ view, acts }: PaperPeopleProps) {
  const [said, setSaid] = useState<Outcome<unknown> | null>(null)
  const { paperId, owners } = view
  const run = async (work: Promise<Outcome<unknown>>) => setSaid(await work)
  const markers = [...new Map(view.markers.map((marker) => [marker.userId, marker])).values()]
  return (
    <>
      <h3>Owners</h3>
      <p className="soft dense mb-2">Owners may do everything with this paper: set, scan, sort, mark and hand back.</p>
      <ul className="max-w-[44rem]">
        {owners.map((owner) => (
          <li key={owner.userId} className="flex min-h-9 items-center justify-between border-b border-rule">
            {sayName(owner)}{owners.length > 1 && <button type="button" className="btn plain" onClick={() => void run(acts.stopSharing({ paperId, userId: owner.userId }))} aria-label={`Stop sharing with ${sayName(owner)}`}>Stop sharing</button>}
          </li>
        ))}
      </ul>
      <AddPerson label="Share with" people={view.teachers.filter(({ userId }) => !owners.some((owner) => owner.userId === userId))} onAdd={(userId) => void run(acts.share({ paperId, userId }))} />
      <h3 className="mt-6">Markers</h3>
      {markers.length === 0 && <p className="soft dense">Nobody but the owners marks it.</p>}
      {markers.map((marker) => (
        <MarkerQuestions key={marker.userId} view={view} marker={marker} onAssign={(questionIds) => void run(acts.assign({ paperId, userId: marker.userId, questionIds }))} />
      ))}
      <AddPerson label="Let mark" people={view.allMarkers.filter(({ userId }) => !markers.some((marker) => marker.userId === userId))} onAdd={(userId) => void run(acts.assign({ paperId, userId, questionIds: null }))} />
      {said && !said.ok && <div className="mt-3"><Alarm code={said.code} detail={said.detail} /></div>}
    </>
  )
}

function AddPerson({ label, people, onAdd }: { label: string; people: readonly Person[]; onAdd: (userId: string) => void }) {
  const [chosen, setChosen] = useState('')
  if (people.length === 0) return null
  return (
    <form className="mt-3 flex items-end gap-4" onSubmit={(event) => { event.preventDefault(); onAdd(chosen); setChosen('') }}>
      <SelectField label={label} value={chosen} required onChange={(event) => setChosen(event.target.value)} className="w-64">
        <option value="">choose</option>
        {people.map((person) => <option key={person.userId} value={person.userId}>{sayName(person)}</option>)}
      </SelectField>
      <button className="btn">Add</button>
    </form>
  )
}

/** Every question, or some by their labels. */
function MarkerQuestions({ view, marker, onAssign }: { view: PaperDetailsView; marker: Person; onAssign: (questionIds: string[] | null) => void }) {
  const own = view.markers.filter(({ userId }) => userId === marker.userId)
  const all = own.some(({ questionId }) => questionId === null)
  const chosen = own.flatMap(({ questionId }) => (questionId ? [questionId] : []))
  const toggle = (id: string) => onAssign(chosen.includes(id) ? chosen.filter((each) => each !== id) : [...chosen, id])
  return (
    <fieldset className="max-w-[44rem] border-b border-rule py-2">
      <legend className="float-left w-48 leading-6">{sayName(marker)}</legend>
      <div className="flex flex-wrap items-center gap-x-4 gap-y-1">
        <label className="chk"><input type="checkbox" checked={all} onChange={() => onAssign(all ? view.questions.map(({ id }) => id) : null)} /> every question</label>
        {!all && view.questions.map(({ id, label }) => <label key={id} className="chk"><input type="checkbox" checked={chosen.includes(id)} onChange={() => toggle(id)} /> {label}</label>)}
        <button type="button" className="btn plain ml-auto" onClick={() => onAssign([])} aria-label={`${sayName(marker)} marks no more`}>Take out</button>
      </div>
    </fieldset>
  )
}
