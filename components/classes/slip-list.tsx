'use client'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'

export type Slip = Readonly<{ name: string; userName: string; code: string }>
type SlipListProps = Readonly<{ classId: string; slips: readonly Slip[]; school: string; className: string; address: string; onDone: () => void }>

/** Slips to print and cut, shown this once: where to go, the user name, the code. On paper nothing else of the page is printed. */
export function SlipList({ classId, slips, school, className, address, onDone }: SlipListProps) {
  const [busy, setBusy] = useState(false)
  const [failed, setFailed] = useState(false)
  /** The codes are here and nowhere else: they go along, and come back as strips to cut. */
  async function download(sheet: 'a4' | 'letter') {
    setBusy(true)
    const response = await fetch(`/api/classes/${classId}/slips`, { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify({ sheet, slips }) }).catch(() => null)
    setFailed(!response?.ok)
    if (response?.ok) saveAs(await response.blob(), `Sign-in slips, ${className}.pdf`)
    setBusy(false)
  }
  return (
    <section className="slips mt-6" aria-label="Slips to print">
      <div className="mb-4 flex flex-wrap items-center gap-3 print:hidden">
        <p className="mr-auto">Print these now: the codes are not shown again.</p>
        <button className="btn lead" onClick={() => window.print()}>Print {slips.length} {slips.length === 1 ? 'slip' : 'slips'}</button>
        <button className="btn" disabled={busy} onClick={() => void download('a4')}>PDF, A4</button>
        <button className="btn" disabled={busy} onClick={() => void download('letter')}>PDF, Letter</button>
        <button className="btn" onClick={onDone}>They are printed</button>
      </div>
      {failed && <div className="mb-4 print:hidden"><Alarm code="failed" /></div>}
      <ul className="m-0 grid list-none grid-cols-2 p-0 max-sm:grid-cols-1">
        {slips.map((slip) => (
          <li key={slip.userName} className="m-[-.5px] break-inside-avoid border border-dashed border-rule-2 p-4">
            <p className="book text-[length:var(--t-3)] leading-7">{slip.name} <small className="soft">{className}, {school}</small></p>
            <p className="dense">Go to <b className="font-semibold">{address}/new-password</b> and type the code. Then choose a password.</p>
            <dl className="mt-2 grid grid-cols-[6rem_1fr] gap-y-1">
              <dt className="soft dense">Code, once</dt><dd className="m-0 font-semibold tracking-wider">{slip.code}</dd>
              <dt className="soft dense">User name</dt><dd className="m-0 font-semibold">{slip.userName}</dd>
            </dl>
          </li>
        ))}
      </ul>
    </section>
  )
}

function saveAs(file: Blob, name: string): void {
  const link = document.createElement('a')
  link.href = URL.createObjectURL(file)
  link.download = name
  link.click()
  setTimeout(() => URL.revokeObjectURL(link.href), 60_000)
}
