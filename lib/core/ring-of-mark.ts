import { line, outline, text, type Ink } from './ink'
import { sayMark, type HalfMarks } from './marks'
import type { PaperPoint, PaperRect } from './paper-space'
import type { Pen } from './stamp'
import { markRingAroundShape, markRingShape } from './stamp-shapes'
import { widthOf } from './text-widths'

/** A mark's ring in the margin, in points; an agreed one overruns its box by 3. */
const markRingBox = { w: 44, h: 30 }
const ringLine = 1.7
const overrun = 4

/**
 * The mark of a response in its ring, box top left at `at`. The pens differ by shape as well as colour: first a single ring, second a
 * broken one, agreed a double one.
 */
export function ringOfMark(mark: HalfMarks, pen: Pen, at: PaperPoint): readonly Ink[] {
  const ring = outline(markRingShape, at, ringLine, pen === 'second' ? [6, 3.4] : null)
  const around = pen === 'agreed' ? [outline(markRingAroundShape, at, ringLine)] : []
  const long = sayMark(mark).length >= 3
  return [ring, ...around, ...figureWithHalf(mark, { x: at.x + 22, y: at.y + (long ? 20 : 21) }, long ? 14 : 17)]
}

/** The mark of a page at the foot of its right margin: a figure between two thin lines, as under a column of figures. `shown` as below. */
export function pageTotal(mark: HalfMarks, pen: Pen, shown: PaperRect): readonly Ink[] {
  const middle = shown.x + shown.w - overrun - markRingBox.w / 2
  const baseline = shown.y + shown.h - 14
  const rule = (y: number): Ink => line([['M', middle - 15, y], ['L', middle + 15, y]], 0.8, pen === 'second' ? [6, 3.4] : null)
  return [rule(baseline - 15), rule(baseline + 4), ...(pen === 'agreed' ? [rule(baseline + 6.2)] : []), ...figureWithHalf(mark, { x: middle, y: baseline }, 14)]
}

/**
 * Where the rings of a page go: in the right margin beside the foot of each answer space, in order, moved until none lies on another.
 * `shown` is the part of the paper that can be drawn on, in points: all of it, or what a scan shows of it; `rightAt` its right edge at a
 * height, where that slants.
 */
export function ringPlaces(spaces: readonly PaperRect[], shown: PaperRect, rightAt = (_y: number): number => shown.x + shown.w): PaperPoint[] {
  const pitch = markRingBox.h + 2 * overrun
  const [highest, lowest] = [shown.y + overrun, shown.y + shown.h - markRingBox.h - overrun]
  const taken: number[] = []
  const free = (y: number): boolean => taken.every((other) => Math.abs(other - y) >= pitch)
  return spaces.map((space) => {
    const wanted = Math.max(highest, Math.min(space.y + space.h - markRingBox.h - overrun, lowest))
    // Looks down and up in turn, a quarter of a ring at a time; a page too full for its rings gets this one over another.
    const places = Array.from({ length: 200 }, (_, k) => wanted + (k % 2 === 0 ? -1 : 1) * Math.ceil(k / 2) * (pitch / 4))
    const y = places.find((place) => place >= highest && place <= lowest && free(place)) ?? wanted
    taken.push(y)
    const right = Math.min(rightAt(y - overrun), rightAt(y + markRingBox.h + overrun))
    return { x: right - markRingBox.w - overrun, y }
  })
}

/** A figure about `at.x`, its half set off by .06 of the size. */
function figureWithHalf(mark: HalfMarks, at: PaperPoint, size: number): Ink[] {
  const words = sayMark(mark)
  const whole = words.replace('½', '')
  if (whole === '' || whole === words) return [text(words, at, 'figure', size, 'middle')]
  const air = 0.06 * size
  const left = at.x - (widthOf(words, 'figure', size) + air) / 2
  return [text(whole, { x: left, y: at.y }, 'figure', size), text('½', { x: left + widthOf(whole, 'figure', size) + air, y: at.y }, 'figure', size)]
}
