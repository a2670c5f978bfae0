'use client'
import { useState } from 'react'
import { readMark, sayMark, type HalfMarks } from '@/lib/core/marks'

type WorthInputProps = Readonly<{ label: string; worth: HalfMarks; onWorth: (worth: HalfMarks) => void; disabled?: boolean; least?: number }>

/** A mark to write: takes 1½, 1.5 and 1,5 and shows ½. What is no mark stays marked until it is one. */
export function WorthInput({ label, worth, onWorth, disabled, least = 1 }: WorthInputProps) {
  const [typed, setTyped] = useState<string | null>(null)
  const read = typed === null ? worth : readMark(typed)
  const good = read !== null && read >= least && read <= 400
  return (
    <input
      aria-label={label} aria-invalid={!good || undefined} inputMode="decimal" disabled={disabled} value={typed ?? sayMark(worth)} style={{ textAlign: 'right' }}
      onFocus={(event) => event.target.select()}
      onChange={(event) => {
        setTyped(event.target.value)
        const next = readMark(event.target.value)
        if (next !== null && next >= least && next <= 400) onWorth(next)
      }}
      onBlur={() => setTyped(null)}
    />
  )
}
