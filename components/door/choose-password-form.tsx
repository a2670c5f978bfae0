'use client'
import Link from 'next/link'
import { useState, type FormEvent } from 'react'
import { errorSentence } from '@/components/ui/error-sentence'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import { CoverLabel } from './cover-label'

type ChoosePasswordFormProps = Readonly<{ school: string; token: string; givenName: string; account: string; choose: (raw: unknown) => Promise<Outcome<void>> }>

/** Sets a password by a one-time link; signing in comes after, with the new password. */
export function ChoosePasswordForm({ school, token, givenName, account, choose }: ChoosePasswordFormProps) {
  const { busy, trouble, run } = useOutcome()
  const [done, setDone] = useState(false)

  function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    void run(choose({ token, password: new FormData(event.currentTarget).get('password') }), () => setDone(true))
  }
  if (done) {
    return (
      <CoverLabel school={school}>
        <p role="status">Your password is set. Your name for signing in is <b className="font-semibold break-all">{account}</b>.</p>
        <Link className="btn lead mt-5" href="/sign-in">Sign in</Link>
      </CoverLabel>
    )
  }
  return (
    <CoverLabel school={school} under="This link works once. Whoever was signed in to this account is signed out.">
      <h2 className="text-center">{givenName}, choose a password</h2>
      <form onSubmit={submit}>
        <div className="cover-field"><label htmlFor="account">Name</label><input id="account" name="account" value={account} readOnly autoComplete="username" /></div>
        <div className="cover-field"><label htmlFor="password">Password</label><input id="password" name="password" type="password" autoComplete="new-password" required autoFocus aria-describedby="password-say" /></div>
        <p id="password-say" className="soft mt-1 text-[length:var(--t-0)] leading-4">At least 10 characters. Three words you remember are good.</p>
        {trouble && <p role="alert" className="alarm dense mt-3">{errorSentence(trouble.code, trouble.detail)}</p>}
        <button className="btn lead mt-5" disabled={busy}>Set this password</button>
      </form>
    </CoverLabel>
  )
}
