import { sayStamp } from '@/lib/core/say-stamp'
import { kept } from '@/lib/core/marking'
import type { StripPicture } from '@/lib/core/run'
import type { Pen, Stamp } from '@/lib/core/stamp'
import { InkOnSvg } from './ink-on-svg'

const penClass: Readonly<Record<Pen, string>> = { first: 'p1', second: 'p2', agreed: 'p3' }

/** What stamps say, in words: the text equivalent of a stamped picture. */
export function sayStamps(stamps: readonly Stamp[]): string {
  const said = kept(stamps).map(sayStamp)
  return said.length === 0 ? 'nothing stamped' : said.join('; ')
}

type StampedPictureProps = Readonly<{ pictures: readonly StripPicture[]; stamps: readonly Stamp[]; pen: Pen; name: string }>

/** The answer spaces of one response with one marking's stamps over them, one under another. `name` says whose pen it is. */
export function StampedPicture({ pictures, stamps, pen, name }: StampedPictureProps) {
  const here = kept(stamps)
  return (
    <div className="grid gap-2">
      {pictures.map(({ spaceId, scriptPageId, rect: { x, y, w, h }, src }) => (
        <div key={spaceId} className="sheet" style={{ aspectRatio: `${w} / ${h}` }}>
          {src ? <img src={src} alt="" /> : <p className="dense soft p-4">This page has not been scanned.</p>}
          <svg className={`ink ${penClass[pen]}`} viewBox={`${x} ${y} ${w} ${h}`} role="img" aria-label={`${name}: ${sayStamps(stamps)}`}>
            {here.filter((stamp) => stamp.scriptPageId === scriptPageId).map((stamp) => <InkOnSvg key={stamp.id} stamp={stamp} />)}
          </svg>
        </div>
      ))}
    </div>
  )
}
