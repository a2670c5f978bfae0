'use client'
import { useState, type ReactNode } from 'react'
import { errorSentence } from '@/components/ui/error-sentence'
import type { Turn } from '@/lib/core/paper-space'
import style from './sorting.module.css'

type LeafPictureProps = Readonly<{ leafId: string; turn: Turn; alt: string; zoom: number; children?: ReactNode }>

/** A leaf as large as there is room, larger by `zoom`; what lies over it turns and grows with it. */
export function LeafPicture({ leafId, turn, alt, zoom, children }: LeafPictureProps) {
  const src = `/api/leaves/${leafId}/picture?width=1600&turn=${turn}`
  const [unread, setUnread] = useState<string | null>(null)
  return (
    <div className={style.frame} tabIndex={0} role="group" aria-label={alt}>
      {unread === src ? <p className={style.unread}>{errorSentence('page_unreadable')}</p> : (
        <div className={style.paper} style={{ width: `${zoom * 100}%` }}>
          <img src={src} alt={alt} onError={() => setUnread(src)} />
          {children}
        </div>
      )}
    </div>
  )
}
