'use client'
import { useState, type FormEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Dialog } from '@/components/ui/dialog'
import { Field } from '@/components/ui/field'
import type { Outcome } from '@/lib/core/outcome'

type WithdrawDialogProps = Readonly<{
  title: string
  /** Only a question may give everyone full marks instead. */
  choice: boolean
  onClose: () => void
  withdraw: (given: { as: 'out' | 'full'; reason: string }) => Promise<Outcome<void>>
}>

/** Withdrawing needs a reason: it is kept, and so are the marks. */
export function WithdrawDialog({ title, choice, onClose, withdraw }: WithdrawDialogProps) {
  const [as, setAs] = useState<'out' | 'full'>('out')
  const [reason, setReason] = useState('')
  const [refused, setRefused] = useState<Extract<Outcome<void>, { ok: false }> | null>(null)
  async function submit(event: FormEvent) {
    event.preventDefault()
    const answer = await withdraw({ as, reason: reason.trim() })
    if (answer.ok) onClose()
    else setRefused(answer)
  }
  return (
    <Dialog title={title} open onClose={onClose}>
      <form onSubmit={(event) => void submit(event)} className="mt-3 grid w-[30rem] max-w-full gap-4">
        <p className="soft">Marks that were given stay on the scripts, and it can come back.</p>
        {choice && (
          <fieldset className="grid gap-1">
            <legend className="vh">What becomes of its marks</legend>
            <label className="chk"><input type="radio" name="as" checked={as === 'out'} onChange={() => setAs('out')} /> Leave it out of every total</label>
            <label className="chk"><input type="radio" name="as" checked={as === 'full'} onChange={() => setAs('full')} /> Give everyone full marks for it</label>
          </fieldset>
        )}
        <Field label="Why" value={reason} onChange={(event) => setReason(event.target.value)} maxLength={300} minLength={3} required say="For example: misprint, not taught yet" />
        {refused && <Alarm code={refused.code} detail={refused.detail} />}
        <div className="flex justify-end gap-3"><button type="button" className="btn" onClick={onClose}>Leave it</button><button className="btn lead">Withdraw</button></div>
      </form>
    </Dialog>
  )
}
