import type { HalfMarks } from '@/lib/core/marks'
import type { MarkFigures } from '@/lib/core/moderation-figures'

/** A pair as it is plotted and listed; `inside` is true where no tolerance is set. */
export type Plotted = Readonly<{ key: string; says: string; first: HalfMarks; second: HalfMarks; inside: boolean }>

type Spot = Readonly<{ middle: number; difference: number; times: number; inside: boolean }>
type Line = Readonly<{ says: string; at: number; /** Where its words stand, clear of the others. */ label: number }>

const size = { width: 600, height: 322, left: 46, right: 468, top: 28, bottom: 278 }

/** Steps of whole halves, at most about `most` of them, from `low` to `high`. */
function steps(low: number, high: number, most: number): number[] {
  const by = [1, 2, 4, 10, 20, 40, 100, 200].find((step) => (high - low) / step <= most) ?? 400
  return Array.from({ length: Math.floor(high / by) - Math.ceil(low / by) + 1 }, (_, k) => (Math.ceil(low / by) + k) * by)
}

/** Pushes words apart that would lie over each other. */
function apart(lines: readonly Omit<Line, 'label'>[], y: (value: number) => number): Line[] {
  const placed: Line[] = []
  for (const line of lines.toSorted((a, b) => b.at - a.at)) placed.push({ ...line, label: Math.max(y(line.at), (placed.at(-1)?.label ?? -100) + 16) })
  return placed
}

function spotsOf(pairs: readonly Plotted[]): Spot[] {
  const spots = new Map<string, Spot>()
  for (const { first, second, inside } of pairs) {
    const [middle, difference] = [(first + second) / 2, first - second]
    const key = `${middle} ${difference} ${inside}`
    spots.set(key, { middle, difference, inside, times: (spots.get(key)?.times ?? 0) + 1 })
  }
  return [...spots.values()]
}

/** Where everything of a difference plot stands. Marks come in halves, places go out in units of the picture. */
export function placePlot(pairs: readonly Plotted[], { meanDifference, limits, largest }: MarkFigures, maximum: HalfMarks | null, tolerance: HalfMarks | null) {
  const { left, right, top, bottom } = size
  const ends = limits.why === null ? [Math.abs(limits.low), Math.abs(limits.high)] : []
  const far = Math.ceil(Math.max(2, largest ?? 0, tolerance ?? 0, ...ends) * 1.1)
  const most = maximum ?? Math.max(2, ...pairs.map(({ first, second }) => Math.max(first, second)))
  const x = (value: number) => left + 10 + (value / most) * (right - left - 20)
  const y = (value: number) => (top + bottom) / 2 - (value / far) * ((bottom - top) / 2)
  const lines = [
    ...(meanDifference === null ? [] : [{ says: 'mean', at: meanDifference }]),
    ...(limits.why === null ? [{ says: 'upper limit', at: limits.high }, { says: 'lower limit', at: limits.low }] : []),
  ]
  return { ...size, x, y, across: steps(0, most, 10), up: steps(-far, far, 8), spots: spotsOf(pairs), lines: apart(lines, y) }
}
