import { describe, expect, it } from 'vitest'
import type { LeafLine } from '@/lib/core/sheaf-progress'
import { namedLeaves, tally, timeLeft } from './sheaf-words'

const leaf = (number: number, look: LeafLine['look'], turned = false): LeafLine => ({ number, look, turned })

describe('what a sheaf is said to hold', () => {
  it('names the leaves a person may want to look at', () => {
    expect(namedLeaves([18])).toBe('leaf 18')
    expect(namedLeaves([7, 8])).toBe('leaves 7 and 8')
    expect(namedLeaves([1, 2, 3, 4, 5, 6, 7])).toBe('leaves 1, 2, 3, 4, 5 and 2 more')
  })

  it('counts every leaf of a sheaf that is placed once', () => {
    const leaves = [leaf(1, 'placed'), leaf(2, 'placed', true), leaf(3, 'blank'), leaf(4, 'loose'), leaf(5, 'unreadable')]
    const lines = tally({ state: 'placed', leaves, leafCount: 5, scripts: 1 })
    expect(lines.map(({ what, count, says }) => `${what}: ${count}, ${says}`)).toEqual([
      'Placed in scripts: 2, in 1 script', 'Turned the right way up: 1, leaf 2', 'Empty backs: 1, kept, not shown while marking', 'Loose sheets: 2, leaves 4 and 5, for the sorting table',
    ])
  })

  it('claims no script before the sheaf is placed', () => {
    const lines = tally({ state: 'reading', leaves: [leaf(1, 'clear'), leaf(2, 'unclear')], leafCount: 9, scripts: 0 })
    expect(lines.map(({ what, count }) => [what, count])).toEqual([['Pages recognised', 1], ['Not sure yet', 1]])
  })

  it('says the time left in round figures', () => {
    expect(timeLeft(18)).toBe('about 18 s left')
    expect(timeLeft(200)).toBe('about 3 min left')
  })
})
