import type { CSSProperties } from 'react'
import { boundsOf } from '@/lib/core/ink'
import { drawStamp } from '@/lib/core/drawing'
import { halves } from '@/lib/core/marks'
import type { Stamp, StampKind } from '@/lib/core/stamp'
import { InkOnSvg } from '@/components/paper/ink-on-svg'

type StampIconProps = Readonly<{ kind: StampKind; scale?: number }>
const worths: Readonly<Partial<Record<StampKind, number>>> = { tick: 2, half: 1 }

/** A stamp as it will be drawn, small, in the colour of the type round it. Its figures are left out: they would be too small to read. */
export function StampIcon({ kind, scale = 1.2 }: StampIconProps) {
  const stamp: Stamp = { id: '', markingId: '', version: 1, kind, worth: halves(worths[kind] ?? 0), markPointId: null, scriptPageId: null, x: 0, y: 0, w: 22, h: kind === 'ring' ? 15 : 0, text: '', path: [], removed: false }
  const bare = kind === 'tick' || kind === 'half'
  const box = boundsOf(drawStamp(stamp).filter((ink) => !bare || ink.kind !== 'text'))
  if (!box) return null
  return (
    <svg className="ink" aria-hidden width={box.w * scale} height={box.h * scale} viewBox={`${box.x} ${box.y} ${box.w} ${box.h}`} style={{ overflow: 'visible', '--c': 'currentColor' } as CSSProperties}>
      <InkOnSvg stamp={stamp} bare={bare} />
    </svg>
  )
}
