'use client'
import { Check, CloudOff, TriangleAlert } from 'lucide-react'
import { useState } from 'react'
import type { SetState } from './set-state'

/** Whether what stands here is kept, in words, with the time of the last save. */
export function SaveState({ state }: { state: SetState }) {
  const { view, setting, trouble, cutAgain } = state
  const [last, setLast] = useState<Readonly<{ version: number; at: string | null }>>({ version: view.version, at: null })
  if (last.version !== view.version) setLast({ version: view.version, at: new Date().toLocaleTimeString('en-GB') })
  return <span role="status" className="inline-flex items-center gap-1">{say()}</span>

  function say() {
    if (trouble?.offline) return <><CloudOff className="ic" aria-hidden /> No network: kept here, saved when it is back</>
    if (trouble) return <span className="alarm inline-flex items-center gap-1"><TriangleAlert className="ic" aria-hidden /> Not saved</span>
    if (setting !== view.setting) return 'Saving'
    return <><Check className="ic" aria-hidden /> {last.at ? `Saved ${last.at}` : 'Saved'}{cutAgain > 0 && <span className="soft">. {cutAgain === 1 ? '1 answer is' : `${cutAgain} answers are`} cut out anew; marks stay where they are</span>}</>
  }
}
