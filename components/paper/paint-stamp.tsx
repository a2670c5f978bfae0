'use client'
import type Konva from 'konva'
import { Group, Rect, Shape } from 'react-konva'
import { boundsOfStamp, drawStamp } from '@/lib/core/drawing'
import type { Stamp } from '@/lib/core/stamp'
import { paintInk, type Families } from './paint-ink'

type PaintStampProps = Readonly<{
  stamp: Stamp
  colour: string
  families: Families
  /** Screen pixels to a point, so that a small stamp can still be taken hold of. */
  scale: number
  selected: boolean
  fixed: boolean
  onSelect: () => void
  onMoved: (dx: number, dy: number) => void
}>

/** The least size of what can be pressed, in screen pixels. */
const leastTarget = 24

/** One stamp on the canvas: painted, taken hold of, dragged. A frame of dashes shows that it is selected. */
export function PaintStamp({ stamp, colour, families, scale, selected, fixed, onSelect, onMoved }: PaintStampProps) {
  const box = boundsOfStamp(stamp)
  if (!box) return null
  const pad = { x: Math.max(2, (leastTarget / scale - box.w) / 2), y: Math.max(2, (leastTarget / scale - box.h) / 2) }
  const hold = { x: box.x - pad.x, y: box.y - pad.y, width: box.w + 2 * pad.x, height: box.h + 2 * pad.y }
  const dropped = ({ target }: Konva.KonvaEventObject<DragEvent>): void => {
    const { x, y } = target.position()
    target.position({ x: 0, y: 0 })
    onMoved(x, y)
  }
  const press = (event: Konva.KonvaEventObject<Event>): void => {
    event.cancelBubble = true
    onSelect()
  }
  return (
    <Group draggable={!fixed} dragDistance={4} onDragStart={onSelect} onDragEnd={dropped} onClick={press} onTap={press}>
      <Rect {...hold} fill="transparent" stroke={selected ? '#17233F' : undefined} strokeWidth={1.5 / scale} dash={[4 / scale, 3 / scale]} />
      <Shape listening={false} sceneFunc={(context) => paintInk(context._context, drawStamp(stamp), colour, families)} />
    </Group>
  )
}
