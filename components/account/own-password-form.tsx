'use client'
import { signIn } from 'next-auth/react'
import { useState, type FormEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Field } from '@/components/ui/field'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'

type OwnPasswordFormProps = Readonly<{ change: (raw: unknown) => Promise<Outcome<{ account: string }>> }>

/** The old password, then the new one. Every other session ends; this one signs in again by itself. */
export function OwnPasswordForm({ change }: OwnPasswordFormProps) {
  const { busy, trouble, run } = useOutcome()
  const [done, setDone] = useState(false)

  function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    const form = event.currentTarget
    const { old, password } = Object.fromEntries(new FormData(form)) as Record<string, string>
    setDone(false)
    void run(change({ old, password }), async ({ account }) => {
      await signIn('credentials', { redirect: false, account, password })
      form.reset()
      setDone(true)
    })
  }
  return (
    <form onSubmit={submit} className="grid max-w-[22rem] gap-3">
      <Field label="Your password now" name="old" type="password" autoComplete="current-password" required />
      <Field label="The new one" name="password" type="password" autoComplete="new-password" required say="At least 10 characters. Three words you remember are good." />
      {trouble && <Alarm code={trouble.code} detail={trouble.detail} />}
      {done && <p role="status" className="line">Changed. Everywhere else you have been signed out.</p>}
      <div><button className="btn lead" disabled={busy}>Change password</button></div>
    </form>
  )
}
