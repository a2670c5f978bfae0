import type { GreyPicture } from '@/lib/core/grey-picture'
import type { InkMap, PenTrace, StrokeMap } from '@/lib/core/leaf'
import type { Homography } from '@/lib/core/paper-space'
import { findRuns, makeRuns } from './dark-runs'
import { InkCounter } from './ink-counter'
import type { Memory } from './memory'
import { PenCounter } from './pen-counter'
import { strokeMap } from './stroke-map'
import type { Template } from './template'
import { writingLine } from './writing-line'

/** Near the page's edge lie the lid, holes and staples: 10 mm, in pixels of 100 dpi. */
const margin = 40

export type Writing = Readonly<{ ink: InkMap; pen: PenTrace | null; strokes: StrokeMap }>

/** What was written on a levelled leaf, and with what kind of pen, where the blank page is free of print. `map` takes template to leaf pixels (100 dpi). */
export function writingOf(leaf: GreyPicture, template: Template, map: Homography, memory: Memory): Writing {
  const { width, height } = template.white
  const [ink, pen] = [new InkCounter(width, height), new PenCounter()]
  const line = memory('writing line', width).fill(255)
  const runs = makeRuns(width)
  for (let y = margin; y < height - margin; y++) {
    writingLine(leaf, template, map, y, margin, width - margin, line)
    findRuns(line, runs)
    pen.add(runs, y)
    ink.add(runs, y)
  }
  return { ink: ink.result(), pen: pen.result(), strokes: strokeMap(leaf, template, map) }
}
