import type { GreyPicture } from '@/lib/core/grey-picture'

/** Edges, holes, staples and folded corners lie within this of a leaf's edge: 20 mm at 25 dpi. */
const edge = 20
const faint = 26
const fewest = 8

/**
 * Whether nothing is on a leaf, neither print nor writing: dust, a streak from the glass and what shines through from the back do not count.
 * `ink` is the levelled ink at 25 dpi. Errs to "something is there": a short faint line is enough.
 */
export function isEmpty({ width, height, data }: GreyPicture): boolean {
  const inked = (x: number, y: number) => data[y * width + x]! > faint
  const streaked = Array.from({ length: width }, (_, x) => {
    let run = 0
    for (let y = edge; y < height - edge; y++) run += inked(x, y) ? 1 : 0
    return run > 0.4 * (height - 2 * edge)
  })
  let strokes = 0
  for (let y = edge; y < height - edge; y++)
    for (let x = edge; x < width - edge; x++) {
      if (!inked(x, y) || streaked[x]) continue
      let beside = 0
      for (let j = -1; j <= 1; j++) for (let i = -1; i <= 1; i++) if ((i || j) && inked(x + i, y + j) && !streaked[x + i]) beside++
      if (beside >= 2 && ++strokes >= fewest) return false
    }
  return true
}
