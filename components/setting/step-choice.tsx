'use client'
import type { Dispatch } from 'react'
import type { SetEvent } from './set-state'

/** The smallest difference between two marks of this paper. */
export function StepChoice({ step, send }: { step: 1 | 2; send: Dispatch<SetEvent> }) {
  return (
    <select aria-label="Marking step of the paper" value={step} onChange={(event) => send({ type: 'ruled', patch: { step: event.target.value === '2' ? 2 : 1 } })}>
      <option value={1}>half a mark</option><option value={2}>a whole mark</option>
    </select>
  )
}
