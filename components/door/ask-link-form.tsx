'use client'
import Link from 'next/link'
import { useRouter } from 'next/navigation'
import { useState, type FormEvent } from 'react'
import { errorSentence } from '@/components/ui/error-sentence'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import { CoverLabel } from './cover-label'

type AskLinkFormProps = Readonly<{ school: string; ask: (raw: unknown) => Promise<Outcome<void>> }>

/** Asks for a link by e-mail, or takes the code of a printed slip. */
export function AskLinkForm({ school, ask }: AskLinkFormProps) {
  const { busy, trouble, run } = useOutcome()
  const [asked, setAsked] = useState(false)
  const router = useRouter()

  function send(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    void run(ask({ account: new FormData(event.currentTarget).get('account') }), () => setAsked(true))
  }
  function open(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    router.push(`/new-password/${encodeURIComponent(String(new FormData(event.currentTarget).get('code')).trim())}`)
  }

  return (
    <CoverLabel school={school} under="No e-mail and no slip? A teacher of your class, or the school’s admin, can give you a new one.">
      <h2 className="text-center">A new password</h2>
      {asked ? <p role="status" className="mt-4">If this account has an e-mail address here, a link is on its way to it.</p> : (
        <form onSubmit={send}>
          <div className="cover-field"><label htmlFor="account">Name</label><input id="account" name="account" autoComplete="username" required autoFocus aria-describedby="account-say" /></div>
          <p id="account-say" className="soft mt-1 text-[length:var(--t-0)] leading-4">Your e-mail address or user name</p>
          {trouble && <p role="alert" className="alarm dense mt-3">{errorSentence(trouble.code, trouble.detail)}</p>}
          <button className="btn lead mt-4" disabled={busy}>Send me a link</button>
        </form>
      )}
      <form onSubmit={open} className="mt-6 border-t border-rule pt-2">
        <div className="cover-field"><label htmlFor="code">Code</label><input id="code" name="code" autoComplete="one-time-code" autoCapitalize="characters" spellCheck={false} required aria-describedby="code-say" /></div>
        <p id="code-say" className="soft mt-1 text-[length:var(--t-0)] leading-4">From the slip you were given</p>
        <div className="mt-4 flex items-center"><button className="btn">Use this code</button><Link className="soft dense ml-auto" href="/sign-in">Sign in</Link></div>
      </form>
    </CoverLabel>
  )
}
