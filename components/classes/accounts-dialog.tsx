'use client'
import type { FormEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Dialog } from '@/components/ui/dialog'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import type { Slip } from './slip-list'

export type Given = Readonly<{ mailed: number; slips: readonly Slip[] }>
type Group = Readonly<{ says: string; studentIds: readonly string[] }>
type AccountsDialogProps = Readonly<{ groups: readonly Group[]; give: (raw: unknown) => Promise<Outcome<Given>>; onGiven: (given: Given) => void; onClose: () => void }>

/** Whom to give a way in, and how it reaches them. */
export function AccountsDialog({ groups, give, onGiven, onClose }: AccountsDialogProps) {
  const { busy, trouble, run } = useOutcome()
  function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    const data = new FormData(event.currentTarget)
    void run(give({ studentIds: groups[Number(data.get('group'))]?.studentIds ?? [], by: data.get('by') }), onGiven)
  }
  return (
    <Dialog title="Accounts" open onClose={onClose}>
      <form onSubmit={submit} className="mt-3 grid w-[28rem] max-w-full gap-4">
        <fieldset className="m-0 grid gap-1 border-0 p-0">
          <legend className="mb-1 p-0 text-[length:var(--t-1)] leading-5 font-medium">For</legend>
          {groups.map((group, k) => <label key={group.says} className="chk"><input type="radio" name="group" value={k} defaultChecked={k === 0} /> {group.says}</label>)}
        </fieldset>
        <fieldset className="m-0 grid gap-1 border-0 p-0">
          <legend className="mb-1 p-0 text-[length:var(--t-1)] leading-5 font-medium">They get</legend>
          <label className="chk items-start"><input type="radio" name="by" value="mail" defaultChecked className="mt-[.1875rem]" /> <span>a link by e-mail; a slip to print for whoever has no address of their own</span></label>
          <label className="chk"><input type="radio" name="by" value="slips" /> a slip to print, everyone</label>
        </fieldset>
        <p className="soft dense">An older link or slip of theirs stops working. A password they have already goes on working until they choose another.</p>
        {trouble && <Alarm code={trouble.code} detail={trouble.detail} />}
        <div className="flex gap-3"><button className="btn lead" disabled={busy}>Give them out</button><button type="button" className="btn" onClick={onClose}>Not now</button></div>
      </form>
    </Dialog>
  )
}
