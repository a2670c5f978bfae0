import { Check, CloudOff, PenLine } from 'lucide-react'
import { saySaving } from './say-desk'
import type { Saving } from './stamp-queue'

/** Whether what was stamped is safe: with the time, or with how many still wait here. */
export function SavedStatus({ saving, retry }: { saving: Saving; retry: () => void }) {
  const trouble = saving.trouble !== null && saving.waiting > 0
  const Icon = trouble ? CloudOff : saving.waiting > 0 ? PenLine : Check
  return (
    <>
      <span role="status" className={trouble ? 'line bad' : 'line'}>
        <Icon className="ic" aria-hidden /> {saySaving(saving)}
      </span>
      {saving.trouble === 'signed-out' && saving.waiting > 0 && <a href="/sign-in" target="_blank" rel="noreferrer" onClick={() => setTimeout(retry, 8000)}>Sign in again</a>}
    </>
  )
}
