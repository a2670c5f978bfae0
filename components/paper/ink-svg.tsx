import { pathData, type Ink } from '@/lib/core/ink'
import { fontOf } from '@/lib/core/text-widths'

/** Paints ink as SVG in the user units of the drawing round it, which are paper points. The colour is that of the text. */
export function InkSvg({ inks }: { inks: readonly Ink[] }) {
  return inks.map((ink, k) => {
    if (ink.kind === 'filled') return <path key={k} d={pathData(ink.path)} fill="currentColor" />
    if (ink.kind === 'line') {
      return <path key={k} d={pathData(ink.path)} fill="none" stroke="currentColor" strokeWidth={ink.width} strokeLinecap={ink.dash ? 'butt' : 'round'} strokeLinejoin="round" strokeDasharray={ink.dash?.join(' ')} />
    }
    const { family, weight, italic } = fontOf[ink.font]
    const style = { fontFamily: `var(--${family})`, fontWeight: weight, fontStyle: italic ? 'italic' : 'normal', fontSize: ink.size, letterSpacing: ink.spacing } as const
    return <text key={k} x={ink.at.x} y={ink.at.y} textAnchor={ink.anchor} fill="currentColor" style={style}>{ink.text}</text>
  })
}
