'use client'
import { useRouter } from 'next/navigation'
import { useState, type ChangeEvent, type FormEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Field, SelectField } from '@/components/ui/field'
import type { ErrorCode, ErrorDetail } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { ClassDates, type ClassDate } from './class-dates'

type NewPaperFormProps = Readonly<{ classes: readonly Readonly<{ id: string; name: string; students: number }>[]; today: string }>

/** Title, classes and dates, the blank paper; or a paper.json and its PDF, which bring their title and scheme. */
export function NewPaperForm({ classes, today }: NewPaperFormProps) {
  const router = useRouter()
  const [id] = useState(newId)
  const [title, setTitle] = useState('')
  const [step, setStep] = useState<1 | 2>(1)
  const [sets, setSets] = useState<readonly ClassDate[]>([])
  const [blank, setBlank] = useState<File | null>(null)
  const [paper, setPaper] = useState<File | null>(null)
  const [busy, setBusy] = useState(false)
  const [refused, setRefused] = useState<{ code: ErrorCode | 'failed'; detail: ErrorDetail } | null>(null)

  async function choosePaper(event: ChangeEvent<HTMLInputElement>) {
    const file = event.target.files?.[0] ?? null
    setPaper(file)
    if (file && title === '') setTitle(await titleIn(file))
  }
  async function submit(event: FormEvent) {
    event.preventDefault()
    setBusy(true)
    setRefused(null)
    const data = new FormData()
    data.set('form', JSON.stringify({ id, title, step, classSets: sets.filter(({ classId }) => classId) }))
    if (blank) data.set('blank', blank)
    if (paper) data.set('paper', paper)
    const answer = await fetch('/api/papers', { method: 'POST', body: data }).catch(() => null)
    if (answer?.ok) return router.push(`/papers/${id}/set`)
    setRefused(((await answer?.json().catch(() => null)) as { code: ErrorCode; detail: ErrorDetail } | null) ?? { code: 'failed', detail: {} })
    setBusy(false)
  }
  return (
    <form onSubmit={(event) => void submit(event)} className="mt-6 grid max-w-[40rem] gap-8">
      <Field label="Title" value={title} onChange={(event) => setTitle(event.target.value)} maxLength={200} required={!paper} say={paper ? 'Left empty, it is the title in the paper.json.' : 'As it is printed at the head of the test.'} />
      <ClassDates classes={classes} sets={sets} onChange={setSets} today={today} />
      <fieldset className="grid gap-4">
        <legend className="mb-3"><h2>The blank paper</h2></legend>
        <Field label="PDF of the test as it is printed" type="file" accept="application/pdf,.pdf" onChange={(event) => setBlank(event.target.files?.[0] ?? null)} say="Up to 40 pages, A4, Letter or A3. It may follow later." />
        <Field label="paper.json, if the paper was set before" type="file" accept="application/json,.json" onChange={(event) => void choosePaper(event)} say="Brings answer spaces and mark scheme with it." />
      </fieldset>
      {!paper && (
        <SelectField label="Marking step" value={step} onChange={(event) => setStep(event.target.value === '2' ? 2 : 1)} className="max-w-[14rem]">
          <option value={1}>half a mark</option><option value={2}>a whole mark</option>
        </SelectField>
      )}
      {refused && <Alarm code={refused.code} detail={refused.detail} />}
      <p className="flex items-center gap-4"><button className="btn lead" disabled={busy}>Make the paper</button>{busy && <span className="soft" role="status">Reading the pages</span>}</p>
    </form>
  )
}

async function titleIn(file: File): Promise<string> {
  try {
    const { title } = JSON.parse(await file.text()) as { title?: unknown }
    return typeof title === 'string' ? title : ''
  } catch {
    return ''
  }
}
