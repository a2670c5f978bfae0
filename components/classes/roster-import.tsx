'use client'
import Link from 'next/link'
import { useState, type ChangeEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { faultOf, useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import { RosterPreview, type RosterCheck } from './roster-preview'
import { sayCounts, type Counts } from './say-counts'

type RosterImportProps = Readonly<{ back: string; check: (form: FormData) => Promise<Outcome<RosterCheck>>; bringIn: (form: FormData) => Promise<Outcome<Counts>> }>

const formOf = (file: File) => {
  const form = new FormData()
  form.set('file', file)
  return form
}

// More than this never leaves the browser: it is another kind of file.
const most = 900_000
const tooLargeFile: Outcome<never> = { ok: false, code: 'bad_input', detail: { lines: [{ path: '', says: 'is too large for a class list' }] } }

/** Choose the file, see what it would do line by line, then bring it in. */
export function RosterImport({ back, check, bringIn }: RosterImportProps) {
  const { busy, trouble, run, forget } = useOutcome()
  const [file, setFile] = useState<File | null>(null)
  const [plan, setPlan] = useState<RosterCheck | null>(null)
  const [done, setDone] = useState<Counts | null>(null)

  function choose(event: ChangeEvent<HTMLInputElement>) {
    const chosen = event.target.files?.[0]
    // The same file may be chosen again after it was mended.
    event.target.value = ''
    if (!chosen) return
    setFile(chosen)
    setPlan(null)
    setDone(null)
    forget()
    void run(chosen.size > most ? Promise.resolve(tooLargeFile) : check(formOf(chosen)), setPlan)
  }
  const tooLarge = faultOf(trouble, '')
  return (
    <>
      <p className="mb-4 max-w-[40rem]">A CSV file with the columns <i>candidate_number</i>, <i>given_name</i>, <i>family_name</i> and, if you have them, <i>email</i>. Known candidate numbers are updated; nobody is doubled, and nobody is taken out.</p>
      <div className="flex flex-wrap items-center gap-3">
        <label className={`btn ${done || plan?.faults.length === 0 ? '' : 'lead'} focus-within:outline-2 focus-within:outline-offset-2 focus-within:outline-ink`}>{file ? 'Choose another file' : 'Choose the class list'}<input className="vh" type="file" accept=".csv,.txt,.tsv,text/csv,text/plain" onChange={choose} /></label>
        {file && <span className="soft break-all">{file.name}</span>}
      </div>
      <div className="mt-4" aria-live="polite">
        {busy && !plan && <p className="line">Reading the list …</p>}
        {trouble && (tooLarge ? <p role="alert" className="line bad">This file {tooLarge}. Choose the CSV file of one class.</p> : <Alarm code={trouble.code} detail={trouble.detail} />)}
        {done && <p className="line">{sayCounts(done, 'done')}</p>}
      </div>
      {done && <p className="mt-3"><Link className="btn lead" href={back}>To the class</Link></p>}
      {plan && file && !done && <RosterPreview plan={plan} busy={busy} onImport={() => void run(bringIn(formOf(file)), setDone)} />}
    </>
  )
}
