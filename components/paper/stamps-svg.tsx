import type { PaperRect } from '@/lib/core/paper-space'
import type { Pen, Stamp } from '@/lib/core/stamp'
import { InkOnSvg } from './ink-on-svg'

const penClass: Readonly<Record<Pen, string>> = { first: 'p1', second: 'p2', agreed: 'p3' }

/** Stamps at rest over a picture of `rect`; their words are said beside it. */
export function StampsSvg({ stamps, rect, pen }: Readonly<{ stamps: readonly Stamp[]; rect: PaperRect; pen: Pen }>) {
  return (
    <svg className={`ink ${penClass[pen]}`} viewBox={`${rect.x} ${rect.y} ${rect.w} ${rect.h}`} aria-hidden>
      {stamps.map((stamp) => <InkOnSvg key={stamp.id} stamp={stamp} />)}
    </svg>
  )
}
