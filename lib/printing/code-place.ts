import { AppError } from '@/lib/core/errors'
import type { PaperRect } from '@/lib/core/paper-space'
import { codeModules, leastCodeSide, mostCodeSide, quietModules, type CodeSpot } from '@/lib/core/printed-code'
import { overlap, type PageGround } from './page-ground'

/** No printer or copier is sure to reach nearer to the paper's edge: 5 mm, in points. */
const edge = (5 * 72) / 25.4
/** The line with the student's name: at least so wide, at most so wide, and as high as its two or three lines, in points. */
const line = { least: 64, enough: 130, most: 190, height: 20 } as const
/** White between the code's square and the line. */
const gap = 3

/** What a code's place is wrong for. */
export type CodeFault = 'off_page' | 'too_small' | 'too_large' | 'over_print' | 'over_space' | 'no_room_for_name'
/** A code and the line that names its page. `align` is the side on which the line meets the code. */
export type CodePlace = Readonly<{ rect: PaperRect; line: PaperRect; align: 'left' | 'right' }>

/** Where a code and its line go, or what is wrong with the place. */
export function codePlace(rect: PaperRect, ground: PageGround): CodePlace | CodeFault {
  const fault = squareFault(rect, ground)
  if (fault) return fault
  const found = lineBeside(rect, ground)
  return found ?? 'no_room_for_name'
}

/** Throws code_place_bad for the first page on which the code cannot stand, with why. */
export function assertCodePlace({ page, rect }: CodeSpot, ground: PageGround): CodePlace {
  const place = codePlace(rect, ground)
  if (typeof place === 'string') throw new AppError('code_place_bad', { page, why: place })
  return place
}

function squareFault(rect: PaperRect, ground: PageGround): CodeFault | null {
  if (rect.w < leastCodeSide - 0.01 || rect.h < leastCodeSide - 0.01) return 'too_small'
  if (rect.w > mostCodeSide + 0.01 || Math.abs(rect.w - rect.h) > 0.01) return 'too_large'
  const quiet = (quietModules / (codeModules + 2 * quietModules)) * rect.w
  // The quiet zone may run up to the edge, where nothing is printed anyhow; the symbol may not.
  if (!inside(rect, ground, Math.max(0, edge - quiet))) return 'off_page'
  if (ground.spaces.some((space) => overlap(rect, space))) return 'over_space'
  return ground.hasPrint(rect) ? 'over_print' : null
}

function inside({ x, y, w, h }: PaperRect, page: PageGround, margin: number): boolean {
  return x >= margin - 0.01 && y >= margin - 0.01 && x + w <= page.width - margin + 0.01 && y + h <= page.height - margin + 0.01
}

/** The roomiest free box beside, below or above a square; one that is wide enough is taken in that order. */
function lineBeside(rect: PaperRect, ground: PageGround): CodePlace | null {
  const middle = rect.y + (rect.h - line.height) / 2
  const tops = [middle, rect.y, rect.y + rect.h - line.height]
  const beside = tops.flatMap((y) => [grown(rect.x - gap, y, -1, rect, ground), grown(rect.x + rect.w + gap, y, 1, rect, ground)])
  const stacked = [rect.y + rect.h, rect.y - line.height].flatMap((y) => [grown(rect.x + rect.w, y, -1, rect, ground), grown(rect.x, y, 1, rect, ground)])
  const found = [...beside, ...stacked].filter((place) => place !== null)
  return found.find((place) => place.line.w >= line.enough) ?? found.toSorted((a, b) => b.line.w - a.line.w)[0] ?? null
}

/** A box for the line that starts at `x` and grows to one side for as long as it is free. */
function grown(x: number, y: number, to: 1 | -1, rect: PaperRect, ground: PageGround): CodePlace | null {
  let best: PaperRect | null = null
  for (let w = line.least; w <= line.most; w += 6) {
    const box = { x: to > 0 ? x : x - w, y, w, h: line.height }
    if (!inside(box, ground, edge) || ground.hasPrint(box) || ground.spaces.some((space) => overlap(space, box))) break
    best = box
  }
  return best && { rect, line: best, align: to > 0 ? 'left' : 'right' }
}
