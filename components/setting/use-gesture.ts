'use client'
import { useState, type PointerEvent } from 'react'
import type { PaperPage } from '@/lib/core/paper'
import type { PaperRect } from '@/lib/core/paper-space'
import { keyOfHand, type DrawnBox } from './boxes-on-page'
import type { Hand, Tool } from './set-state'
import { edgesOf, joinLines, onPage, rectOf, resized, snapEdges, snapMove, type Grip, type SnapLines } from './snap'

type At = Readonly<{ x: number; y: number }>
type Gesture =
  | { kind: 'draw'; from: At; rect: PaperRect }
  | { kind: 'move'; from: At; start: PaperRect; rect: PaperRect; hand: Hand }
  | { kind: 'size'; from: At; start: PaperRect; rect: PaperRect; grip: Grip; hand: Hand }

/** In screen pixels: how near the pen must be to a handle, and an edge to a line. */
const handleReach = 9
const snapReach = 6
/** A drag shorter than this is a press. */
const least = 5

type GestureInput = Readonly<{
  page: PaperPage
  /** Screen pixels a point. */
  scale: number
  boxes: readonly DrawnBox[]
  hand: Hand | null
  tool: Tool | null
  print: SnapLines
  onTake: (hand: Hand | null) => void
  onDraw: (rect: PaperRect) => void
  onPlace: (rect: PaperRect) => void
}>

/** Drawing, moving and resizing by mouse, pen or finger. `rect` is the box as it is being changed, `at` which one it is. */
export function useGesture({ page, scale, boxes, hand, tool, print, onTake, onDraw, onPlace }: GestureInput) {
  const [gesture, setGesture] = useState<Gesture | null>(null)
  const point = (event: PointerEvent<HTMLElement>): At => {
    const box = event.currentTarget.getBoundingClientRect()
    return { x: (event.clientX - box.left) / scale, y: (event.clientY - box.top) / scale }
  }

  function onPointerDown(event: PointerEvent<HTMLElement>) {
    if (event.button !== 0) return
    const at = point(event)
    const next = tool === null ? grasp(at, boxes, hand, handleReach / scale) : null
    if (!next && tool === null && event.pointerType === 'touch') return onTake(null)
    event.preventDefault()
    event.currentTarget.setPointerCapture(event.pointerId)
    if (next && keyOfHand(next.hand) !== keyOfHand(hand)) onTake(next.hand)
    setGesture(next ?? { kind: 'draw', from: at, rect: { ...at, w: 0, h: 0 } })
  }

  function onPointerMove(event: PointerEvent<HTMLElement>) {
    if (!gesture) return
    const own = gesture.kind === 'draw' ? null : keyOfHand(gesture.hand)
    const lines = joinLines(print, edgesOf(boxes.filter(({ key }) => key !== own).map(({ rect }) => rect)))
    const rect = follow(gesture, point(event), event.altKey ? null : lines, snapReach / scale)
    setGesture({ ...gesture, rect: gesture.kind === 'draw' ? rect : onPage(rect, page) })
  }

  function onPointerUp() {
    if (!gesture) return
    setGesture(null)
    const { rect } = gesture
    if (gesture.kind !== 'draw') return JSON.stringify(rect) === JSON.stringify(gesture.start) ? undefined : onPlace(rect)
    if (Math.min(rect.w, rect.h) * scale < least) return onTake(null)
    onDraw(onPage(rect, page))
  }

  const at = gesture === null ? null : gesture.kind === 'draw' ? 'new' : keyOfHand(gesture.hand)
  return { at, rect: gesture?.rect ?? null, handlers: { onPointerDown, onPointerMove, onPointerUp, onPointerCancel: () => setGesture(null) } }
}

/** What lies under the pen: a handle of the box in hand, that box, or the smallest other one; null is the bare page. */
function grasp(at: At, boxes: readonly DrawnBox[], hand: Hand | null, reach: number): Exclude<Gesture, { kind: 'draw' }> | null {
  const own = boxes.find(({ key }) => key === keyOfHand(hand))
  const grip = own && gripAt(own.rect, at, reach)
  if (own && grip) return { kind: 'size', from: at, start: own.rect, rect: own.rect, grip, hand: own.hand }
  const under = boxes.filter(({ rect: { x, y, w, h } }) => at.x >= x && at.x <= x + w && at.y >= y && at.y <= y + h)
  const box = under.find((each) => each === own) ?? under.sort((a, b) => a.rect.w * a.rect.h - b.rect.w * b.rect.h)[0]
  return box ? { kind: 'move', from: at, start: box.rect, rect: box.rect, hand: box.hand } : null
}

/** The handle at a place: corners and the middles of sides. */
function gripAt({ x, y, w, h }: PaperRect, at: At, reach: number): Grip | null {
  for (const gy of [-1, 0, 1] as const) {
    for (const gx of [-1, 0, 1] as const) {
      if (gx === 0 && gy === 0) continue
      const [hx, hy] = [x + (w * (gx + 1)) / 2, y + (h * (gy + 1)) / 2]
      if (Math.abs(at.x - hx) <= reach && Math.abs(at.y - hy) <= reach) return { x: gx, y: gy }
    }
  }
  return null
}

function follow(gesture: Gesture, at: At, lines: SnapLines | null, reach: number): PaperRect {
  const [dx, dy] = [at.x - gesture.from.x, at.y - gesture.from.y]
  if (gesture.kind === 'move') {
    const rect = { ...gesture.start, x: gesture.start.x + dx, y: gesture.start.y + dy }
    return lines ? snapMove(rect, lines, reach) : rect
  }
  if (gesture.kind === 'size') {
    const rect = resized(gesture.start, gesture.grip, dx, dy)
    return lines ? snapEdges(rect, gesture.grip, lines, reach) : rect
  }
  const rect = rectOf(gesture.from, at)
  if (!lines) return rect
  const ends = snapEdges(rect, { x: dx < 0 ? -1 : 1, y: dy < 0 ? -1 : 1 }, lines, reach)
  return snapEdges(ends, { x: dx < 0 ? 1 : -1, y: dy < 0 ? 1 : -1 }, lines, reach)
}
