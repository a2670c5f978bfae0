'use client'
import type { FormEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Dialog } from '@/components/ui/dialog'
import { Field } from '@/components/ui/field'
import { faultOf, useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'

type NameDialogProps<T> = Readonly<{ title: string; lead: string; name?: string; save: (raw: unknown) => Promise<Outcome<T>>; onSaved: (value: T) => void; onClose: () => void }>

/** The name of a class, new or changed. */
export function NameDialog<T>({ title, lead, name, save, onSaved, onClose }: NameDialogProps<T>) {
  const { busy, trouble, run } = useOutcome()
  const taken = trouble?.code === 'already_there' ? 'Another class has this name.' : null
  function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    void run(save({ name: new FormData(event.currentTarget).get('name') }), onSaved)
  }
  return (
    <Dialog title={title} open onClose={onClose}>
      <form onSubmit={submit} className="mt-3 grid w-[20rem] max-w-full gap-4">
        <Field label="Name" name="name" defaultValue={name} maxLength={40} required autoFocus bad={taken ?? faultOf(trouble, 'name')} say="As the school says it: 8K, 11A" />
        {trouble && !taken && <Alarm code={trouble.code} />}
        <div className="flex gap-3"><button className="btn lead" disabled={busy}>{lead}</button><button type="button" className="btn" onClick={onClose}>Not now</button></div>
      </form>
    </Dialog>
  )
}
