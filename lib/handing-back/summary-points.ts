import { drawTicks } from '@/lib/core/drawing'
import { sayMark } from '@/lib/core/marks'
import { sayWorth } from '@/lib/core/say-stamp'
import type { Pen } from '@/lib/core/stamp'
import { tickAnchor } from '@/lib/core/stamp-shapes'
import { ink, type Sheet } from './sheet'
import type { PointResult } from '@/lib/core/returned'
import { leading, plain } from './summary-sheets'
import type { Typesetter } from '@/lib/typesetting/typesetter'

/** A word of a mark point on a line, `x` from the line's left; the point's sign comes after its last word. */
type Placed = Readonly<{ words: string; x: number; point: PointResult; signX: number | null }>
export type PointLine = readonly Placed[]

const signGap = 3.75
const pointGap = 13.5
const tickScale = 0.6

/** Breaks mark points into lines: a point goes to the next line whole where it fits there, and is broken at spaces only where it does not. */
export function flowPoints(type: Typesetter, points: readonly PointResult[], room: number): PointLine[] {
  const lines: Placed[][] = []
  let x = room
  for (const point of points) {
    const tail = signGap + signWidth(type, point)
    const whole = type.width(point.says, 'sans', plain.size) + tail
    const words = whole <= room ? [point.says] : type.lines(point.says, 'sans', plain.size, room - tail)
    if (x + whole > room) x = room
    words.forEach((words, k) => {
      if (k > 0 || x === room) {
        lines.push([])
        x = 0
      }
      const end = x + type.width(words, 'sans', plain.size)
      lines.at(-1)!.push({ words, x, point, signX: null })
      x = end
    })
    const last = lines.at(-1)?.pop()
    if (last) lines.at(-1)!.push({ ...last, signX: x + signGap })
    x += tail + pointGap
  }
  return lines
}

/** Up to three ticks say a worth; above that one tick stands with the figure after it. */
function ticksOf({ earned }: PointResult): number {
  return earned > 6 ? 1 : Math.ceil(earned / 2)
}

/** Where the words after a point's ticks begin, from the left of the ticks. */
function afterTicks(point: PointResult): number {
  return (7 + 13 * ticksOf(point)) * tickScale + 3
}

function afterWords({ earned, worth }: PointResult): string {
  return [earned > 6 ? sayMark(earned) : '', earned < worth ? 'in part' : ''].filter((words) => words !== '').join(' ')
}

function signWidth(type: Typesetter, point: PointResult): number {
  return point.earned === 0 ? 8 : afterTicks(point) - 3 + 3 * Math.sign(afterWords(point).length) + type.width(afterWords(point), 'sans', plain.size)
}

/** Earned points in ink with their ticks, others soft with an open circle. */
export function drawPoints(sheet: Sheet, lines: readonly PointLine[], left: number, baseline: number, pen: Pen): void {
  lines.forEach((line, k) => {
    const y = baseline + leading * k
    for (const { words, x, point, signX } of line) {
      sheet.line(words, left + x, y, { ...plain, colour: point.earned > 0 ? ink.text : ink.soft })
      if (signX !== null) drawSign(sheet, point, left + signX, y, pen)
    }
  })
}

function drawSign(sheet: Sheet, point: PointResult, x: number, y: number, pen: Pen): void {
  if (point.earned === 0) return sheet.circle(x + 3.6, y - 3.6, 2.7, 'not earned')
  // Without figures: they would be too small to read here. A half's bar says what it is.
  const inks = drawTicks(tickAnchor, point.earned).filter((ink) => ink.kind !== 'text')
  sheet.stamps([{ pen, inks }], x, y - 16.6 * tickScale, tickScale, sayWorth(point.earned))
  sheet.line(afterWords(point), x + afterTicks(point), y, plain)
}
