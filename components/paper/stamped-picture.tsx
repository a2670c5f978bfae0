import { sayStamp } from '@/lib/core/say-stamp'
import { kept } from '@/lib/core/marking'
import type { StripPicture } from '@/lib/core/run'
import type { Pen, Stamp } from '@/lib/core/stamp'
import { StampsOnSvg } from './stamps-on-svg'

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
      {pictures.map(({ spaceId, scriptPageId, rect, src }) => (
        <div key={spaceId} className="sheet" style={{ aspectRatio: `${rect.w} / ${rect.h}` }}>
          {src ? <img src={src} alt="" /> : <p className="dense soft p-4">This page has not been scanned.</p>}
          <StampsOnSvg stamps={here.filter((stamp) => stamp.scriptPageId === scriptPageId)} rect={rect} pen={pen} says={`${name}: ${sayStamps(stamps)}`} />
        </div>
      ))}
    </div>
  )
}
