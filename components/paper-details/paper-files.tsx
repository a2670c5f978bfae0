'use client'
import { useRouter } from 'next/navigation'
import { useState, type ChangeEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Field } from '@/components/ui/field'
import type { ErrorCode, ErrorDetail } from '@/lib/core/errors'
import type { PaperDetailsView } from '@/lib/core/paper-details-view'

type Said = Readonly<{ ok: true; words: string } | { ok: false; code: ErrorCode | 'failed'; detail: ErrorDetail }>

/** The blank paper as a PDF, and the paper as a file to keep or to take in. */
export function PaperFiles({ view }: { view: PaperDetailsView }) {
  const router = useRouter()
  const [said, setSaid] = useState<Said | null>(null)
  const path = `/api/papers/${view.paperId}`
  async function send(event: ChangeEvent<HTMLInputElement>, to: string, words: string) {
    const file = event.target.files?.[0]
    event.target.value = ''
    if (!file) return
    const answer = await fetch(to.replace('{name}', encodeURIComponent(file.name)), { method: 'POST', body: file }).catch(() => null)
    if (answer?.ok) {
      setSaid({ ok: true, words })
      router.refresh()
    } else setSaid({ ok: false, ...(((await answer?.json().catch(() => null)) as { code: ErrorCode; detail: ErrorDetail } | null) ?? { code: 'failed' as const, detail: {} }) })
  }
  return (
    <div className="grid max-w-[40rem] gap-4" id="blank">
      <p>{view.blank ? <>{view.blank.name}, {view.blank.pages} {view.blank.pages === 1 ? 'page' : 'pages'}. <a href={`${path}/blank`}>Open it</a></> : 'There is no blank paper yet.'}</p>
      <Field label={view.blank ? 'Another print of it' : 'PDF of the test as it is printed'} type="file" accept="application/pdf,.pdf" onChange={(event) => void send(event, `${path}/blank?name={name}`, 'The blank paper is in place.')} say="Up to 40 pages, A4, Letter or A3. The pages must be the same once scripts have been placed on them." />
      <Field label="Take in a paper.json" type="file" accept="application/json,.json" onChange={(event) => void send(event, `${path}/paper-file?version=${view.version}`, 'The paper.json is taken in.')} say="Replaces the scheme while nothing is marked; afterwards it only adds and changes, question by question." />
      <p><a className="btn" href={`${path}/paper-file`} download>Save as paper.json</a></p>
      {said?.ok && <p className="soft" role="status">{said.words}</p>}
      {said && !said.ok && <Alarm code={said.code} detail={said.detail} />}
    </div>
  )
}
