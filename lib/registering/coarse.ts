import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Turn } from '@/lib/core/paper-space'
import { bestShift } from './best-shift'
import type { Memory } from './memory'
import type { Template } from './template'
import { upright, upsideDown, type Upright } from './upright'

/** Where a page may lie on a leaf: its middle is shifted by (dx, dy) of 12.5 dpi, then all is turned by `degrees` clockwise about the leaf's middle. */
export type CoarsePlace = Readonly<{ turn: Turn; degrees: number; dx: number; dy: number; likeness: number }>
export type Candidate = CoarsePlace & Readonly<{ template: Template }>

/** Looks further than this only where the leaf's size differs from the paper's: 12 mm, in pixels of 12.5 dpi. */
const reach12 = 6

/** The best place of every page in either turn, with lines that slope by one of `skewed` degrees; `sideways`: the page lies on its side. */
export function coarsePlaces(ink12: GreyPicture, paper: readonly Template[], sideways: boolean, skewed: readonly number[], memory: Memory): Candidate[] {
  const turns: readonly [Turn, Turn] = sideways ? [90, 270] : [0, 180]
  const canvases = new Map<string, readonly [Upright, Upright]>()
  const canvasesFor = (width: number, height: number, skew: number) => {
    const key = `${width} ${height} ${skew}`
    const there = canvases.get(key)
    if (there) return there
    const first = upright(ink12, skew - turns[0], width, height, memory, `upright ${canvases.size}`)
    const both = [first, upsideDown(first, memory, `upside down ${canvases.size}`)] as const
    canvases.set(key, both)
    return both
  }
  return paper.flatMap((template) => {
    const margin = marginsFor(ink12, template.ink12, sideways)
    const [width, height] = [template.ink12.width + 2 * margin.x, template.ink12.height + 2 * margin.y]
    return turns.map((turn, k) => {
      const places = skewed.map((skew) => ({ template, turn, degrees: skew - turn, ...bestShift(canvasesFor(width, height, skew)[k]!, template.inked12, margin) }))
      return places.reduce((a, b) => (b.likeness > a.likeness ? b : a))
    })
  })
}

/** Margin round the template within which a leaf of another size is searched, in pixels of the density of the pictures. */
function marginsFor(ink: GreyPicture, template: GreyPicture, sideways: boolean): { x: number; y: number } {
  const [w, h] = sideways ? [ink.height, ink.width] : [ink.width, ink.height]
  return { x: reach12 + Math.ceil(Math.abs(w - template.width) / 2), y: reach12 + Math.ceil(Math.abs(h - template.height) / 2) }
}
