import { sayMark, type HalfMarks } from '@/lib/core/marks'
import type { Pen } from '@/lib/core/stamp'

const once = 'M36.5 5.2C28 -.4 4.6 -1.2 2.2 13.6C.4 28.4 40.6 31.6 42.2 15.8C43 5.6 30.4 1.6 19.6 3'
const twice = 'M38.6 1.6C28 -5.4 .8 -4.6 -1.6 13.4C-3.2 33.2 44.4 35.6 46 15.6C46.8 3.2 32.4 -2.4 20 -1.2'

/** The mark as it stands ringed in the margin: one ring first, a broken one second, two rings agreed. `width` in px. */
export function RingedMark({ mark, pen = 'first', width = 44 }: { mark: HalfMarks; pen?: Pen; width?: number }) {
  const text = sayMark(mark)
  return (
    <svg className={`mark-ring ${pen}`} width={width} height={(width * 30) / 44} viewBox="0 0 44 30" role="img" aria-label={`${text}, ${pen} mark`}>
      <path d={once} />
      {pen === 'agreed' && <path d={twice} />}
      <text x="22" y="21" fontSize={text.length > 2 ? 14 : 17} style={text.length > 2 ? { fontSize: 14 } : undefined}>{text}</text>
    </svg>
  )
}
