import type { PaperPoint, PaperRect } from './paper-space'
import type { Pen } from './stamp'
import { widthOf, type FontRole } from './text-widths'

/** One step of a path, in paper points: move, straight line, cubic curve, close. Arcs and quadratics never reach a painter. */
export type Step = readonly ['M', number, number] | readonly ['L', number, number] | readonly ['C', number, number, number, number, number, number] | readonly ['Z']

/** A shape filled with the pen's colour by the nonzero rule, without a line round it. */
export type FilledInk = Readonly<{ kind: 'filled'; path: readonly Step[] }>
/** An open line of `width` points. `dash` is drawn, left out; caps are round, on a broken line butt. */
export type LineInk = Readonly<{ kind: 'line'; path: readonly Step[]; width: number; dash: readonly [number, number] | null }>
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
  return { kind: 'filled', path: stepsOf(data, at) }
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

/** The box round some ink in paper points, line widths and letters included; null when there is none. Control points count. */
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
  const numbers = ink.path.flatMap((step) => step.slice(1) as number[])
  if (numbers.length === 0) return null
  const xs = numbers.filter((_, k) => k % 2 === 0)
  const ys = numbers.filter((_, k) => k % 2 === 1)
  const pad = ink.kind === 'line' ? ink.width / 2 : 0
  const x = xs.reduce((a, b) => Math.min(a, b)) - pad
  const y = ys.reduce((a, b) => Math.min(a, b)) - pad
  return { x, y, w: xs.reduce((a, b) => Math.max(a, b)) + pad - x, h: ys.reduce((a, b) => Math.max(a, b)) + pad - y }
}
