'use client'
import { useState } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import { StampsOnSvg } from '@/components/paper/stamps-on-svg'
import { penOf } from '@/lib/core/stamp'
import { stampsOf, type DeskState } from './desk-state'
import { sayStamps } from './say-desk'
import { sharpSrc, type Sizes } from './use-sizes'
import styles from './desk.module.css'

/** The pages of the script in hand, whole, with this response's stamps: work may stand outside the answer space. */
export function WholePage({ state, sizes, onClose }: Readonly<{ state: DeskState; sizes: Sizes; onClose: () => void }>) {
  const strip = state.strips[state.hand]
  const home = strip?.pages.findIndex((page) => strip.pictures.some((picture) => picture.scriptPageId === page.scriptPageId)) ?? 0
  const [chosen, setChosen] = useState(Math.max(0, home))
  const page = strip?.pages[Math.min(chosen, (strip?.pages.length ?? 1) - 1)]
  if (!strip || !page) return <main className={styles.fan}><p className="p-6">No page of this script has been scanned. <button type="button" className="btn" onClick={onClose}>Back to the strips</button></p></main>
  const rect = { x: 0, y: 0, w: page.width, h: page.height }
  return (
    <main className={styles.fan}>
      <div className={styles.page} style={{ width: sizes.strip }}>
        <div className={styles.pageBar}>
          <div className="tabs" role="group" aria-label="Pages of this script">
            {strip.pages.map((other, k) => <button key={other.scriptPageId} type="button" aria-current={other === page ? 'page' : undefined} onClick={() => setChosen(k)}>{other.paperPage === null ? 'Extra page' : `Page ${other.paperPage}`}</button>)}
          </div>
          <button type="button" className="btn" onClick={onClose}>Back to the strips <KeyCap>P</KeyCap></button>
        </div>
        <div className="sheet" style={{ aspectRatio: `${page.width} / ${page.height}` }}>
          <img src={sharpSrc(page.src, sizes.strip, page.width, sizes.density)} alt={`Script ${strip.number}, ${page.paperPage === null ? 'extra page' : `page ${page.paperPage}`}. ${sayStamps(strip, state.run)}`} />
          <StampsOnSvg stamps={stampsOf(strip).filter((stamp) => stamp.scriptPageId === page.scriptPageId)} rect={rect} pen={penOf(state.run.round)} />
        </div>
      </div>
    </main>
  )
}
