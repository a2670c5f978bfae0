import type { PenTrace } from '@/lib/core/leaf'
import type { DarkRuns } from './dark-runs'
import { HandCounter } from './hand-counter'

/** Fewer strokes than this say nothing about a pen. */
const fewest = 300

/**
 * How a page's writing looks, whatever it says: how dark its strokes are in the middle, how wide (dark pixels for each crossing of
 * an edge, at 100 dpi), and by what hand. Pencil, ink and pressure differ from student to student more than from page to page.
 */
export class PenCounter {
  private readonly cores = new Uint32Array(256)
  private readonly hand = new HandCounter()
  private dots = 0
  private strokes = 0

  /** Adds the next line of a page. */
  add(runs: DarkRuns, y: number): void {
    for (let k = 0; k < runs.count; k++) {
      this.cores[runs.darkest[k]!]!++
      this.dots += runs.to[k]! - runs.from[k]!
    }
    this.strokes += runs.count
    this.hand.add(runs, y)
  }

  result(): PenTrace | null {
    if (this.strokes < fewest) return null
    let left = this.strokes / 2
    let core = 0
    while (core < 255 && (left -= this.cores[core]!) > 0) core++
    return { core, width: this.dots / this.strokes, ...this.hand.result() }
  }
}
