'use client'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Dialog } from '@/components/ui/dialog'
import { Field } from '@/components/ui/field'
import { faultOf, useOutcome } from '@/components/ui/use-outcome'
import type { Signing } from './check-list'
import type { HandBackActs } from './hand-back-screen'
import { checkWords } from './hand-back-words'

type SignDialogProps = Readonly<{ signing: Signing; classSetId: string; signOff: HandBackActs['signOff']; onClose: () => void; onDone: () => Promise<void> }>

/** A reason in the person's own words, kept with their name. */
export function SignDialog({ signing: { check, lines }, classSetId, signOff, onClose, onDone }: SignDialogProps) {
  const [reason, setReason] = useState('')
  const { busy, trouble, run } = useOutcome()
  const keeps = check.closing === 'keep-back'
  const fault = faultOf(trouble, 'reason')
  return (
    <Dialog title={keeps ? `Keep back ${lines.length === 1 ? 'this script' : `${lines.length} scripts`}` : `Sign for ${checkWords[check.key].found(lines.length)}`} open onClose={onClose}>
      <form className="grid gap-3" onSubmit={(event) => { event.preventDefault(); void run(signOff({ classSetId, check: check.key, subjects: lines.map(({ subject }) => subject), reason }), onDone) }}>
        {lines.length === 1 && <p className="mt-2">{lines[0]!.says}</p>}
        <p className="soft">{keeps ? 'What has no sure name or not all its marks cannot go out. Kept back, it waits here while the others go.' : 'Your name, the time and your reason stay with this class set.'}</p>
        <Field label="Reason" name="reason" value={reason} onChange={(event) => setReason(event.target.value)} bad={fault} maxLength={300} autoFocus required />
        {trouble && !fault && <Alarm {...trouble} />}
        <div className="flex gap-3">
          <button type="submit" className="btn lead" disabled={busy}>{keeps ? 'Keep back' : 'Sign'}</button>
          <button type="button" className="btn" onClick={onClose}>Cancel</button>
        </div>
      </form>
    </Dialog>
  )
}
