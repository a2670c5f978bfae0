import type { PaperRect } from '@/lib/core/paper-space'
import type { Pen, Stamp } from '@/lib/core/stamp'
import { InkOnSvg } from './ink-on-svg'

const penClass: Readonly<Record<Pen, string>> = { first: 'p1', second: 'p2', agreed: 'p3' }

type StampsOnSvgProps = Readonly<{ stamps: readonly Stamp[]; rect: PaperRect; pen: Pen; /** Their words, for those who cannot see them; without it they are said beside the picture. */ says?: string }>

/** Stamps at rest over a picture of `rect`. */
export function StampsOnSvg({ stamps, rect, pen, says }: StampsOnSvgProps) {
  const told = says === undefined ? { 'aria-hidden': true } : { role: 'img', 'aria-label': says }
  return (
    <svg className={`ink ${penClass[pen]}`} viewBox={`${rect.x} ${rect.y} ${rect.w} ${rect.h}`} {...told}>
      {stamps.map((stamp) => <InkOnSvg key={stamp.id} stamp={stamp} />)}
    </svg>
  )
}
