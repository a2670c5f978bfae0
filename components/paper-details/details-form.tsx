'use client'
import { useState, type FormEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Field } from '@/components/ui/field'
import type { Outcome } from '@/lib/core/outcome'
import type { PaperDetails } from '@/lib/core/paper-details-view'

type DetailsFormProps = Readonly<{ paperId: string; details: PaperDetails; save: (raw: unknown) => Promise<Outcome<void>> }>

/** Title and the rules of keeping, names, samples and solutions. */
export function DetailsForm({ paperId, details, save }: DetailsFormProps) {
  const [now, setNow] = useState(details)
  const [said, setSaid] = useState<Outcome<void> | null>(null)
  const change = (more: Partial<PaperDetails>) => { setNow({ ...now, ...more }); setSaid(null) }
  async function submit(event: FormEvent) {
    event.preventDefault()
    setSaid(await save({ paperId, before: details, after: now }))
  }
  return (
    <form onSubmit={(event) => void submit(event)} className="grid max-w-[40rem] gap-4">
      <Field label="Title" value={now.title} maxLength={200} required onChange={(event) => change({ title: event.target.value })} />
      <div className="flex flex-wrap items-start gap-4">
        <Field label="Keep the scans until" type="date" required value={now.keepUntil} onChange={(event) => change({ keepUntil: event.target.value })} className="w-48" />
        <Field label="Scripts in a sample" type="number" min={1} max={500} value={now.sampleSize ?? ''} placeholder="by class size" onChange={(event) => change({ sampleSize: event.target.value ? Number(event.target.value) : null })} className="w-48" say="Empty: the usual number." />
      </div>
      <label className="chk"><input type="checkbox" checked={now.namesHidden} onChange={(event) => change({ namesHidden: event.target.checked })} /> Hide names while marking</label>
      <label className="chk"><input type="checkbox" checked={now.solutionsReleased} onChange={(event) => change({ solutionsReleased: event.target.checked })} /> Hand back model solutions with the scripts</label>
      {said && !said.ok && <Alarm code={said.code} detail={said.detail} />}
      <p className="flex items-center gap-4"><button className="btn lead">Save</button>{said?.ok && <span className="soft" role="status">Saved</span>}</p>
    </form>
  )
}
