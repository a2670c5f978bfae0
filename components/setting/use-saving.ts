'use client'
import { useEffect, useRef, type Dispatch } from 'react'
import { ask, RefusedError } from '@/components/ui/ask'
import type { SetEvent, SetState } from './set-state'

/** A pause in the work, then it is saved; longer while there is no network. */
const pause = 500
const pauseOffline = 3000

/** Saves as one goes: one save at a time, each made on the version the one before gave. */
export function useSaving({ view, setting, trouble }: SetState, send: Dispatch<SetEvent>): void {
  const busy = useRef(false)
  const path = `/api/papers/${view.paperId}/setting`
  const unsaved = setting !== view.setting
  const waiting = unsaved && (trouble === null || trouble.offline)

  useEffect(() => {
    if (!waiting) return
    const save = async () => {
      if (busy.current) return
      busy.current = true
      try {
        const { version } = await ask<{ version: number }>(path, { json: { version: view.version, setting } })
        busy.current = false
        send({ type: 'saved', version, setting })
      } catch (error) {
        busy.current = false
        if (!(error instanceof RefusedError)) throw error
        send({ type: 'refused', trouble: { code: error.code, detail: error.detail, offline: error.status === 0 } })
      }
    }
    const timer = setTimeout(() => void save(), trouble?.offline ? pauseOffline : pause)
    return () => clearTimeout(timer)
  }, [waiting, setting, view.version, trouble, path, send])

  // The page is left before the pause is over: the browser still sends it.
  useEffect(() => {
    if (!waiting) return
    const flush = () => void fetch(path, { method: 'POST', keepalive: true, headers: { 'content-type': 'application/json' }, body: JSON.stringify({ version: view.version, setting }) }).catch(() => undefined)
    window.addEventListener('pagehide', flush)
    return () => window.removeEventListener('pagehide', flush)
  }, [waiting, setting, view.version, path])

  useEffect(() => {
    if (!unsaved || waiting) return
    const warn = (event: BeforeUnloadEvent) => event.preventDefault()
    window.addEventListener('beforeunload', warn)
    return () => window.removeEventListener('beforeunload', warn)
  }, [unsaved, waiting])
}
