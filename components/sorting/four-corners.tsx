'use client'
import { useState, type KeyboardEvent, type PointerEvent } from 'react'
import { inverse, toPixels, turning, type PixelPoint, type Turn } from '@/lib/core/paper-space'
import style from './sorting.module.css'

type At = Readonly<{ x: number; y: number }>
type FourCornersProps = Readonly<{ width: number; height: number; turn: Turn; busy: boolean; onDone: (corners: PixelPoint[]) => void; onCancel: () => void }>

const names = ['top left', 'top right', 'bottom right', 'bottom left'] as const
const start: readonly At[] = [{ x: 0.04, y: 0.03 }, { x: 0.96, y: 0.03 }, { x: 0.96, y: 0.97 }, { x: 0.04, y: 0.97 }]
const arrows: Record<string, At> = { ArrowLeft: { x: -1, y: 0 }, ArrowRight: { x: 1, y: 0 }, ArrowUp: { x: 0, y: -1 }, ArrowDown: { x: 0, y: 1 } }

/** Where shares of the shown picture (0 to 1) lie on the stored image, in its pixels. */
export function storedCorners(shown: readonly At[], width: number, height: number, turn: Turn): PixelPoint[] {
  const [w, h] = turn % 180 === 0 ? [width, height] : [height, width]
  const back = inverse(turning(turn, width, height))
  return shown.map(({ x, y }) => toPixels(back, { x: x * w, y: y * h }))
}

/**
 * Four handles on a leaf whose print was not found: dragged, or moved by the arrows, to where the corners of the printed page lie.
 * Width and height are pixels of the stored image.
 */
export function FourCorners({ width, height, turn, busy, onDone, onCancel }: FourCornersProps) {
  const [at, setAt] = useState<readonly At[]>(start)
  const move = (k: number, to: At) => setAt((before) => before.map((one, j) => (j === k ? { x: clamp(to.x), y: clamp(to.y) } : one)))
  const drag = (k: number) => (event: PointerEvent<HTMLButtonElement>) => {
    const box = event.currentTarget.parentElement!.getBoundingClientRect()
    if (event.currentTarget.hasPointerCapture(event.pointerId)) move(k, { x: (event.clientX - box.left) / box.width, y: (event.clientY - box.top) / box.height })
  }
  const step = (k: number) => (event: KeyboardEvent<HTMLButtonElement>) => {
    const by = arrows[event.key]
    if (!by) return
    event.preventDefault()
    const far = event.shiftKey ? 0.02 : 0.002
    move(k, { x: at[k]!.x + by.x * far, y: at[k]!.y + by.y * far })
  }
  return (
    <>
      <svg className={style.edges} viewBox="0 0 1 1" preserveAspectRatio="none" aria-hidden><polygon points={at.map(({ x, y }) => `${x},${y}`).join(' ')} /></svg>
      {at.map(({ x, y }, k) => (
        <button key={names[k]} type="button" className={style.corner} style={{ left: `${x * 100}%`, top: `${y * 100}%` }} aria-label={`Corner ${names[k]}: ${Math.round(x * 100)} % across, ${Math.round(y * 100)} % down`}
          autoFocus={k === 0} onPointerDown={(event) => event.currentTarget.setPointerCapture(event.pointerId)} onPointerMove={drag(k)} onKeyDown={step(k)} />
      ))}
      <div className="sticky bottom-0 flex flex-wrap items-center gap-3 border-t border-ink bg-paper p-3">
        <button type="button" className="btn lead" disabled={busy} onClick={() => onDone(storedCorners(at, width, height, turn))}>The page lies here</button>
        <button type="button" className="btn plain" onClick={onCancel}>Not like this</button>
        <span className="dense soft">Drag each corner to the edge of the printed page; arrows move it too.</span>
      </div>
    </>
  )
}

function clamp(share: number): number {
  return Math.min(1.2, Math.max(-0.2, share))
}
