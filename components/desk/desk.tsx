'use client'
import { useCallback, useMemo, useRef, useState, type ReactNode } from 'react'
import { TopBar } from '@/components/ui/top-bar'
import type { Run } from '@/lib/core/run'
import type { StampKind } from '@/lib/core/stamp'
import { DeskHead } from './desk-head'
import { stampsOf, type Spot } from './desk-state'
import { freeSpot } from './desk-step'
import { Fan } from './fan'
import { FootLine } from './foot-line'
import type { Command } from './keys'
import { PenTray } from './pen-tray'
import { SavedStatus } from './saved-status'
import { sayHand, saySays } from './say-desk'
import { SchemeFold } from './scheme-fold'
import { StripInHand, type Editing } from './strip-in-hand'
import { useDesk } from './use-desk'
import { useDeskKeys } from './use-desk-keys'
import { useSizes } from './use-sizes'
import { WholePage } from './whole-page'
import styles from './desk.module.css'

type DeskProps = Readonly<{ run: Run; responseId: string | null; end: ReactNode }>

const written: readonly StampKind[] = ['note', 'caret', 'code']
const drawnOut: readonly StampKind[] = ['ring', 'underline', 'wavy']

/** The marking desk: the run of one question, marked with keys, mouse or pen. */
export function Desk({ run, responseId, end }: DeskProps) {
  const { state, saving, send, retry } = useDesk(run, responseId)
  const sizes = useSizes()
  const [view, setView] = useState({ scheme: false, page: false, codeAwaited: false })
  const [editing, setEditing] = useState<Editing | null>(null)
  const hover = useRef<Spot | null>(null)
  const strip = state.strips[state.hand]

  const write = useCallback((at: Spot): void => {
    const stamp = stampsOf(strip).find((candidate) => candidate.id === state.selected && written.includes(candidate.kind))
    setEditing(stamp ? { at: stamp, stampId: stamp.id, text: stamp.text } : { at, stampId: null, text: '' })
  }, [state.selected, strip])

  const onCommand = useCallback((command: Command): void => {
    setView((now) => ({ ...now, codeAwaited: command.do === 'await-code', scheme: command.do === 'scheme' ? !now.scheme : now.scheme, page: command.do === 'whole-page' ? !now.page : command.do === 'let-go' ? false : now.page }))
    const at = hover.current
    switch (command.do) {
      case 'point': {
        const point = state.run.question.points[command.index]
        return point && send({ type: 'point', pointId: point.id, part: command.part })
      }
      case 'stamp': return send({ type: 'stamp', kind: command.kind, ...(at ? { at } : {}) })
      case 'code': return send({ type: 'stamp', kind: 'code', text: command.code, ...(at ? { at } : {}) })
      case 'note': return write(state.pointer ?? at ?? freeSpot(state, 'note'))
      case 'nought':
      case 'nothing-written': return send({ type: 'alone', kind: command.do })
      case 'nudge': return send({ type: 'nudge', dx: command.dx, dy: command.dy })
      case 'up':
      case 'down': return send({ type: 'go', to: command.do })
      case 'first': return send({ type: 'go', to: 0 })
      case 'last': return send({ type: 'go', to: state.strips.length - 1 })
      case 'settle': return send({ type: 'settle' })
      case 'take-back': return send({ type: 'take-back' })
      case 'undo':
      case 'redo': return send({ type: command.do })
      case 'let-go': return send({ type: 'take-up', pen: null })
    }
  }, [send, state, write])

  const act = useCallback((command: Command): void => {
    onCommand(command)
    // The pointer's place is used once: after that habit leads again, until the pointer moves.
    if (command.do !== 'nudge' && command.do !== 'await-code') hover.current = null
  }, [onCommand])
  useDeskKeys(useMemo(() => ({ codeAwaited: view.codeAwaited, stampSelected: state.selected !== null }), [view.codeAwaited, state.selected]), act)

  const onPressed = (at: Spot, size: Readonly<{ w: number; h: number }>): void => {
    hover.current = null
    if (state.pen === 'note') return write(at)
    if (state.pen) return send({ type: 'stamp', kind: state.pen, at, ...(drawnOut.includes(state.pen) && size.w > 0 ? { size: state.pen === 'ring' ? size : { w: size.w, h: 0 } } : {}) })
    send({ type: 'select', id: null })
    send({ type: 'pointed', at })
  }
  const onWritten = (text: string | null): void => {
    const now = editing
    setEditing(null)
    if (text === null || !now) return
    if (now.stampId) send({ type: 'reword', id: now.stampId, text })
    else if (text.trim() !== '') send({ type: 'stamp', kind: 'note', at: now.at, text })
  }

  const { paperId, paperTitle, className, question, round } = state.run
  const onTake = useCallback((index: number): void => send({ type: 'go', to: index }), [send])
  return (
    <div className={styles.desk} style={{ '--w': `${sizes.strip}px`, '--margin': `${sizes.margin}px` } as React.CSSProperties}>
      <TopBar where={[{ label: className }, { label: paperTitle, href: round === 'first' ? `/papers/${paperId}` : `/papers/${paperId}/second-mark` }, { label: round === 'second' ? `second marks of ${question.label}` : `run of ${question.label}` }]}>
        <SavedStatus saving={saving} retry={retry} />
        {state.run.namesHidden && <span className={styles.wide}>Names hidden</span>}
        {end}
      </TopBar>
      <div className={styles.top}>
        <DeskHead state={state} />
        {view.scheme && <SchemeFold question={question} />}
      </div>
      <p className="vh" aria-live="polite">{state.says ? saySays(state.says) : sayHand(state)}</p>
      {view.page && strip ? <WholePage key={strip.responseId} state={state} sizes={sizes} onClose={() => setView((now) => ({ ...now, page: false }))} /> : (
        <Fan state={state} sizes={sizes} onTake={onTake}>
          {strip && (
            <StripInHand key="hand" state={state} sizes={sizes} editing={editing} hover={hover} send={send} onCommand={act} onPressed={onPressed} onWritten={onWritten}>
              <FootLine state={state} />
            </StripInHand>
          )}
          {!strip && <li className="slip list-none">No script of this class set has this question yet. They come in with the scan.</li>}
        </Fan>
      )}
      <PenTray state={state} codeAwaited={view.codeAwaited} onCommand={act} onTakeUp={(pen) => send({ type: 'take-up', pen })} />
    </div>
  )
}
