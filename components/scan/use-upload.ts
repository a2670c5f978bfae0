'use client'
import { useEffect, useRef, useState } from 'react'
import type { ErrorCode } from '@/lib/core/errors'
import { brokenOff, sendSheaf, type Running, type UploadState } from './sheaf-upload'

type Upload = Readonly<{ state: UploadState; brokenOff: readonly string[]; send: (file: File, classSetIds: readonly string[]) => void; refuse: (name: string, code: ErrorCode) => void; goOn: () => void; stop: () => void }>

/** One sheaf at a time on its way to the server. Goes on by itself when the browser finds the line again. */
export function useUpload(paperId: string, limitMb: number, arrived: () => void): Upload {
  const [state, say] = useState<UploadState>({ step: 'none' })
  const [broken, setBroken] = useState<readonly string[]>([])
  const running = useRef<Running | null>(null)
  const waiting = state.step === 'waiting'
  useEffect(() => { void brokenOff(paperId).then(setBroken) }, [paperId, state.step])
  useEffect(() => {
    if (!waiting) return
    const goOn = () => running.current?.goOn()
    const clock = setInterval(goOn, 10_000)
    window.addEventListener('online', goOn)
    return () => { clearInterval(clock); window.removeEventListener('online', goOn) }
  }, [waiting])
  useEffect(() => {
    if (state.step === 'none' || state.step === 'refused') return
    const hold = (event: BeforeUnloadEvent) => event.preventDefault()
    window.addEventListener('beforeunload', hold)
    return () => window.removeEventListener('beforeunload', hold)
  }, [state.step])
  return {
    state, brokenOff: broken,
    send: (file, classSetIds) => { running.current = sendSheaf({ paperId, file, classSetIds, limitMb, say, arrived }) },
    refuse: (name, code) => say({ step: 'refused', name, code, detail: {} }),
    goOn: () => running.current?.goOn(),
    stop: () => running.current?.stop(),
  }
}
