import type { GreyPicture } from '@/lib/core/grey-picture'
import { fresh, type Memory } from './memory'
import { paperTone } from './paper-tone'
import { boxShrink } from './shrink'

/** A picture with its paper made evenly white, and its ink at a quarter of the density: 0 none, 255 black on white. */
export type Levelled = Readonly<{ white: GreyPicture; ink: GreyPicture }>

/** Darker than this nothing is paper: the scanner's lid, or what lies beyond the sheet. */
const darkestPaper = 90

/** What a pixel becomes on paper of a certain brightness, at [brightness * 256 + pixel]. */
const whites = table((paper, v) => Math.min(255, paper < darkestPaper ? v * 1000 : Math.round((v * 255) / paper)))
const inks = table((paper, v) => (paper < darkestPaper ? 0 : Math.max(0, Math.floor(((paper - v) * 255) / paper))))

function table(of: (paper: number, v: number) => number): Uint8Array {
  const out = new Uint8Array(256 * 256)
  for (let paper = 0; paper < 256; paper++) for (let v = 0; v < 256; v++) out[paper * 256 + v] = of(paper, v)
  return out
}

/**
 * Levels a 100 dpi picture: what is as bright as the paper round it becomes white. Shades, tinted paper and the copier's lid go
 * away; grey, colour and 1-bit scans come out alike.
 */
export function level(picture: GreyPicture, memory: Memory = fresh): Levelled {
  const small = boxShrink(picture, 4, memory, 'small')
  const paper = { ...small, data: paperTone(small, memory) }
  return { white: whitened(picture, paper, memory('white', picture.data.length)), ink: inkOf(small, paper, memory('ink', small.data.length)) }
}

function whitened({ width, height, data }: GreyPicture, paper: GreyPicture, out: Uint8Array): GreyPicture {
  for (let y = 0; y < height; y++) whitenLine(data, y * width, width, paper.data, Math.min(paper.height - 1, y >> 2) * paper.width, paper.width, out)
  return { width, height, data: out }
}

/** One line, from `at` on, by the tones of the blocks of four pixels over it. */
function whitenLine(data: Uint8Array, at: number, width: number, tones: Uint8Array, row: number, blocks: number, out: Uint8Array): void {
  const end = at + width
  let tone = 0
  for (let x = 0; x < blocks && at + 4 <= end; x++, at += 4) {
    tone = tones[row + x]! << 8
    out[at] = whites[tone | data[at]!]!
    out[at + 1] = whites[tone | data[at + 1]!]!
    out[at + 2] = whites[tone | data[at + 2]!]!
    out[at + 3] = whites[tone | data[at + 3]!]!
  }
  for (; at < end; at++) out[at] = whites[tone | data[at]!]!
}

function inkOf(small: GreyPicture, paper: GreyPicture, out: Uint8Array): GreyPicture {
  for (let y = 0; y < small.height; y++) inkLine(small.data, paper.data, y * small.width, (y + 1) * small.width, out)
  return { ...small, data: out }
}

function inkLine(small: Uint8Array, paper: Uint8Array, from: number, to: number, out: Uint8Array): void {
  for (let k = from; k < to; k++) out[k] = inks[(paper[k]! << 8) | small[k]!]!
}
