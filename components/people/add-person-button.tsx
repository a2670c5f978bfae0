'use client'
import { useState } from 'react'
import type { Outcome } from '@/lib/core/outcome'
import { CodeDialog } from './code-dialog'
import { PersonDialog } from './person-dialog'

type AddPersonButtonProps = Readonly<{ add: (raw: unknown) => Promise<Outcome<{ code: string | null }>> }>

export function AddPersonButton({ add }: AddPersonButtonProps) {
  const [open, setOpen] = useState(false)
  const [code, setCode] = useState<string | null>(null)
  return (
    <>
      <button className="btn lead" onClick={() => setOpen(true)}>Add a person</button>
      {open && <PersonDialog title="Add a person" lead="Add" save={add} onClose={() => setOpen(false)} onSaved={(made) => { setOpen(false); setCode(made.code) }} />}
      {code && <CodeDialog name="this person" code={code} onClose={() => setCode(null)} />}
    </>
  )
}
