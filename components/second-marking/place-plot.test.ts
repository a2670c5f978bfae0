import { describe, expect, it } from 'vitest'
import { halves } from '@/lib/core/marks'
import type { MarkFigures } from '@/lib/core/moderation-figures'
import { placePlot, type Plotted } from './place-plot'

const pair = (first: number, second: number, inside = true): Plotted => ({ key: `${first} ${second}`, says: '', first: halves(first), second: halves(second), inside })
const figures = (limits: MarkFigures['limits'], meanDifference: number | null, largest: number | null) => ({ meanDifference, largest, limits }) as MarkFigures

describe('the difference plot', () => {
  const limits = { low: -0.1, high: 0.1, lowInterval: [-1, 0], highInterval: [0, 1], why: null } as const
  it('keeps every pair, limit and the tolerance inside the frame, and counts what falls together', () => {
    const pairs = [pair(20, 20), pair(20, 20), pair(0, 0), pair(12, 2, false)]
    const { x, y, left, right, top, bottom, spots } = placePlot(pairs, figures({ ...limits, low: -14, high: 15 }, 0.5, 10), halves(20), halves(1))
    expect(spots.map(({ times }) => times)).toEqual([2, 1, 1])
    for (const { middle, difference } of [...spots, { middle: 0, difference: 15 }, { middle: 20, difference: -14 }]) {
      expect(x(middle) >= left && x(middle) <= right && y(difference) >= top && y(difference) <= bottom).toBe(true)
    }
  })
  it('keeps the words of near lines apart', () => {
    const labels = placePlot([pair(1, 1)], figures(limits, 0, 0), halves(4), halves(1)).lines.map(({ label }) => label)
    expect(labels).toHaveLength(3)
    expect(labels.slice(1).every((label, k) => label - labels[k]! >= 16)).toBe(true)
  })
  it('labels both axes with whole halves, few enough to read', () => {
    const { across, up } = placePlot([pair(1, 1)], figures({ why: 'too_few' }, 0, 0), halves(160), null)
    expect(across).toEqual([0, 20, 40, 60, 80, 100, 120, 140, 160])
    expect(up).toContain(0)
  })
})
