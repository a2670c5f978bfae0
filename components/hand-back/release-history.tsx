'use client'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Dialog } from '@/components/ui/dialog'
import { errorSentence } from '@/components/ui/error-sentence'
import { sayTime } from '@/components/ui/say-time'
import { useOutcome } from '@/components/ui/use-outcome'
import { counted } from '@/components/paper/stage-words'
import type { ErrorCode } from '@/lib/core/errors'
import type { HandBackView, ReleaseLine } from '@/lib/core/hand-back'
import type { HandBackActs } from './hand-back-screen'

type ReleaseHistoryProps = Readonly<{ view: HandBackView; acts: HandBackActs; again: () => Promise<void> }>

/** What was handed back, when, by whom; and taking all of it back. */
export function ReleaseHistory({ view: { releases, classSetId, building }, acts, again }: ReleaseHistoryProps) {
  const [asking, setAsking] = useState(false)
  const { busy, trouble, run } = useOutcome()
  const past = releases.filter(({ state }) => state !== 'building')
  if (past.length === 0) return null
  const out = past.some(({ state }) => state === 'released')
  return (
    <section aria-label="What was handed back" className="mb-6">
      <h2>What was handed back</h2>
      <table className="tbl">
        <thead><tr><th scope="col">when</th><th scope="col">by</th><th scope="col">what</th><th scope="col">now</th></tr></thead>
        <tbody>
          {past.map((release) => (
            <tr key={release.id}>
              <td>{sayTime(release.releasedAt ?? release.createdAt)}</td>
              <td>{release.by}</td>
              <td>{counted(release.scripts, 'script', 'scripts')}{release.revision > 1 ? `, revision ${release.revision}` : ''}</td>
              <td>{nowWords(release)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {out && !building && <button type="button" className="btn mt-4" onClick={() => setAsking(true)}>Take everything back</button>}
      <Dialog title="Take everything back?" open={asking} onClose={() => setAsking(false)} role="alertdialog">
        <p className="mt-2">Students can no longer open or download their scripts here. What they saved before stays with them, and mails that left cannot be called back. The files stay here as proof; you can hand back again.</p>
        {trouble && <Alarm {...trouble} />}
        <div className="mt-4 flex gap-3">
          <button type="button" className="btn lead" disabled={busy} onClick={() => void run(acts.withdraw(classSetId!), async () => { await again(); setAsking(false) })}>Take everything back</button>
          <button type="button" className="btn" onClick={() => setAsking(false)}>Leave it</button>
        </div>
      </Dialog>
    </section>
  )
}

function nowWords({ state, withdrawnAt, withdrawnBy, problem }: ReleaseLine): string {
  if (state === 'withdrawn') return `taken back ${sayTime(withdrawnAt!)}, ${withdrawnBy}`
  if (state === 'failed') return `could not be built. ${errorSentence((problem ?? 'failed') as ErrorCode)}`
  return 'with the students'
}
