'use client'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import { CodeDialog } from './code-dialog'
import { PersonDialog } from './person-dialog'
import type { PersonValues } from './person-fields'

type Person = PersonValues & Readonly<{ userId: string; disabled: boolean; hasPassword: boolean }>
type Acts = Readonly<{
  change: (userId: string, raw: unknown) => Promise<Outcome<void>>
  disable: (userId: string) => Promise<Outcome<void>>
  enable: (userId: string) => Promise<Outcome<void>>
  send: (userId: string) => Promise<Outcome<{ code: string | null }>>
}>
type PeopleTableProps = Readonly<{ people: readonly Person[]; self: string; acts: Acts }>

/** One line a person: who, how they sign in, what they may do, and the three things that can be done about it. */
export function PeopleTable({ people, self, acts }: PeopleTableProps) {
  const { busy, trouble, run } = useOutcome()
  const [changing, setChanging] = useState<Person | null>(null)
  const [code, setCode] = useState<{ name: string; code: string } | null>(null)
  const [said, setSaid] = useState('')

  function send(person: Person) {
    setSaid('')
    void run(acts.send(person.userId), ({ code: made }) => {
      if (made) setCode({ name: person.givenName, code: made })
      else setSaid(`A link is on its way to ${person.givenName} ${person.familyName}.`)
    })
  }
  return (
    <>
      <div className="mb-2" aria-live="polite">{trouble ? <Alarm code={trouble.code} detail={trouble.detail} /> : <p className="line">{said}</p>}</div>
      <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Accounts">
        <table className="tbl">
          <thead><tr><th>Name</th><th>Signs in as</th><th>Roles</th><th>Stands</th><th><span className="vh">What can be done</span></th></tr></thead>
          <tbody>
            {people.map((person) => (
              <tr key={person.userId}>
                <td className="whitespace-nowrap"><b className="font-semibold">{person.familyName}</b>, {person.givenName}{person.userId === self && <span className="soft"> (you)</span>}</td>
                <td className="break-words">{[person.email, person.userName].filter(Boolean).join(', ')}</td>
                <td>{person.roles.join(', ')}</td>
                <td className="whitespace-nowrap">{standing(person)}</td>
                <td className="pr-0 text-right whitespace-nowrap">
                  {!person.roles.includes('student') && <button className="btn plain" disabled={busy} aria-label={`Change ${person.givenName} ${person.familyName}`} onClick={() => setChanging(person)}>Change</button>}
                  {!person.disabled && <button className="btn plain ml-4" disabled={busy} aria-label={`${linkWords(person)} for ${person.givenName} ${person.familyName}`} onClick={() => send(person)}>{linkWords(person)}</button>}
                  <button className="btn plain ml-4" disabled={busy} aria-label={`${person.disabled ? 'Enable' : 'Disable'} ${person.givenName} ${person.familyName}`} onClick={() => void run(person.disabled ? acts.enable(person.userId) : acts.disable(person.userId), () => setSaid(''))}>{person.disabled ? 'Enable' : 'Disable'}</button>
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {changing && <PersonDialog title="Change a person" lead="Save" of={changing} save={(raw) => acts.change(changing.userId, raw)} onSaved={() => setChanging(null)} onClose={() => setChanging(null)} />}
      {code && <CodeDialog {...code} onClose={() => setCode(null)} />}
    </>
  )
}

function standing(person: Person): string {
  if (person.disabled) return 'disabled'
  return person.hasPassword ? 'can sign in' : 'invited, no password yet'
}

function linkWords(person: Person): string {
  if (person.email === null) return 'New code'
  return person.hasPassword ? 'Reset password' : 'Send invitation'
}
