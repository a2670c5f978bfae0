'use client'
import { useRouter } from 'next/navigation'
import { useState, type FormEvent } from 'react'
import { sayDate } from '@/components/paper/say-date'
import { Alarm } from '@/components/ui/alarm'
import { Field, SelectField } from '@/components/ui/field'
import { sayTime } from '@/components/ui/say-time'
import type { Trouble } from '@/components/ui/use-outcome'
import type { PrintClassSet, PrintView } from '@/lib/core/print-view'
import css from './printing.module.css'

type MakePackProps = Readonly<{ view: PrintView; /** Every page has a good place. */ ready: boolean; missing: readonly number[] }>

/** Whose papers are printed, and how; then the PDF. */
export function MakePack({ view, ready, missing }: MakePackProps) {
  const router = useRouter()
  const [setId, setSetId] = useState(view.classSets[0]?.id ?? '')
  const [spares, setSpares] = useState(2)
  const [twoSided, setTwoSided] = useState(view.pages.length > 1)
  const [busy, setBusy] = useState(false)
  const [trouble, setTrouble] = useState<Trouble | null>(null)
  const set = view.classSets.find(({ id }) => id === setId)
  const pages = view.pages.length

  async function make(event: FormEvent) {
    event.preventDefault()
    setBusy(true)
    setTrouble(null)
    const answer = await fetch(`/api/papers/${view.paperId}/print-pack`, { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify({ classSetId: setId, spares, twoSided }) }).catch(() => null)
    if (answer?.ok) {
      keep(await answer.blob(), `${view.title}, ${set?.className ?? ''}.pdf`)
      router.refresh()
    } else setTrouble(((await answer?.json().catch(() => null)) as Trouble | null) ?? { code: 'failed', detail: {} })
    setBusy(false)
  }
  if (!set) {
    return <><h2 className="cap mt-6">The pack</h2><p className="mt-3">No class sits this paper yet. <a href={`/papers/${view.paperId}/details`}>Say which one does</a>, then its pack can be printed.</p></>
  }
  return (
    <form onSubmit={(event) => void make(event)}>
      <h2 className="cap mt-6">The pack</h2>
      <div className={css.choices}>
        <SelectField label="Class" value={setId} onChange={(event) => setSetId(event.target.value)}>
          {view.classSets.map((each) => <option key={each.id} value={each.id}>{each.className}, {sayDate(each.satOn)}</option>)}
        </SelectField>
        <Field label="Spare scripts" type="number" min={0} max={60} required value={Number.isNaN(spares) ? '' : spares} onChange={(event) => setSpares(event.target.valueAsNumber)} say="Without a name, for whoever is not on the list." />
      </div>
      <label className="chk mt-3"><input type="checkbox" checked={twoSided} onChange={(event) => setTwoSided(event.target.checked)} /> Printed on both sides{twoSided && pages % 2 === 1 ? ': each script starts on a new sheet' : ''}</label>
      <p className="mt-4 flex flex-wrap items-center gap-3">
        <button className={`btn ${ready ? 'lead' : ''}`} disabled={!ready || busy}>{busy ? 'The PDF is being made' : 'Make the PDF'}</button>
        <span className="soft dense">{packWords(set, spares, pages)}</span>
      </p>
      {missing.length > 0 && <p className="soft dense mt-2">{missing.length === 1 ? `Page ${missing[0]} needs a place for its code first.` : `Pages ${missing.join(', ')} need a place for their code first.`}</p>}
      {trouble && <div className="mt-3"><Alarm code={trouble.code} detail={trouble.detail} /></div>}
      {set.runs > 0 && <p className="soft dense mt-3">Printed {set.runs === 1 ? 'once' : `${set.runs} times`}, last on {sayTime(set.lastPrinted!)}. Every print stays good: sheets of one may lie among those of another.</p>}
      <p className="soft dense mt-3">Print at full size, without fitting to the page. Codes are seen by themselves when the scan comes in.</p>
    </form>
  )
}

function packWords({ students }: PrintClassSet, spares: number, pages: number): string {
  const scripts = students + (spares || 0)
  return `${scripts} ${scripts === 1 ? 'script' : 'scripts'} of ${pages} ${pages === 1 ? 'page' : 'pages'}, in the order of the list`
}

/** Hands a file to the browser to be kept. */
function keep(file: Blob, name: string): void {
  const url = URL.createObjectURL(file)
  const link = Object.assign(document.createElement('a'), { href: url, download: name })
  link.click()
  setTimeout(() => URL.revokeObjectURL(url), 60_000)
}
