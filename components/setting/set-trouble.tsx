'use client'
import type { Dispatch } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { ask } from '@/components/ui/ask'
import type { SettingView } from '@/lib/core/setting-view'
import type { SetEvent, SetState } from './set-state'
import css from './set.module.css'

/** What keeps a save from being made, and the way on. It stands above the scheme, in sight, and covers nothing. */
export function SetTrouble({ state: { trouble, view }, send }: { state: SetState; send: Dispatch<SetEvent> }) {
  if (!trouble || trouble.offline) return null
  const fresh = () => ask<SettingView>(`/api/papers/${view.paperId}/setting`)
  const failed = () => send({ type: 'refused', trouble: { code: 'failed', detail: {}, offline: true } })
  if (trouble.code !== 'out_of_date') return <div className={css.trouble}><Alarm code={trouble.code} detail={trouble.detail} /></div>
  return (
    <div className={css.trouble} role="alert">
      <p>Someone else changed this paper since you opened it. What you drew and wrote is still here, and is not saved yet.</p>
      <p className="mt-2 flex flex-wrap gap-3">
        <button type="button" className="btn" onClick={() => fresh().then((next) => send({ type: 'opened', view: next }), failed)}>Load theirs, drop mine</button>
        <button type="button" className="btn" onClick={() => fresh().then((next) => send({ type: 'overwriting', version: next.version }), failed)}>Save mine over theirs</button>
      </p>
    </div>
  )
}
