'use client'
import { errorSentence } from '@/components/ui/error-sentence'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'

export function RetryButton({ to, retry }: { to: string; retry: () => Promise<Outcome<void>> }) {
  const { busy, trouble, run } = useOutcome()
  return (
    <>
      {trouble && <span role="alert" className="alarm">{errorSentence(trouble.code)}</span>}
      <button className="btn plain" disabled={busy} aria-label={`Send again to ${to}`} onClick={() => void run(retry(), () => undefined)}>Send again</button>
    </>
  )
}
