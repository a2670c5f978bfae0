import type { PaperRect } from './paper-space'

/** How likely each digit stands in a box, ten shares that add up to at most 1; the rest is "no digit". Null: nothing is written there. */
export type DigitShares = readonly number[] | null

/** The candidate number as the boxes of one page show it, box by box, with the boxes it was read in: moved boxes have to be read anew. */
export type NumberReading = Readonly<{ boxes: readonly PaperRect[]; shares: readonly DigitShares[] }>

/** A digit is said from this share on. */
const saidFrom = 0.8

/** A number as it was read, a dot for each digit that was not sure: "81·4". Null when nothing was written. */
export function sayNumberRead({ shares }: NumberReading): string | null {
  if (shares.every((box) => box === null)) return null
  return shares.map((box) => {
    const best = box ? box.indexOf(Math.max(...box)) : -1
    return best >= 0 && box![best]! >= saidFrom ? String(best) : '·'
  }).join('').replace(/·+$/, (rest) => (shares.slice(-rest.length).every((box) => box === null) ? '' : rest))
}
