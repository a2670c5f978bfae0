import { drawStamp } from '@/lib/core/drawing'
import { pathData, type Ink } from '@/lib/core/ink'
import type { Stamp } from '@/lib/core/stamp'
import { fontOf } from '@/lib/core/text-widths'

function InkMark({ ink }: { ink: Ink }) {
  if (ink.kind === 'filled') return <path className="f" d={pathData(ink.path)} />
  if (ink.kind === 'line') return <path className="l" d={pathData(ink.path)} style={{ strokeWidth: ink.width }} strokeDasharray={ink.dash?.join(' ')} strokeLinecap={ink.dash ? 'butt' : 'round'} />
  const { family, weight, italic } = fontOf[ink.font]
  const style = { fontFamily: `var(--${family})`, fontWeight: weight, fontStyle: italic ? 'italic' : 'normal', fontSize: ink.size, letterSpacing: ink.spacing || undefined }
  return <text x={ink.at.x} y={ink.at.y} textAnchor={ink.anchor} style={style}>{ink.text}</text>
}

/** The painter for a page of HTML: one stamp's ink, inside an `svg.ink` whose view box is in paper points. `bare` leaves its small figures out. */
export function InkOnSvg({ stamp, bare = false }: { stamp: Stamp; bare?: boolean }) {
  return <g>{drawStamp(stamp).map((ink, k) => (bare && ink.kind === 'text' ? null : <InkMark key={k} ink={ink} />))}</g>
}
