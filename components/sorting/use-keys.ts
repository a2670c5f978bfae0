'use client'
import { useEffect, useState } from 'react'

const kept = 'sheafmark-single-keys'

/** Whether single letters work here: a person's own choice, kept in the browser. */
export function useSingleKeys(): [boolean, (on: boolean) => void] {
  const [on, setOn] = useState(true)
  useEffect(() => {
    const off = localStorage.getItem(kept) === 'off'
    if (off) queueMicrotask(() => setOn(false))
  }, [])
  return [on, (next) => { setOn(next); localStorage.setItem(kept, next ? 'on' : 'off') }]
}

/** Calls `press` for single keys, unless a person is writing, a dialog is open or another key is held. True: the key was used. */
export function useKeys(on: boolean, press: (key: string) => boolean): void {
  useEffect(() => {
    if (!on) return
    const listen = (event: KeyboardEvent) => {
      const at = event.target as HTMLElement
      const writing = at.closest('input:not([type=radio]):not([type=checkbox]), textarea, select, [role=dialog], [role=alertdialog], [role=menu]')
      if (event.ctrlKey || event.metaKey || event.altKey || event.defaultPrevented || writing) return
      if (press(event.key.length === 1 ? event.key.toLowerCase() : event.key)) event.preventDefault()
    }
    window.addEventListener('keydown', listen)
    return () => window.removeEventListener('keydown', listen)
  })
}
