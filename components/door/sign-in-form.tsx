'use client'
import Link from 'next/link'
import { signIn } from 'next-auth/react'
import { useState, type FormEvent } from 'react'
import { errorSentence } from '@/components/ui/error-sentence'
import { CoverLabel } from './cover-label'

/** The cover of the exercise book: name and password. */
export function SignInForm({ school, demo }: { school: string; demo: boolean }) {
  const [trouble, setTrouble] = useState<string | null>(null)
  const [busy, setBusy] = useState(false)

  async function enter(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    const form = new FormData(event.currentTarget)
    setBusy(true)
    setTrouble(null)
    const answer = await signIn('credentials', { redirect: false, account: form.get('account'), password: form.get('password') }).catch(() => null)
    if (answer?.ok) {
      window.location.assign('/')
      return
    }
    setBusy(false)
    setTrouble(answer?.error === 'too_many_attempts' ? errorSentence('too_many_attempts') : answer === null ? errorSentence('failed') : 'This name and password do not fit. Look at both and try again.')
  }

  return (
    <CoverLabel school={school} under={demo ? 'Demo school: the sign-ins are printed where it was started, and in the README.' : 'This machine belongs to the school. Nothing leaves it unless someone hands it back.'}>
      <form onSubmit={enter}>
        <div className="cover-field"><label htmlFor="account">Name</label><input id="account" name="account" autoComplete="username" required autoFocus /></div>
        <div className="cover-field"><label htmlFor="password">Password</label><input id="password" name="password" type="password" autoComplete="current-password" required /></div>
        <p role="alert" className="alarm dense mt-3 min-h-5">{trouble}</p>
        <div className="mt-3 flex items-center">
          <button className="btn lead" disabled={busy}>Sign in</button>
          <Link className="soft dense ml-auto" href="/new-password">No password yet</Link>
        </div>
      </form>
    </CoverLabel>
  )
}
