'use client'
import type { FormEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Dialog } from '@/components/ui/dialog'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import type { Teacher } from './class-head'

type TeachersDialogProps = Readonly<{ teachers: readonly Teacher[]; choices: readonly Teacher[]; save: (userIds: readonly string[]) => Promise<Outcome<void>>; onClose: () => void }>

/** Who teaches a class, out of the school's teachers. */
export function TeachersDialog({ teachers, choices, save, onClose }: TeachersDialogProps) {
  const { busy, trouble, run } = useOutcome()
  const chosen = new Set(teachers.map((one) => one.userId))
  const all = [...choices, ...teachers.filter((one) => !choices.some((choice) => choice.userId === one.userId))]
  function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    void run(save(new FormData(event.currentTarget).getAll('teacher').map(String)), onClose)
  }
  return (
    <Dialog title="Who teaches this class" open onClose={onClose}>
      <form onSubmit={submit} className="mt-3 grid w-[20rem] max-w-full gap-4">
        <div className="grid max-h-[50vh] gap-1 overflow-y-auto">
          {all.map((one) => <label key={one.userId} className="chk"><input type="checkbox" name="teacher" value={one.userId} defaultChecked={chosen.has(one.userId)} /> {one.name}</label>)}
        </div>
        <p className="soft dense">Who is ticked sees this class and may change it. Taking yourself out shuts it to you.</p>
        {trouble && <Alarm code={trouble.code} detail={trouble.detail} />}
        <div className="flex gap-3"><button className="btn lead" disabled={busy}>Save</button><button type="button" className="btn" onClick={onClose}>Not now</button></div>
      </form>
    </Dialog>
  )
}
