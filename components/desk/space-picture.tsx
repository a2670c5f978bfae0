import type { ReactNode } from 'react'
import type { Strip, StripPicture } from '@/lib/core/run'
import { sharpSrc, type Sizes } from './use-sizes'

/** No strip is drawn larger than this, in CSS pixels a point: a small answer space stays small. */
const largest = 2.2

/** Width in CSS pixels of one answer space: all strips of a question stand at one scale, the widest space filling the strip. */
export function widthOfSpace({ rect }: StripPicture, { pictures }: Pick<Strip, 'pictures'>, sizes: Sizes): number {
  const scale = Math.min(largest, sizes.strip / Math.max(...pictures.map((picture) => picture.rect.w)))
  return Math.round(rect.w * scale)
}

type SpacePictureProps = Readonly<{ picture: StripPicture; width: number; density: number; alt: string; children?: ReactNode }>

/** An answer space as it was written, with what lies on it. */
export function SpacePicture({ picture, width, density, alt, children }: SpacePictureProps) {
  const { rect, src } = picture
  return (
    <div className="sheet" style={{ width, height: Math.round((width * rect.h) / rect.w) }}>
      {src ? <img src={sharpSrc(src, width, rect.w, density)} alt={alt} draggable={false} decoding="async" /> : <p className="p-4 text-[#4B5771]">This page has not been scanned.</p>}
      {children}
    </div>
  )
}
