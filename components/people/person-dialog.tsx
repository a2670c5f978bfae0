'use client'
import type { FormEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Dialog } from '@/components/ui/dialog'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import { PersonFields, personOf, type PersonValues } from './person-fields'

type PersonDialogProps<T> = Readonly<{ title: string; lead: string; of?: PersonValues; save: (raw: unknown) => Promise<Outcome<T>>; onSaved: (value: T) => void; onClose: () => void }>

/** Writes a person down, or changes what is written. */
export function PersonDialog<T>({ title, lead, of, save, onSaved, onClose }: PersonDialogProps<T>) {
  const { busy, trouble, run } = useOutcome()
  function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    void run(save(personOf(event.currentTarget)), onSaved)
  }
  return (
    <Dialog title={title} open onClose={onClose}>
      <form onSubmit={submit} className="mt-3 grid w-[28rem] max-w-full gap-4" noValidate>
        <PersonFields of={of} trouble={trouble} />
        {trouble && <Alarm code={trouble.code} />}
        <div className="flex gap-3"><button className="btn lead" disabled={busy}>{lead}</button><button type="button" className="btn" onClick={onClose}>Not now</button></div>
      </form>
    </Dialog>
  )
}
