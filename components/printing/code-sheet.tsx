'use client'
import { useLayoutEffect, useRef, useState, type KeyboardEvent, type PointerEvent } from 'react'
import type { PaperPage } from '@/lib/core/paper'
import type { PaperRect } from '@/lib/core/paper-space'
import { quietModules, codeModules } from '@/lib/core/printed-code'
import { centredAt, onPage, sayPlace, sized } from './code-spot-edits'
import css from './printing.module.css'

type CodeSheetProps = Readonly<{ picture: string; page: PaperPage; rect: PaperRect | null; refused: boolean; spaces: readonly PaperRect[]; onPlace: (rect: PaperRect) => void }>
type At = Readonly<{ x: number; y: number }>

const widest = 700
const inset = `${(100 * quietModules) / (codeModules + 2 * quietModules)}%`
/** Points for one press of an arrow key. */
const step = 2
const arrows: Record<string, readonly [number, number]> = { ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowUp: [0, -1], ArrowDown: [0, 1] }

/** A page of the blank paper with its code as a square that is moved by pointing, dragging or keys. */
export function CodeSheet({ picture, page, rect, refused, spaces, onPlace }: CodeSheetProps) {
  const frame = useRef<HTMLDivElement>(null)
  const [width, setWidth] = useState(widest)
  const [drag, setDrag] = useState<{ from: At; start: PaperRect; rect: PaperRect } | null>(null)
  useLayoutEffect(() => {
    const element = frame.current?.parentElement
    if (!element) return
    const measure = () => setWidth(Math.min(widest, Math.max(260, element.clientWidth - 2 * parseFloat(getComputedStyle(element).paddingLeft))))
    measure()
    const observer = new ResizeObserver(measure)
    observer.observe(element)
    return () => observer.disconnect()
  }, [])
  const scale = width / page.width
  const point = (event: PointerEvent<HTMLElement>): At => {
    const box = frame.current!.getBoundingClientRect()
    return { x: (event.clientX - box.left) / scale, y: (event.clientY - box.top) / scale }
  }
  function onPointerDown(event: PointerEvent<HTMLElement>) {
    if (event.button !== 0) return
    const at = point(event)
    const on = rect && at.x >= rect.x && at.x <= rect.x + rect.w && at.y >= rect.y && at.y <= rect.y + rect.h
    if (!on) return onPlace(centredAt(at, page, rect?.w))
    event.preventDefault()
    frame.current!.setPointerCapture(event.pointerId)
    setDrag({ from: at, start: rect, rect })
  }
  function onPointerMove(event: PointerEvent<HTMLElement>) {
    if (!drag) return
    const at = point(event)
    setDrag({ ...drag, rect: onPage({ ...drag.start, x: drag.start.x + at.x - drag.from.x, y: drag.start.y + at.y - drag.from.y }, page) })
  }
  function onPointerUp() {
    if (drag && (drag.rect.x !== drag.start.x || drag.rect.y !== drag.start.y)) onPlace(drag.rect)
    setDrag(null)
  }
  function onKeyDown(event: KeyboardEvent<HTMLElement>) {
    if (!rect || event.ctrlKey || event.metaKey || event.altKey) return
    const arrow = arrows[event.key]
    const by = event.shiftKey ? 10 * step : step
    const next = arrow ? onPage({ ...rect, x: rect.x + arrow[0] * by, y: rect.y + arrow[1] * by }, page) : event.key === '+' || event.key === '=' ? sized(rect, step, page) : event.key === '-' ? sized(rect, -step, page) : null
    if (!next) return
    event.preventDefault()
    onPlace(next)
  }
  const now = drag?.rect ?? rect
  const placed = ({ x, y, w, h }: PaperRect) => ({ left: x * scale, top: y * scale, width: w * scale, height: h * scale })
  return (
    <div ref={frame} className={css.sheet} style={{ width, height: page.height * scale }} onPointerDown={onPointerDown} onPointerMove={onPointerMove} onPointerUp={onPointerUp} onPointerCancel={() => setDrag(null)}>
      <img src={picture} alt="" draggable={false} />
      {spaces.map((space, k) => <span key={k} aria-hidden className={css.space} style={placed(space)} />)}
      {now && (
        <button type="button" className={`${css.code} ${refused ? css.refused : ''}`} style={placed(now)} onKeyDown={onKeyDown} aria-describedby="code-help" aria-label={`The code of page ${page.page}, ${sayPlace(now, page)}${refused ? ', cannot stand here' : ''}`}>
          <i aria-hidden style={{ inset }}>{[css.topLeft, css.topRight, css.bottomLeft].map((corner) => <b key={corner} className={corner} />)}</i>
        </button>
      )}
      <p id="code-help" className="vh">Arrow keys move it, with shift further. Plus and minus change its size.</p>
    </div>
  )
}
