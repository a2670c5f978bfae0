'use client'
import dynamic from 'next/dynamic'
import type { ReactNode, RefObject } from 'react'
import { RingedMark } from '@/components/ui/ringed-mark'
import { markOf, responseState, saysMark } from '@/lib/core/marking'
import { sayMark } from '@/lib/core/marks'
import type { PaperPoint } from '@/lib/core/paper-space'
import { penOf } from '@/lib/core/stamp'
import { stampsOf, type DeskState, type Spot } from './desk-state'
import type { DeskEvent } from './desk-step'
import type { Command } from './keys'
import { NoteEditor } from './note-editor'
import { PointKeys } from './point-keys'
import { sayStamps, sayStanding } from './say-desk'
import { SpacePicture, widthOfSpace } from './space-picture'
import { StampList } from './stamp-list'
import type { Sizes } from './use-sizes'
import styles from './desk.module.css'

const StampCanvas = dynamic(() => import('@/components/paper/stamp-canvas').then((file) => file.StampCanvas), { ssr: false })

/** A note being written: at a new place, or of a stamp that is there. */
export type Editing = Readonly<{ at: Spot; stampId: string | null; text: string }>

type StripInHandProps = Readonly<{
  state: DeskState
  sizes: Sizes
  editing: Editing | null
  hover: RefObject<Spot | null>
  send: (event: DeskEvent) => void
  onCommand: (command: Command) => void
  onPressed: (at: Spot, size: Readonly<{ w: number; h: number }>) => void
  onWritten: (text: string | null) => void
  /** What is said at its foot. */
  children: ReactNode
}>

/** The strip in hand: whole, framed, pulled to the left, its mark ringed in the margin and its mark points beneath it. */
export function StripInHand({ state, sizes, editing, hover, send, onCommand, onPressed, onWritten, children }: StripInHandProps) {
  const strip = state.strips[state.hand]!
  const pen = penOf(state.run.round)
  const stamps = stampsOf(strip)
  const begun = responseState(strip.marking) !== 'unmarked'
  const spot = (scriptPageId: string | null, at: PaperPoint): Spot => ({ scriptPageId, x: at.x, y: at.y })
  return (
    <li className={`${styles.strip} ${styles.now}`} aria-current="true">
      <div className={styles.who}><span className="swipe">{strip.name ?? <><span className={styles.wide}>Script </span>{strip.number}</>}</span></div>
      <div className={styles.whole}>
        <div className={styles.sheets}>
          {strip.pictures.length === 0 && <p className="p-4">No answer space has been drawn for this question.</p>}
          {strip.pictures.map((picture, k) => {
            const width = widthOfSpace(picture, strip, sizes)
            const scale = width / picture.rect.w
            const lastHere = strip.pictures.findLastIndex((other) => other.scriptPageId === picture.scriptPageId) === k
            return (
              <SpacePicture key={`${strip.responseId} ${picture.spaceId}`} picture={picture} width={width} density={sizes.density} alt={`Handwritten answer to ${state.run.question.label}, script ${strip.number}. ${sayStamps(strip, state.run)}`}>
                <div className={styles.canvas}>
                  <StampCanvas
                    rect={picture.rect} width={width} pen={pen} selected={state.selected} fixed={strip.bar !== null} armed={state.pen !== null}
                    stamps={stamps.filter((stamp) => stamp.scriptPageId === picture.scriptPageId)} pressed={state.pointer && state.pointer.scriptPageId === picture.scriptPageId ? state.pointer : null}
                    onSelect={(id) => send({ type: 'select', id })} onMoved={(stamp, to) => send({ type: 'put', id: stamp.id, at: spot(picture.scriptPageId, to) })}
                    onPressed={(at, size) => onPressed(spot(picture.scriptPageId, at), size)} onPointed={(at) => { hover.current = spot(picture.scriptPageId, at) }}
                  />
                </div>
                {editing && lastHere && editing.at.scriptPageId === picture.scriptPageId && (
                  <NoteEditor label={`Note on script ${strip.number}`} text={editing.text} onDone={onWritten} onCancel={() => onWritten(null)}
                    style={{ left: Math.max(0, Math.min((editing.at.x - picture.rect.x) * scale, width - 270)), top: Math.max(0, Math.min((editing.at.y - picture.rect.y - 12) * scale, picture.rect.h * scale - 76)) }} />
                )}
              </SpacePicture>
            )
          })}
        </div>
        <StampList state={state} onSelect={(id) => send({ type: 'select', id })} onTakeBack={(id) => send({ type: 'take-back', id })} />
        <PointKeys strip={strip} run={state.run} onCommand={onCommand} />
        {children}
      </div>
      <div className={styles.mark}>
        {saysMark(stamps) ? <RingedMark mark={markOf(stamps)} pen={pen} width={sizes.margin > 100 ? 62 : 52} /> : <span className={styles.none}>not marked</span>}
        <small>of {sayMark(state.run.question.maximum)}</small>
        {begun && <small>{sayStanding(strip) || 'settled'}</small>}
      </div>
    </li>
  )
}
