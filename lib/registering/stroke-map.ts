import { deflateRawSync } from 'node:zlib'
import type { GreyPicture } from '@/lib/core/grey-picture'
import { strokeCellPoints, type StrokeMap } from '@/lib/core/leaf'
import { inverse, type Homography } from '@/lib/core/paper-space'
import type { Template } from './template'

/** Darker than this on levelled paper is written, light pencil too; what shines through from the back stays brighter. */
const written = 195
/** Near the page's edge lie the lid, holes and staples: 10 mm, in pixels of 100 dpi. */
const margin = 40
/** What hangs together and reaches less far than this, in pixels of 100 dpi (1.3 mm), is dust. */
const shortest = 5
/** A line as long as this share of the page and as thin as this is dirt on the scanner's glass. */
const streakShare = 0.3
const streakWidth = 4

/** Room for one leaf, used again for the next: whether a pixel is dark and no print, and where on the template it lies. */
let room = { marks: new Uint8Array(0), places: new Int32Array(0) }

/**
 * Where a pen went on a page: what hangs together as strokes do, where the blank page has no print within half a millimetre; dots, streaks
 * and what shines through left out. Pixels of 100 dpi in squares of 1 mm. `map` takes template to leaf pixels (100 dpi).
 */
export function strokeMap(leaf: GreyPicture, template: Template, map: Homography): StrokeMap {
  const { width, height } = template.white
  const cell = (strokeCellPoints * 100) / 72
  const columns = Math.ceil(width / cell)
  const counts = new Uint8Array(columns * Math.ceil(height / cell))
  const inked = markInked(leaf, template, inverse(map))
  const { marks, places } = room
  const part: number[] = []
  for (const start of inked) {
    if (marks[start] !== 1) continue
    part.length = 0
    if (!isStroke(gather(marks, leaf.width, start, part), leaf)) continue
    for (const at of part) {
      const place = places[at]!
      counts[Math.floor(Math.floor(place / width) / cell) * columns + Math.floor((place % width) / cell)]!++
    }
  }
  return { columns, cells: deflateRawSync(counts).toString('base64') }
}

/** Marks the leaf's dark pixels that are no print, and notes where on the template each lies. */
function markInked({ width, height, data }: GreyPicture, { white, free }: Template, [[a, b, c], [d, e, f], [g, h, i]]: Homography): number[] {
  if (room.marks.length < data.length) room = { marks: new Uint8Array(data.length), places: new Int32Array(data.length) }
  const { marks, places } = room
  marks.fill(0)
  const inked: number[] = []
  const [right, bottom] = [white.width - margin, white.height - margin]
  for (let y = 0, at = 0; y < height; y++)
    for (let x = 0; x < width; x++, at++) {
      if (data[at]! >= written) continue
      const w = g * (x + 0.5) + h * (y + 0.5) + i
      const u = Math.floor((a * (x + 0.5) + b * (y + 0.5) + c) / w)
      const v = Math.floor((d * (x + 0.5) + e * (y + 0.5) + f) / w)
      if (!(u >= margin && v >= margin && u < right && v < bottom) || free[v * white.width + u] === 0) continue
      marks[at] = 1
      places[at] = v * white.width + u
      inked.push(at)
    }
  return inked
}

type Extent = Readonly<{ wide: number; high: number }>

/** Collects what hangs together with a pixel (corners count) and takes it off the marks. */
function gather(marks: Uint8Array, width: number, start: number, part: number[]): Extent {
  let [left, right, top, bottom] = [width, 0, Infinity, 0]
  marks[start] = 2
  part.push(start)
  for (let k = 0; k < part.length; k++) {
    const at = part[k]!
    const x = at % width
    const y = Math.floor(at / width)
    left = Math.min(left, x)
    right = Math.max(right, x)
    top = Math.min(top, y)
    bottom = Math.max(bottom, y)
    for (let j = -width; j <= width; j += width)
      for (let i = -1; i <= 1; i++)
        if (marks[at + j + i] === 1) {
          marks[at + j + i] = 2
          part.push(at + j + i)
        }
  }
  return { wide: right - left + 1, high: bottom - top + 1 }
}

function isStroke({ wide, high }: Extent, leaf: GreyPicture): boolean {
  const long = Math.max(wide, high)
  return long >= shortest && !(Math.min(wide, high) <= streakWidth && long > streakShare * Math.max(leaf.width, leaf.height))
}
