import { deflateRawSync } from 'node:zlib'
import { inkCellPoints, type InkMap } from '@/lib/core/leaf'
import type { DarkRuns } from './dark-runs'

const cell = (inkCellPoints * 100) / 72
/** Every second pixel of every second line is looked at. */
const step = 2

/** How much was written in each square of 2 mm of a page: what is dark where the blank page has no print within a millimetre. */
export class InkCounter {
  private readonly columns: number
  private readonly counts: Uint16Array
  private readonly columnAt: Uint16Array

  /** For a page of so many pixels of 100 dpi. */
  constructor(width: number, height: number) {
    this.columns = Math.ceil(width / cell)
    this.counts = new Uint16Array(this.columns * Math.ceil(height / cell))
    this.columnAt = Uint16Array.from({ length: width }, (_, x) => Math.floor(x / cell))
  }

  /** Adds line y of the page by its dark pieces. */
  add(runs: DarkRuns, y: number): void {
    if (y % step !== 0) return
    const row = Math.floor(y / cell) * this.columns
    for (let k = 0; k < runs.count; k++) for (let x = (runs.from[k]! + 1) & ~1; x < runs.to[k]!; x += step) this.counts[row + this.columnAt[x]!]!++
  }

  result(): InkMap {
    const most = (cell / step) ** 2
    const levels = new Uint8Array(this.counts.length)
    for (let k = 0; k < levels.length; k++) levels[k] = Math.min(240, Math.round((this.counts[k]! * 32) / most) * 16)
    return deflateRawSync(levels).toString('base64')
  }
}
