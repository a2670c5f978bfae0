import type { PaperPoint, PaperRect } from './paper-space'
import type { Pen } from './stamp'
import { widthOf, type FontRole } from './text-widths'

/** One step of a path, in paper points: move, straight line, cubic curve, close. Arcs and quadratics never reach a painter. */
export type Step = readonly ['M', number, number] | readonly ['L', number, number] | readonly ['C', number, number, number, number, number, number] | readonly ['Z']

/** Where a path is one of the design's outlines, which one and where its origin lies: a painter may keep it and lay it again. */
type Outline = Readonly<{ data: string; at: PaperPoint }>
/** A shape filled with the pen's colour by the nonzero rule, without a line round it. */
export type FilledInk = Readonly<{ kind: 'filled'; path: readonly Step[]; shape?: Outline }>
/** An open line of `width` points. `dash` is drawn, left out; caps are round, on a broken line butt. */
export type LineInk = Readonly<{ kind: 'line'; path: readonly Step[]; width: number; dash: readonly [number, number] | null; shape?: Outline }>
/** One line of type. `at` lies on the baseline; `size` and `spacing` (between letters) are points. */
export type TextInk = Readonly<{ kind: 'text'; text: string; at: PaperPoint; font: FontRole; size: number; spacing: number; anchor: 'start' | 'middle' | 'end' }>
/** What a painter draws, all in one pen's colour: canvas and PDF know nothing else about a stamp's shape. */
export type Ink = FilledInk | LineInk | TextInk

/** The pens as they write on a script, whatever the theme: green, violet, blue-black. */
export const penColour: Readonly<Record<Pen, string>> = { first: '#0E6A39', second: '#6A2FB0', agreed: '#1C3068' }

/** Reads path data made of absolute M, L, C and Z (as in stamp-shapes) and moves, then stretches it. */
export function stepsOf(data: string, at: PaperPoint, by: Readonly<{ x: number; y: number }> = { x: 1, y: 1 }): Step[] {
  return [...data.matchAll(/([MLCZ])([^MLCZ]*)/g)].map(([, letter, rest]) => {
    const numbers = [...rest!.matchAll(/-?\d*\.?\d+/g)].map(Number)
    return [letter, ...numbers.map((n, k) => (k % 2 === 0 ? at.x + n * by.x : at.y + n * by.y))] as unknown as Step
  })
}

/** The path as the text an SVG path or a canvas path takes. */
export function pathData(path: readonly Step[]): string {
  return path.map(([letter, ...numbers]) => letter + numbers.map((n) => Math.round(n * 1000) / 1000).join(' ')).join('')
}

export function filled(data: string, at: PaperPoint): FilledInk {
  return { kind: 'filled', shape: { data, at }, get path() { return stepsOf(data, at) } }
}

/** A line along an outline of the design. */
export function outline(data: string, at: PaperPoint, width: number, dash: LineInk['dash'] = null): LineInk {
  return { kind: 'line', width, dash, shape: { data, at }, get path() { return stepsOf(data, at) } }
}

export function line(path: readonly Step[], width = 1.5, dash: LineInk['dash'] = null): LineInk {
  return { kind: 'line', path, width, dash }
}

export function text(words: string, at: PaperPoint, font: FontRole, size: number, anchor: TextInk['anchor'] = 'start', spacing = 0): TextInk {
  return { kind: 'text', text: words, at, font, size, spacing, anchor }
}

/** The width of a run in points, from the design's own fonts. */
export function runWidth(run: Pick<TextInk, 'text' | 'font' | 'size' | 'spacing'>): number {
  return widthOf(run.text, run.font, run.size) + run.spacing * [...run.text].length
}

/** The box round some ink in paper points, line widths and letters included; null when there is none. */
export function boundsOf(inks: readonly Ink[]): PaperRect | null {
  const boxes = inks.map(boxOf).filter((box) => box !== null)
  if (boxes.length === 0) return null
  const x = Math.min(...boxes.map((box) => box.x))
  const y = Math.min(...boxes.map((box) => box.y))
  return { x, y, w: Math.max(...boxes.map((box) => box.x + box.w)) - x, h: Math.max(...boxes.map((box) => box.y + box.h)) - y }
}

function boxOf(ink: Ink): PaperRect | null {
  if (ink.kind === 'text') {
    const w = runWidth(ink)
    const left = ink.anchor === 'start' ? 0 : ink.anchor === 'middle' ? w / 2 : w
    return { x: ink.at.x - left, y: ink.at.y - 0.8 * ink.size, w, h: 1.05 * ink.size }
  }
  const points = pointsOn(ink.path)
  if (points.length === 0) return null
  const pad = ink.kind === 'line' ? ink.width / 2 : 0
  const least = (of: (point: PaperPoint) => number): number => points.reduce((a, b) => Math.min(a, of(b)), Infinity) - pad
  const most = (of: (point: PaperPoint) => number): number => points.reduce((a, b) => Math.max(a, of(b)), -Infinity) + pad
  const [x, y] = [least((p) => p.x), least((p) => p.y)]
  return { x, y, w: most((p) => p.x) - x, h: most((p) => p.y) - y }
}

/** Points along a path: ends of steps, and eight on each curve, which is true to well under a line's width. */
export function pointsOn(path: readonly Step[]): PaperPoint[] {
  const points: PaperPoint[] = []
  for (const step of path) {
    const from = points.at(-1)
    if (step[0] === 'M' || step[0] === 'L') points.push({ x: step[1], y: step[2] })
    else if (step[0] === 'C' && from) for (let k = 1; k <= 8; k++) points.push(onCurve(from, step, k / 8))
  }
  return points
}

function onCurve(from: PaperPoint, [, ax, ay, bx, by, x, y]: Extract<Step, readonly ['C', ...number[]]>, t: number): PaperPoint {
  const blend = (p: number, a: number, b: number, q: number): number => (1 - t) ** 3 * p + 3 * (1 - t) ** 2 * t * a + 3 * (1 - t) * t ** 2 * b + t ** 3 * q
  return { x: blend(from.x, ax, bx, x), y: blend(from.y, ay, by, y) }
}
