import type { DigitShares } from '@/lib/core/digit-reading'

/** Now and then the reader is sure and wrong, or a student writes a digit wrongly: once in so many boxes. */
const slip = 0.01
/** A digit that the network cannot tell, or a box left empty, speaks for no number. */
const silent = Math.log(0.1)

/** How well boxes agree with a number: natural logarithm of its likelihood (0: certainly this; `silent` for each box that says nothing). */
export function numberLikelihood(boxes: readonly DigitShares[], number: string): number {
  if (number.length === boxes.length) return boxes.reduce((sum, shares, k) => sum + boxLikelihood(shares, number[k]!), 0)
  return Math.max(...layings(number, boxes.length).map((laid) => boxes.reduce((sum, shares, k) => sum + boxLikelihood(shares, laid[k]!), 0)))
}

/** Whether the boxes say this very number, digit by digit, and how surely: the product of its digits' shares. 0 when a box says nothing. */
export function numberShare(boxes: readonly DigitShares[], number: string): number {
  return Math.max(...layings(number, boxes.length).map((laid) => boxes.reduce((product, shares, k) => product * shareOf(shares, laid[k]!), 1)))
}

/** The likeliest number that none of these is, with its likelihood: what a student who is not on the list may have written. */
export function likeliestOther(boxes: readonly DigitShares[], numbers: ReadonlySet<string>): { number: string; likelihood: number } {
  const ranked = boxes.map((shares) => (shares ? shares.map((_, digit) => digit).sort((a, b) => shares[b]! - shares[a]!) : [0]).map(String))
  const best = ranked.map((digits) => digits[0]!)
  const tries = [best, ...ranked.flatMap((digits, k) => digits.slice(1).map((digit) => best.with(k, digit)))]
  const others = tries.map((digits) => digits.join('')).filter((number) => !numbers.has(number)).map((number) => ({ number, likelihood: numberLikelihood(boxes, number) }))
  return others.reduce((a, b) => (b.likelihood > a.likelihood ? b : a), { number: '', likelihood: boxes.length * Math.log(slip) })
}

/** Whether enough boxes say something for the number to count as evidence. */
export function isTelling(boxes: readonly DigitShares[]): boolean {
  const saying = boxes.filter((shares) => shares && Math.max(...shares) > 0.5).length
  return saying > 0 && saying >= boxes.length / 2
}

/** A number shorter than the boxes stands at their left or at their right; null where nothing should stand. */
function layings(number: string, boxes: number): (string | null)[][] {
  const spare = boxes - number.length
  if (spare < 0) return [Array.from({ length: boxes }, () => '?')]
  const gap = Array.from({ length: spare }, () => null)
  return spare === 0 ? [[...number]] : [[...number, ...gap], [...gap, ...number]]
}

function boxLikelihood(shares: DigitShares, digit: string | null): number {
  if (digit === null) return shares ? Math.log(slip) : 0
  if (!shares || !/^\d$/.test(digit)) return silent
  let rest = 1
  for (const share of shares) rest -= share
  return Math.log((1 - slip) * (shares[Number(digit)]! + Math.max(0, rest) / 10) + slip / 10)
}

function shareOf(shares: DigitShares, digit: string | null): number {
  if (digit === null) return shares ? 0 : 1
  return shares && /^\d$/.test(digit) ? shares[Number(digit)]! : 0
}
