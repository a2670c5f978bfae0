'use client'
import { signIn } from 'next-auth/react'
import type { FormEvent } from 'react'
import { errorSentence } from '@/components/ui/error-sentence'
import { faultOf, useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import { CoverLabel } from './cover-label'

type FirstAdminProps = Readonly<{ school: string; begin: (raw: unknown) => Promise<Outcome<{ account: string }>> }>
const lines = [
  { name: 'code', label: 'Set-up code', say: 'Printed where Sheafmark was started' },
  { name: 'givenName', label: 'Given name', autoComplete: 'given-name' },
  { name: 'familyName', label: 'Family name', autoComplete: 'family-name' },
  { name: 'email', label: 'E-mail', type: 'email', autoComplete: 'username' },
  { name: 'password', label: 'Password', type: 'password', autoComplete: 'new-password', say: 'At least 10 characters. Three words you remember are good.' },
]

/** The cover of an empty school: whoever started it makes the first account. */
export function FirstAdmin({ school, begin }: FirstAdminProps) {
  const { busy, trouble, run } = useOutcome()

  function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    const form = Object.fromEntries(new FormData(event.currentTarget))
    void run(begin(form), async ({ account }) => {
      await signIn('credentials', { redirect: false, account, password: form.password })
      window.location.assign('/people')
    })
  }
  return (
    <CoverLabel school={school} under="The first admin adds the staff and the classes. This page closes once the account is made.">
      <h2 className="text-center">The first admin</h2>
      <form onSubmit={submit}>
        {lines.map(({ name, label, say, ...input }) => {
          const says = faultOf(trouble, name) ?? say
          return (
            <div key={name}>
              <div className="cover-field grid-cols-[6.5rem_1fr]"><label htmlFor={name}>{label}</label><input id={name} name={name} required aria-invalid={faultOf(trouble, name) !== null || undefined} aria-describedby={says ? `${name}-say` : undefined} {...input} /></div>
              {says && <p id={`${name}-say`} className={`${faultOf(trouble, name) ? 'alarm' : 'soft'} mt-1 text-[length:var(--t-0)] leading-4`}>{says}</p>}
            </div>
          )
        })}
        {trouble && <p role="alert" className="alarm dense mt-3">{errorSentence(trouble.code, trouble.detail)}</p>}
        <button className="btn lead mt-5" disabled={busy}>Make this account</button>
      </form>
    </CoverLabel>
  )
}
