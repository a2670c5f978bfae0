'use client'
import { useRef, useState } from 'react'
import type { ErrorCode, ErrorDetail, ErrorLine } from '@/lib/core/errors'
import type { Outcome } from '@/lib/core/outcome'

export type Trouble = Readonly<{ code: ErrorCode | 'failed'; detail: ErrorDetail }>

/**
 * Runs an action from a form: `busy` meanwhile, `trouble` when it was refused or the network is dead, done with the value when not.
 * Of several under way at once, only the one asked last says how it went.
 */
export function useOutcome() {
  const [busy, setBusy] = useState(false)
  const [trouble, setTrouble] = useState<Trouble | null>(null)
  const asked = useRef(0)
  async function run<T>(work: Promise<Outcome<T>>, done: (value: T) => void | Promise<void>): Promise<void> {
    const turn = ++asked.current
    const say = (trouble: Trouble) => { if (turn === asked.current) setTrouble(trouble) }
    setBusy(true)
    setTrouble(null)
    try {
      const answer = await work
      if (answer.ok) await done(answer.value)
      else say({ code: answer.code, detail: answer.detail })
    } catch {
      say({ code: 'failed', detail: {} })
    } finally {
      if (turn === asked.current) setBusy(false)
    }
  }
  return { busy, trouble, run, forget: () => setTrouble(null) }
}

/** What is wrong with one field of a refused form. */
export function faultOf(trouble: Trouble | null, path: string): string | null {
  const lines = (trouble?.detail.lines ?? []) as readonly ErrorLine[]
  return lines.find((line) => line.path === path)?.says ?? null
}
