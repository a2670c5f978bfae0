'use client'
import { useState } from 'react'
import type { ErrorCode, ErrorDetail, ErrorLine } from '@/lib/core/errors'
import type { Outcome } from '@/lib/core/outcome'

export type Trouble = Readonly<{ code: ErrorCode | 'failed'; detail: ErrorDetail }>

/** Runs an action from a form: `busy` meanwhile, `trouble` when it was refused or the network is dead, done with the value when not. */
export function useOutcome() {
  const [busy, setBusy] = useState(false)
  const [trouble, setTrouble] = useState<Trouble | null>(null)
  async function run<T>(work: Promise<Outcome<T>>, done: (value: T) => void | Promise<void>): Promise<void> {
    setBusy(true)
    setTrouble(null)
    try {
      const answer = await work
      if (answer.ok) await done(answer.value)
      else setTrouble({ code: answer.code, detail: answer.detail })
    } catch {
      setTrouble({ code: 'failed', detail: {} })
    } finally {
      setBusy(false)
    }
  }
  return { busy, trouble, run, forget: () => setTrouble(null) }
}

/** What is wrong with one field of a refused form. */
export function faultOf(trouble: Trouble | null, path: string): string | null {
  const lines = (trouble?.detail.lines ?? []) as readonly ErrorLine[]
  return lines.find((line) => line.path === path)?.says ?? null
}
