import { boundsOfStamp, drawStamp } from '@/lib/core/drawing'
import { halves } from '@/lib/core/marks'
import type { Stamp, StampKind } from '@/lib/core/stamp'
import { InkSvg } from '@/components/paper/ink-svg'

type StampIconProps = Readonly<{ kind: StampKind; worth?: number; text?: string; scale?: number }>

/** A stamp as it will be drawn, small, for a key. */
export function StampIcon({ kind, worth = kind === 'tick' ? 2 : kind === 'half' ? 1 : 0, text = '', scale = 1.2 }: StampIconProps) {
  const stamp: Stamp = { id: '', markingId: '', version: 1, kind, worth: halves(worth), markPointId: null, scriptPageId: null, x: 0, y: 0, w: kind === 'ring' ? 22 : 22, h: kind === 'ring' ? 15 : 0, text, path: [], removed: false }
  const box = boundsOfStamp(stamp)
  if (!box) return null
  return <svg aria-hidden width={box.w * scale} height={box.h * scale} viewBox={`${box.x} ${box.y} ${box.w} ${box.h}`} style={{ overflow: 'visible' }}><InkSvg inks={drawStamp(stamp)} /></svg>
}
