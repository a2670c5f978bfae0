import { describe, expect, it } from 'vitest'
import type { LeafLine } from '@/lib/core/sheaf-progress'
import { namedLeaves, saidProgress, tally, timeLeft } from './sheaf-words'

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

  it('counts scripts that are in place before the rest is read', () => {
    const [found] = tally({ state: 'reading', leaves: [leaf(1, 'placed'), leaf(2, 'placed'), leaf(3, 'clear')], leafCount: 9, scripts: 1 })
    expect(found).toEqual({ what: 'Pages recognised', count: 3, says: '1 script in place' })
  })

  it('says the time left in round figures', () => {
    expect([4, 18, 50, 80, 200, 4000, 9000].map(timeLeft)).toEqual([
      'a few seconds left', 'about half a minute left', 'about a minute left', 'about a minute left', 'about 3 minutes left', 'about 67 minutes left', 'about 3 hours left',
    ])
  })

  it('tells a listener only at every tenth of the way', () => {
    const after = (n: number) => saidProgress({ state: 'reading', leaves: Array.from({ length: n }, (_, k) => leaf(k + 1, 'clear')), leafCount: 40, secondsLeft: 20 })
    expect(new Set(Array.from({ length: 41 }, (_, n) => after(n))).size).toBe(11)
    expect(after(20)).toBe('50 per cent read, about half a minute left')
  })
})
