'use client'
import { useState } from 'react'
import type { Outcome } from '@/lib/core/outcome'
import { NameDialog } from './name-dialog'
import { TeachersDialog } from './teachers-dialog'

export type Teacher = Readonly<{ userId: string; name: string }>
type ClassHeadProps = Readonly<{
  name: string; teachers: readonly Teacher[]; choices: readonly Teacher[]
  rename: (raw: unknown) => Promise<Outcome<void>>; setTeachers: (userIds: readonly string[]) => Promise<Outcome<void>>
}>

/** The class by name, and who teaches it. */
export function ClassHead({ name, teachers, choices, rename, setTeachers }: ClassHeadProps) {
  const [open, setOpen] = useState<'name' | 'teachers' | null>(null)
  const close = () => setOpen(null)
  return (
    <>
      <div className="flex items-baseline gap-3"><h1>{name}</h1><button className="btn plain" onClick={() => setOpen('name')}>Rename</button></div>
      <p className="flex flex-wrap items-baseline gap-x-3"><span className="soft">{teachers.length > 0 ? `taught by ${teachers.map((one) => one.name).join(', ')}` : 'nobody teaches it yet'}</span><button className="btn plain" onClick={() => setOpen('teachers')}>Change teachers</button></p>
      {open === 'name' && <NameDialog title="Rename the class" lead="Rename" name={name} save={rename} onSaved={close} onClose={close} />}
      {open === 'teachers' && <TeachersDialog teachers={teachers} choices={choices} save={setTeachers} onClose={close} />}
    </>
  )
}
