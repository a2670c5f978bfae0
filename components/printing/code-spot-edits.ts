import type { PaperPage } from '@/lib/core/paper'
import { mmPerPoint, type PaperPoint, type PaperRect } from '@/lib/core/paper-space'
import { leastCodeSide, mostCodeSide, usualCodeSide, type CodeSpot } from '@/lib/core/printed-code'

const hundredth = (points: number) => Math.round(points * 100) / 100

/** A square kept on its page, in hundredths of a point. */
export function onPage({ x, y, w }: PaperRect, { width, height }: PaperPage): PaperRect {
  const side = hundredth(Math.min(Math.max(w, leastCodeSide + 0.005), mostCodeSide))
  return { x: hundredth(Math.min(Math.max(x, 0), width - side)), y: hundredth(Math.min(Math.max(y, 0), height - side)), w: side, h: side }
}

/** A square of the size in hand, or the usual one, with its middle at a place. */
export function centredAt({ x, y }: PaperPoint, page: PaperPage, side = usualCodeSide): PaperRect {
  return onPage({ x: x - side / 2, y: y - side / 2, w: side, h: side }, page)
}

/** A square made larger or smaller by so many points, about its middle. */
export function sized({ x, y, w }: PaperRect, by: number, page: PaperPage): PaperRect {
  const side = Math.min(Math.max(w + by, leastCodeSide + 0.005), mostCodeSide)
  return onPage({ x: x + (w - side) / 2, y: y + (w - side) / 2, w: side, h: side }, page)
}

/** The places with this one put on its page, or on every page. */
export function withSpot(spots: readonly CodeSpot[], { page, rect }: CodeSpot, pages: readonly PaperPage[], same: boolean): CodeSpot[] {
  if (same) return pages.map((each) => ({ page: each.page, rect }))
  return [...spots.filter((spot) => spot.page !== page), { page, rect }].sort((a, b) => a.page - b.page)
}

/** Whether every page has its code at one and the same place. */
export function allSame(spots: readonly CodeSpot[]): boolean {
  return spots.every(({ rect }) => JSON.stringify(rect) === JSON.stringify(spots[0]!.rect))
}

/** A place in words: its size and how far it lies from the nearer edges, in millimetres. */
export function sayPlace({ x, y, w, h }: PaperRect, { width, height }: PaperPage): string {
  const mm = (points: number) => Math.round(points * mmPerPoint)
  const across = x + w / 2 > width / 2 ? `${mm(width - x - w)} mm from the right` : `${mm(x)} mm from the left`
  const down = y + h / 2 > height / 2 ? `${mm(height - y - h)} mm from the foot` : `${mm(y)} mm from the top`
  return `${mm(w)} mm square, ${across}, ${down}`
}
