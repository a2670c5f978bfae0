import { drawStamp } from '@/lib/core/drawing'
import { penColour } from '@/lib/core/ink'
import type { PaperRect } from '@/lib/core/paper-space'
import type { Pen, Stamp } from '@/lib/core/stamp'
import { InkSvg } from './ink-svg'

type StampsSvgProps = Readonly<{ stamps: readonly Stamp[]; rect: PaperRect; pen: Pen; label?: string }>

/** Stamps over a picture of `rect`, at rest: filled to the box it stands in. Without a label the words are said elsewhere. */
export function StampsSvg({ stamps, rect, pen, label }: StampsSvgProps) {
  const says = label === undefined ? { 'aria-hidden': true } : { role: 'img', 'aria-label': label }
  return (
    <svg className="ink" viewBox={`${rect.x} ${rect.y} ${rect.w} ${rect.h}`} style={{ color: penColour[pen] }} {...says}>
      {stamps.map((stamp) => <InkSvg key={stamp.id} inks={drawStamp(stamp)} />)}
    </svg>
  )
}
