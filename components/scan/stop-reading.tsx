'use client'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { ask, RefusedError } from '@/components/ui/ask'
import { Dialog } from '@/components/ui/dialog'
import type { SheafProgress } from '@/lib/core/sheaf-progress'
import { counted } from './sheaf-words'

type Refused = Pick<RefusedError, 'code' | 'detail'>

/** Stops a sheaf that is being read, or gives up one that failed, after saying what goes with it. */
export function StopReading({ sheaf, onStopped }: { sheaf: SheafProgress; onStopped: () => void }) {
  const [asking, setAsking] = useState(false)
  const [busy, setBusy] = useState(false)
  const [refused, setRefused] = useState<Refused | null>(null)
  const failed = sheaf.state === 'failed'
  const close = () => { setAsking(false); setRefused(null) }
  const stop = async () => {
    setBusy(true)
    setRefused(null)
    try {
      await ask(`/api/sheaves/${sheaf.id}/stop`, { method: 'POST' })
      close()
      onStopped()
    } catch (error) {
      setRefused(error instanceof RefusedError ? error : { code: 'failed', detail: {} })
    } finally {
      setBusy(false)
    }
  }
  return (
    <>
      <button type="button" className="btn plain" onClick={() => setAsking(true)}>{failed ? 'Take it away' : 'Stop reading'}</button>
      <Dialog title={failed ? 'Take this sheaf away?' : 'Stop reading this sheaf?'} open={asking} onClose={close} role="alertdialog">
        <p className="mt-2">{whatGoes(sheaf)}</p>
        <p className="mt-2 soft">The paper pile is with you: it can be scanned or sent again at any time.</p>
        {refused && <div className="mt-3"><Alarm code={refused.code} detail={refused.detail} /></div>}
        <div className="mt-4 flex flex-wrap gap-3">
          <button type="button" className="btn" disabled={busy} onClick={() => void stop()}>{failed ? 'Take it away' : 'Stop and take it away'}</button>
          <button type="button" className="btn plain" autoFocus onClick={close}>{failed ? 'Keep it' : 'Go on reading'}</button>
        </div>
      </Dialog>
    </>
  )
}

function whatGoes({ name, leaves, scripts }: SheafProgress): string {
  const read = leaves.length > 0 ? ` with the ${counted(leaves.length, 'leaf', 'leaves')} read so far` : ''
  const placed = scripts > 0 ? ` and the ${counted(scripts, 'script')} made of them, the names given there included` : ''
  return `${name} goes from here${read}${placed}.`
}
