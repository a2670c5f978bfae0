import { describe, expect, it } from 'vitest'
import type { LeafReading } from '@/lib/core/leaf'
import { placePapers } from './place-papers'

const upright = [[2, 0, 0], [0, 2, 0], [0, 0, 1]] as const
/** "0.1": page 1 of the first paper; "?": a leaf like none; "-": an empty one. */
function sheaf(text: string): LeafReading[] {
  return text.split(' ').map((word, index): LeafReading => {
    const bare = { index, image: null, guesses: [], clear: false, ink: null, pen: null, empty: word === '-' }
    if (word === '-' || word === '?') return bare
    const [paper, paperPage] = word.split('.').map(Number) as [number, number]
    return { ...bare, clear: true, guesses: [{ paper, paperPage, rotation: 0, homography: upright, confidence: 1 }] }
  })
}
const placed = (text: string, ...pages: number[]) => placePapers(sheaf(text), pages).map(({ kind, script, paper }) => (kind === 'script' ? `${paper}:${script}` : kind === 'blank' ? 'b' : '.')).join(' ')

describe('a sheaf of several papers', () => {
  it('groups each paper by itself, one class after the other', () => {
    expect(placed('0.1 0.2 0.1 0.2 1.1 1.2 1.3 1.1 1.2 1.3', 2, 3)).toBe('0:1 0:1 0:2 0:2 1:3 1:3 1:3 1:4 1:4 1:4')
  })
  it('groups them also where each student hands in both papers together', () => {
    expect(placed('0.1 0.2 1.1 - 0.1 0.2 1.1 - 0.1 0.2 1.1 -', 2, 1)).toBe('0:1 0:1 1:2 b 0:3 0:3 1:4 b 0:5 0:5 1:6 b')
  })
  it('leaves a sheet that is of none of them loose', () => {
    expect(placed('0.1 0.2 ? 1.1 1.2 1.1 1.2', 2, 2)).toBe('0:1 0:1 . 1:2 1:2 1:3 1:3')
  })
})
