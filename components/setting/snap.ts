import type { PaperRect } from '@/lib/core/paper-space'

/** Lines a box may snap to, in points: upright ones at x, lying ones at y. */
export type SnapLines = Readonly<{ xs: readonly number[]; ys: readonly number[] }>
/** Which edges move: a move takes all of them, a resize some, and -1 is left or top, 1 right or bottom. */
export type Grip = Readonly<{ x: -1 | 0 | 1; y: -1 | 0 | 1 }>
/** No side of a box is shorter, in points. */
export const smallest = 12

/** The edges of the other boxes of a page as lines. */
export function edgesOf(rects: readonly PaperRect[]): SnapLines {
  return { xs: rects.flatMap(({ x, w }) => [x, x + w]), ys: rects.flatMap(({ y, h }) => [y, y + h]) }
}

export function joinLines(a: SnapLines, b: SnapLines): SnapLines {
  return { xs: [...a.xs, ...b.xs], ys: [...a.ys, ...b.ys] }
}

function nearest(at: number, lines: readonly number[], reach: number): number | null {
  let best: number | null = null
  for (const line of lines) if (Math.abs(line - at) <= reach && (best === null || Math.abs(line - at) < Math.abs(best - at))) best = line
  return best
}

/** How far to shift so that the nearer of two edges lies on a line; 0 when none is in reach. */
function shift(low: number, high: number, lines: readonly number[], reach: number): number {
  const [a, b] = [nearest(low, lines, reach), nearest(high, lines, reach)]
  const shifts = [a === null ? null : a - low, b === null ? null : b - high].filter((each): each is number => each !== null)
  return shifts.sort((p, q) => Math.abs(p) - Math.abs(q))[0] ?? 0
}

/** A box that was moved as a whole, laid on the lines within `reach` points. */
export function snapMove(rect: PaperRect, lines: SnapLines, reach: number): PaperRect {
  return { ...rect, x: rect.x + shift(rect.x, rect.x + rect.w, lines.xs, reach), y: rect.y + shift(rect.y, rect.y + rect.h, lines.ys, reach) }
}

/** A box of which some edges were moved, those edges laid on the lines within `reach` points. */
export function snapEdges(rect: PaperRect, grip: Grip, lines: SnapLines, reach: number): PaperRect {
  const [left, right] = snapSpan(rect.x, rect.x + rect.w, grip.x, lines.xs, reach)
  const [top, bottom] = snapSpan(rect.y, rect.y + rect.h, grip.y, lines.ys, reach)
  return { x: left, y: top, w: right - left, h: bottom - top }
}

function snapSpan(low: number, high: number, moving: -1 | 0 | 1, lines: readonly number[], reach: number): [number, number] {
  if (moving < 0) return [Math.min(nearest(low, lines, reach) ?? low, high - smallest), high]
  if (moving > 0) return [low, Math.max(nearest(high, lines, reach) ?? high, low + smallest)]
  return [low, high]
}

/** The same box with the gripped edges moved by so many points; it never turns inside out. */
export function resized({ x, y, w, h }: PaperRect, grip: Grip, dx: number, dy: number): PaperRect {
  const left = grip.x < 0 ? Math.min(x + dx, x + w - smallest) : x
  const top = grip.y < 0 ? Math.min(y + dy, y + h - smallest) : y
  const right = grip.x > 0 ? Math.max(x + w + dx, x + smallest) : x + w
  const bottom = grip.y > 0 ? Math.max(y + h + dy, y + smallest) : y + h
  return { x: left, y: top, w: right - left, h: bottom - top }
}

/** Two corners of a drag, in any order, as a box. */
export function rectOf(a: { x: number; y: number }, b: { x: number; y: number }): PaperRect {
  return { x: Math.min(a.x, b.x), y: Math.min(a.y, b.y), w: Math.abs(a.x - b.x), h: Math.abs(a.y - b.y) }
}

/** The box kept on the page, in hundredths of a point; what is too large is cut to it. */
export function onPage({ x, y, w, h }: PaperRect, page: { width: number; height: number }): PaperRect {
  const round = (value: number) => Math.round(value * 100) / 100
  const width = Math.min(Math.max(w, smallest), page.width)
  const height = Math.min(Math.max(h, smallest), page.height)
  return { x: round(Math.min(Math.max(x, 0), page.width - width)), y: round(Math.min(Math.max(y, 0), page.height - height)), w: round(width), h: round(height) }
}
