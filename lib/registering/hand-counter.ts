import type { DarkRuns } from './dark-runs'

/** Signs of a hand (digits and letters) are between these heights and widths, in pixels of 100 dpi. */
const lowest = 8
const highest = 44
const widest = 90
/** Strokes at most so wide, in pixels of 100 dpi, run up and down rather than across. */
const upright = 7
const fewestSigns = 15
const fewestSteps = 400

type Sign = { top: number; bottom: number; left: number; right: number; joined: Sign | null }
type Run = Readonly<{ from: number; to: number; sign: Sign }>

/** By what hand a page was written, whatever it says: how far upright strokes lean (pixels to the right for each upwards), and the middle height of its signs (pixels of 100 dpi). Null where too little stands free. */
export type HandTrace = Readonly<{ slant: number | null; height: number | null }>

/** Follows the strokes of a page from line to line. Students differ in slant and size more than one student's pages do. */
export class HandCounter {
  private above: Run[] = []
  private readonly signs: Sign[] = []
  private lean = 0
  private steps = 0

  /** Adds the next line of a page by its dark pieces. */
  add(found: DarkRuns, y: number): void {
    if (found.count === 0 && this.above.length === 0) return
    const runs: Run[] = []
    let k = 0
    for (let n = 0; n < found.count; n++) {
      const [from, x] = [found.from[n]!, found.to[n]!]
      while (k < this.above.length && this.above[k]!.to < from) k++
      let sign: Sign | null = null
      let touched = 0
      for (let j = k; j < this.above.length && this.above[j]!.from <= x; j++) {
        const over = this.above[j]!
        touched++
        sign = sign ? join(sign, over.sign) : root(over.sign)
        if (touched === 1 && x - from <= upright && over.to - over.from <= upright && Math.abs(x - from - over.to + over.from) <= 2) {
          this.lean += over.from + over.to - from - x
          this.steps += 2
        }
      }
      sign ??= this.begin(from, x, y)
      grow(sign, from, x, y)
      runs.push({ from, to: x, sign })
    }
    this.above = runs
  }

  result(): HandTrace {
    const heights = this.signs.flatMap(({ top, bottom, left, right, joined }) => {
      const height = bottom - top + 1
      return joined || height < lowest || height > highest || right - left > widest ? [] : [height]
    }).sort((a, b) => a - b)
    const middle = heights.slice(Math.floor(heights.length * 0.4), Math.ceil(heights.length * 0.6))
    return {
      slant: this.steps < 2 * fewestSteps ? null : this.lean / this.steps,
      height: heights.length < fewestSigns ? null : middle.reduce((sum, one) => sum + one, 0) / middle.length,
    }
  }

  private begin(from: number, to: number, y: number): Sign {
    const sign: Sign = { top: y, bottom: y, left: from, right: to, joined: null }
    this.signs.push(sign)
    return sign
  }
}

function root(sign: Sign): Sign {
  let at = sign
  while (at.joined) at = at.joined
  return at
}

function join(one: Sign, other: Sign): Sign {
  const [a, b] = [root(one), root(other)]
  if (a === b) return a
  a.top = Math.min(a.top, b.top)
  grow(a, b.left, b.right, b.bottom)
  b.joined = a
  return a
}

function grow(sign: Sign, left: number, right: number, bottom: number): void {
  sign.left = Math.min(sign.left, left)
  sign.right = Math.max(sign.right, right)
  sign.bottom = Math.max(sign.bottom, bottom)
}
