import type { PaperRect } from '@/lib/core/paper-space'
import { leastCodeSide, usualCodeSide } from '@/lib/core/printed-code'
import { codePlace } from './code-place'
import type { PageGround } from './page-ground'

const step = 4
/** Staples and punched holes: the left edge, 18 mm in points. */
const punched = 51
/** Nearer to an edge than this a page that is fed askew may lose part of its code: 10 mm, in points. */
const safe = 28

/**
 * A good free place that serves all of these pages at once: at the usual size, else the least; near the top right corner, away from holes
 * and staples and with room for a long name. Null when there is none.
 */
export function suggestCodePlace(grounds: readonly PageGround[]): PaperRect | null {
  const width = Math.min(...grounds.map((ground) => ground.width))
  const height = Math.min(...grounds.map((ground) => ground.height))
  for (const side of [usualCodeSide, leastCodeSide]) {
    let best: { rect: PaperRect; cost: number } | null = null
    for (let y = 0; y + side <= height; y += step)
      for (let x = 0; x + side <= width; x += step) {
        const rect = { x: hundredth(x), y: hundredth(y), w: hundredth(side), h: hundredth(side) }
        const away = awayFrom(rect, width, height)
        if (best !== null && away >= best.cost) continue
        const room = roomOn(grounds, rect)
        const cost = away + Math.max(0, 110 - room)
        if (room > 0 && (best === null || cost < best.cost)) best = { rect, cost }
      }
    if (best) return best.rect
  }
  return null
}

/** How far a square lies from where a code is looked for first. A page that goes through the copier askew loses what is near its edges. */
function awayFrom({ x, y, w, h }: PaperRect, width: number, height: number): number {
  const margin = Math.min(x, y, width - x - w, height - y - h)
  return Math.hypot(width - safe - x - w, y - safe) + (x < punched ? 300 : 0) + 8 * Math.max(0, safe - margin)
}

/** The least width that the name line has on any of the pages; 0 where the code cannot stand on all of them. */
function roomOn(grounds: readonly PageGround[], rect: PaperRect): number {
  let room = Infinity
  for (const ground of grounds) {
    const place = codePlace(rect, ground)
    if (typeof place === 'string') return 0
    room = Math.min(room, place.line.w)
  }
  return room
}

function hundredth(points: number): number {
  return Math.round(points * 100) / 100
}
