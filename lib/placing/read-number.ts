import type { DigitShares, NumberReading } from '@/lib/core/digit-reading'
import type { BlankPage, GreyPicture } from '@/lib/core/grey-picture'
import type { Homography, PaperRect } from '@/lib/core/paper-space'
import { boxInk } from './box-ink'
import { digitLogits, makeScratch, none, type DigitNet } from './digit-net'
import { loadNet } from './digit-weights'
import { findStrokes } from './find-strokes'
import { normalDigit } from './normal-digit'

const scratch = makeScratch()
let net: DigitNet | null = null

/**
 * Reads the candidate number in its boxes off a leaf that is registered to their page.
 * @param leaf the stored image, in grey; `homography` takes paper points to its pixels
 */
export function readNumber(leaf: GreyPicture, homography: Homography, blank: BlankPage, boxes: readonly PaperRect[]): NumberReading {
  return { boxes, shares: boxes.map((box) => readBox(leaf, homography, blank, box)) }
}

function readBox(leaf: GreyPicture, homography: Homography, blank: BlankPage, box: PaperRect): DigitShares {
  const { ink, frame } = boxInk(leaf, homography, blank, box)
  const strokes = findStrokes(ink, frame)
  return strokes && digitShares(normalDigit(ink, strokes))
}

/** How likely each digit is, from 28 x 28 of ink; what is missing to 1 is "no digit". */
export function digitShares(ink: Float32Array): readonly number[] {
  net ??= loadNet()
  const logits = digitLogits(net, ink, scratch)
  const most = Math.max(...logits)
  const shares = Array.from(logits, (v) => Math.exp(v - most))
  const sum = shares.reduce((a, b) => a + b, 0)
  return shares.slice(0, none).map((v) => Math.round((1e4 * v) / sum) / 1e4)
}
