'use client'
import { useRouter } from 'next/navigation'
import { useState } from 'react'
import type { Outcome } from '@/lib/core/outcome'
import { NameDialog } from './name-dialog'

export function AddClassButton({ add }: { add: (raw: unknown) => Promise<Outcome<{ classId: string }>> }) {
  const [open, setOpen] = useState(false)
  const router = useRouter()
  return (
    <>
      <button className="btn lead" onClick={() => setOpen(true)}>Add a class</button>
      {open && <NameDialog title="Add a class" lead="Add" save={add} onSaved={({ classId }) => router.push(`/classes/${classId}`)} onClose={() => setOpen(false)} />}
    </>
  )
}
