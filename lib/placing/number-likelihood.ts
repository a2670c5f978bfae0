import type { DigitShares } from '@/lib/core/digit-reading'

/** Now and then the reader is sure and wrong, or a student writes a digit wrongly: once in so many boxes. */
const slip = 0.01
/** A digit that the network cannot tell, or a box left empty, speaks for no number. */
const silent = Math.log(0.1)
/** Of a number's digit at least this share must be seen in its box before the box says it. */
const spoken = 0.35

/** How well boxes agree with any number, reckoned once: natural logarithms of how likely each digit is in each, and of an empty box. */
export type BoxLikelihoods = readonly Readonly<{ digits: readonly number[]; empty: number }>[]

export function boxLikelihoods(boxes: readonly DigitShares[]): BoxLikelihoods {
  return boxes.map((shares) => {
    if (!shares) return { digits: Array.from({ length: 10 }, () => silent), empty: 0 }
    const rest = Math.max(0, 1 - shares.reduce((sum, share) => sum + share, 0))
    return { digits: shares.map((share) => Math.log((1 - slip) * (share + rest / 10) + slip / 10)), empty: Math.log(slip) }
  })
}

/** How well boxes agree with a number: natural logarithm of its likelihood. One shorter than the boxes stands at their left or at their right. */
export function numberLikelihood(boxes: BoxLikelihoods, number: string): number {
  const spare = boxes.length - number.length
  if (spare < 0) return boxes.length * silent
  return spare === 0 ? laid(boxes, number, 0) : Math.max(laid(boxes, number, 0), laid(boxes, number, spare))
}

function laid(boxes: BoxLikelihoods, number: string, from: number): number {
  let sum = 0
  for (let k = 0; k < boxes.length; k++) {
    const code = k < from || k >= from + number.length ? -1 : number.charCodeAt(k - from) - 48
    sum += code === -1 ? boxes[k]!.empty : (boxes[k]!.digits[code] ?? silent)
  }
  return sum
}

/** Whether every box says its digit of a number, none left to guessing. */
export function saysNumber(boxes: readonly DigitShares[], number: string): boolean {
  const spare = boxes.length - number.length
  if (spare < 0) return false
  return [0, spare].some((from) => boxes.every((shares, k) => {
    const digit = k < from ? undefined : number[k - from]
    return digit === undefined ? shares === null : (shares?.[Number(digit)] ?? 0) >= spoken
  }))
}

/** The number that boxes plainly show, each digit beyond doubt; null when any is not. */
export function plainNumber(boxes: readonly DigitShares[]): string | null {
  const shown = boxes.map((shares) => (shares ? shares.findIndex((share) => share >= 0.9) : -1))
  return shown.includes(-1) ? null : shown.join('')
}

/** Whether enough boxes say something for the number to count as evidence. */
export function isTelling(boxes: readonly DigitShares[]): boolean {
  const saying = boxes.filter((shares) => shares && Math.max(...shares) > 0.5).length
  return saying > 0 && saying >= boxes.length / 2
}
