'use client'
import { useEffect, useState, useSyncExternalStore } from 'react'
import { ask, type RefusedError } from '@/components/ui/ask'
import { newId } from '@/lib/core/ids'
import type { Run } from '@/lib/core/run'
import { openDesk, type DeskState, type Save } from './desk-state'
import { stepDesk, type DeskEvent } from './desk-step'
import { StampQueue, type Saving } from './stamp-queue'

/** Sends one thing to be saved. It may be sent again: ids and versions make that harmless. */
function send(save: Save): Promise<unknown> {
  if (save.kind === 'stamp') return ask(`/api/stamps/${save.stamp.id}`, { method: 'PUT', json: save.stamp, keepalive: true })
  return ask(`/api/markings/${save.kind}`, { json: { responseId: save.responseId, round: save.round }, keepalive: true })
}

/** The desk outside React: every event makes one step, and what is to be saved goes into the queue at once. */
class DeskStore {
  private desk: DeskState
  private readonly listeners = new Set<() => void>()
  readonly queue: StampQueue

  constructor(run: Run, responseId: string | null) {
    this.desk = openDesk(run, responseId)
    this.queue = new StampQueue({ send, now: () => Date.now(), wait: (ms) => new Promise((go) => setTimeout(go, ms)), onRefused: (save, error) => void this.refused(save, error) })
  }

  readonly state = (): DeskState => this.desk

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener)
    return () => this.listeners.delete(listener)
  }

  readonly send = (event: DeskEvent): void => {
    const { state, saves } = stepDesk(this.desk, event, newId)
    this.queue.put(saves)
    if (state === this.desk) return
    this.desk = state
    this.listeners.forEach((listener) => listener())
  }

  /** What the server holds of a strip it refused something on takes the place of what stands here. */
  private async refused(save: Save, error: RefusedError): Promise<void> {
    const responseId = save.kind === 'stamp' ? save.stamp.responseId : save.responseId
    const { paperId, question, round } = this.desk.run
    const run = await ask<Run>(`/api/papers/${paperId}/runs/${question.id}?round=${round}`).catch(() => null)
    this.send({ type: 'refused', responseId, code: error.code, detail: error.detail, strip: run?.strips.find((strip) => strip.responseId === responseId) ?? null })
  }
}

export type DeskHandle = Readonly<{ state: DeskState; saving: Saving; send: (event: DeskEvent) => void; retry: () => void }>

/** The desk of a run: its state, how saving stands, and the way in for events. Asks before a page with unsaved stamps is left. */
export function useDesk(run: Run, responseId: string | null): DeskHandle {
  const [store] = useState(() => new DeskStore(run, responseId))
  const state = useSyncExternalStore(store.subscribe, store.state, store.state)
  const saving = useSyncExternalStore(store.queue.subscribe, store.queue.state, store.queue.state)
  useEffect(() => {
    const leaving = (event: BeforeUnloadEvent): void => {
      if (store.queue.state().waiting > 0) event.preventDefault()
    }
    window.addEventListener('online', store.queue.retry)
    window.addEventListener('focus', store.queue.retry)
    window.addEventListener('beforeunload', leaving)
    return () => {
      window.removeEventListener('online', store.queue.retry)
      window.removeEventListener('focus', store.queue.retry)
      window.removeEventListener('beforeunload', leaving)
    }
  }, [store])
  return { state, saving, send: store.send, retry: store.queue.retry }
}
