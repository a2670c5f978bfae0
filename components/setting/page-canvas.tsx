'use client'
import { Fragment, useState } from 'react'
import { Image as Picture, Layer, Line, Rect, Stage } from 'react-konva'
import type { PaperPage } from '@/lib/core/paper'
import type { PaperRect } from '@/lib/core/paper-space'
import type { DrawnBox } from './boxes-on-page'

type PageCanvasProps = Readonly<{
  page: PaperPage
  scale: number
  image: HTMLImageElement | null
  boxes: readonly DrawnBox[]
  inHand: string | null
  /** A box as it is being drawn or changed. */
  draft: Readonly<{ key: string; rect: PaperRect }> | null
}>

const handle = 9

/** The inks of the page never change with the theme. */
function readInks() {
  const style = getComputedStyle(document.documentElement)
  const ink = (name: string) => style.getPropertyValue(name).trim()
  return { line: ink('--stamp-3'), hand: ink('--on-hand'), sheet: ink('--sheet') }
}

/** Paints a page of the blank paper with its boxes. Only paints: pen and keys are handled around it. */
export function PageCanvas({ page, scale, image, boxes, inHand, draft }: PageCanvasProps) {
  const [inks] = useState(readInks)
  const [width, height] = [page.width * scale, page.height * scale]
  const shown = boxes.map((box) => (draft?.key === box.key ? { ...box, rect: draft.rect } : box))
  return (
    <Stage width={width} height={height} listening={false}>
      <Layer listening={false}>
        <Rect width={width} height={height} fill={inks.sheet} />
        {image && <Picture image={image} width={width} height={height} />}
        {shown.map((box) => <Box key={box.key} box={box} scale={scale} inks={inks} hand={box.key === inHand} />)}
        {draft?.key === 'new' && <Rect {...pixels(draft.rect, scale)} stroke={inks.hand} strokeWidth={2} dash={[6, 4]} />}
      </Layer>
    </Stage>
  )
}

function pixels({ x, y, w, h }: PaperRect, scale: number) {
  const at = (value: number) => Math.round(value * scale) + 0.5
  return { x: at(x), y: at(y), width: at(x + w) - at(x), height: at(y + h) - at(y) }
}

type BoxProps = Readonly<{ box: DrawnBox; scale: number; hand: boolean; inks: ReturnType<typeof readInks> }>

function Box({ box, scale, hand, inks }: BoxProps) {
  const { x, y, width, height } = pixels(box.rect, scale)
  const stroke = hand ? inks.hand : inks.line
  const dash = box.dashed && !hand ? [4, 3] : undefined
  const cuts = Array.from({ length: Math.max(0, box.digits - 1) }, (_, k) => x + (width * (k + 1)) / box.digits)
  return (
    <Fragment>
      <Rect x={x} y={y} width={width} height={height} stroke={stroke} strokeWidth={hand ? 2 : 1} dash={dash} opacity={hand ? 1 : 0.8} />
      {cuts.map((cut) => <Line key={cut} points={[cut, y, cut, y + height]} stroke={stroke} strokeWidth={1} dash={[3, 3]} />)}
      {box.withdrawn && <Line points={[x, y + height, x + width, y]} stroke={stroke} strokeWidth={1} />}
      {hand && handles(x, y, width, height).map(([hx, hy]) => (
        <Rect key={`${hx} ${hy}`} x={hx - handle / 2} y={hy - handle / 2} width={handle} height={handle} fill={inks.sheet} stroke={inks.hand} strokeWidth={2} />
      ))}
    </Fragment>
  )
}

function handles(x: number, y: number, w: number, h: number): [number, number][] {
  return [[x, y], [x + w / 2, y], [x + w, y], [x, y + h / 2], [x + w, y + h / 2], [x, y + h], [x + w / 2, y + h], [x + w, y + h]]
}
