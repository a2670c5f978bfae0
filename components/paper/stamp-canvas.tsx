'use client'
import type Konva from 'konva'
import { useEffect, useRef, useState } from 'react'
import { Layer, Line, Rect, Stage } from 'react-konva'
import { penColour } from '@/lib/core/ink'
import type { PaperPoint, PaperRect } from '@/lib/core/paper-space'
import type { Pen, Stamp } from '@/lib/core/stamp'
import { PaintStamp } from './paint-stamp'
import { familiesOfPage } from './paint-ink'

type StampCanvasProps = Readonly<{
  rect: PaperRect
  /** Width of the canvas in screen pixels. */
  width: number
  stamps: readonly Stamp[]
  pen: Pen
  selected: string | null
  /** Nothing can be changed here. */
  fixed: boolean
  /** A place that was pressed and waits for a stamp. */
  pressed?: PaperPoint | null
  /** Something was taken up from the tray: the pointer draws a box and does not select. */
  armed: boolean
  onSelect: (id: string | null) => void
  onMoved: (stamp: Stamp, to: PaperPoint) => void
  /** A press on the paper, with the box drawn while the pointer was down (paper points). */
  onPressed: (at: PaperPoint, size: Readonly<{ w: number; h: number }>) => void
  onPointed: (at: PaperPoint) => void
}>

type Drawn = Readonly<{ from: PaperPoint; to: PaperPoint }>

/** The stamps of one picture, to be pressed, moved and drawn out. Everything it tells is in paper points. */
export function StampCanvas({ rect, width, stamps, pen, selected, fixed, armed, pressed = null, onSelect, onMoved, onPressed, onPointed }: StampCanvasProps) {
  const [families] = useState(familiesOfPage)
  const [, repaint] = useState(0)
  const [drawn, setDrawn] = useState<Drawn | null>(null)
  const stage = useRef<Konva.Stage>(null)
  const scale = width / rect.w
  useEffect(() => {
    let there = true
    void Promise.allSettled([document.fonts.load(`italic 500 12px ${families.book}`), document.fonts.load(`700 12px ${families.sans}`), document.fonts.load(`600 12px ${families.sans}`)]).then(() => there && repaint((n) => n + 1))
    return () => { there = false }
  }, [families])

  const pointOf = (): PaperPoint | null => {
    const at = stage.current?.getPointerPosition()
    return at ? { x: rect.x + at.x / scale, y: rect.y + at.y / scale } : null
  }
  const onPaper = (event: Konva.KonvaEventObject<Event>): boolean => event.target === event.target.getStage() || event.target.name() === 'paper'
  const down = (event: Konva.KonvaEventObject<PointerEvent>): void => {
    const at = pointOf()
    if (at && event.evt.isPrimary && (armed || onPaper(event))) setDrawn({ from: at, to: at })
  }
  const move = (): void => {
    const at = pointOf()
    if (!at) return
    if (drawn) setDrawn({ ...drawn, to: at })
    else onPointed(at)
  }
  const up = (): void => {
    if (!drawn) return
    const { from, to } = drawn
    setDrawn(null)
    const size = { w: Math.abs(to.x - from.x), h: Math.abs(to.y - from.y) }
    const far = size.w * scale > 8 || size.h * scale > 8
    onPressed(far ? { x: Math.min(from.x, to.x), y: Math.min(from.y, to.y) } : from, far ? size : { w: 0, h: 0 })
  }
  const box = drawn && { x: Math.min(drawn.from.x, drawn.to.x), y: Math.min(drawn.from.y, drawn.to.y), width: Math.abs(drawn.to.x - drawn.from.x), height: Math.abs(drawn.to.y - drawn.from.y) }
  return (
    <Stage ref={stage} width={width} height={rect.h * scale} onPointerDown={down} onPointerMove={move} onPointerUp={up} style={{ cursor: armed ? 'crosshair' : 'default', touchAction: armed ? 'none' : 'pan-y' }}>
      <Layer scaleX={scale} scaleY={scale} x={-rect.x * scale} y={-rect.y * scale}>
        <Rect name="paper" x={rect.x} y={rect.y} width={rect.w} height={rect.h} fill="transparent" />
        {stamps.map((stamp) => (
          <PaintStamp key={stamp.id} stamp={stamp} colour={penColour[pen]} families={families} scale={scale} selected={stamp.id === selected} fixed={fixed || armed}
            onSelect={() => !armed && onSelect(stamp.id)} onMoved={(dx, dy) => onMoved(stamp, { x: stamp.x + dx, y: stamp.y + dy })} />
        ))}
        {pressed && [[-5, 0, 5, 0], [0, -5, 0, 5]].map((arm, k) => <Line key={k} x={pressed.x} y={pressed.y} points={arm} stroke="#17233F" strokeWidth={1 / scale} listening={false} />)}
        {box && armed && <Rect {...box} stroke={penColour[pen]} strokeWidth={1 / scale} dash={[4 / scale, 3 / scale]} listening={false} />}
      </Layer>
    </Stage>
  )
}
