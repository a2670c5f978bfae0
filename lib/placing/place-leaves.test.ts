import { deflateRawSync } from 'node:zlib'
import { describe, expect, it } from 'vitest'
import type { LeafReading } from '@/lib/core/leaf'
import { placeLeaves } from './place-leaves'

const upright = [[2, 0, 0], [0, 2, 0], [0, 0, 1]] as const
/** Writing of a hand: the same letter and page give the same ink. */
function inkOf(hand: string, page: number): string {
  let seed = [...hand].reduce((sum, c) => sum * 31 + c.charCodeAt(0), page * 7919)
  const cells = Uint8Array.from({ length: 400 }, () => ((seed = (seed * 1103515245 + 12345) % 2147483648) / 2147483648 < 0.3 ? 160 : 0))
  return deflateRawSync(cells).toString('base64')
}
/** Upper case writes in ink, lower case in pencil. */
function penOf(hand: string): { core: number; width: number } {
  return { core: hand === hand.toUpperCase() ? 70 : 120, width: 3 }
}
/** "A1 A2 - ? B1": a leaf of hand A, page 1; an empty leaf; one that cannot be told. "A1!" has nothing written on it. */
function sheaf(text: string): LeafReading[] {
  return text.split(' ').map((word, index): LeafReading => {
    const bare = { index, image: null, guesses: [], clear: false, ink: null, pen: null, empty: word === '-' }
    if (word === '-' || word === '?') return bare
    const page = Number(word[1])
    return { ...bare, clear: true, ink: word.endsWith('!') ? null : inkOf(word[0]!, page), pen: penOf(word[0]!), guesses: [{ paperPage: page, rotation: 0, homography: upright, confidence: 1 }] }
  })
}
/** "1 1 . b": running number of the script, loose, blank. */
function scripts(text: string, pages: number): string {
  return placeLeaves(sheaf(text), pages).map(({ kind, script }) => (kind === 'blank' ? 'b' : (script ?? '.'))).join(' ')
}
const more = ' M1 M2 N1 N2 O1 O2 P1 P2 Q1 Q2 R1 R2 S1 S2 T1 T2'
const reasons = (text: string, pages: number, at: number) => placeLeaves(sheaf(text), pages)[at]!.reasons

describe('placing leaves in scripts', () => {
  it('puts pages in order into one script after the other', () => {
    expect(scripts('A1 A2 B1 B2 C1 C2', 2)).toBe('1 1 2 2 3 3')
    expect(scripts('A1 B1 C1', 1)).toBe('1 2 3')
  })
  it('sees past empty leaves, whether backs or separators', () => {
    expect(scripts('A1 - A2 - B1 - B2 -', 2)).toBe('1 b 1 b 2 b 2 b')
  })
  it('takes swapped pages and a script laid backwards for one script, and says so', () => {
    expect(scripts('A1 A3 A2 A4 B4 B3 B2 B1 C1 C2 C3 C4', 4)).toBe('1 1 1 1 2 2 2 2 3 3 3 3')
    expect(reasons('A1 A3 A2 A4 B1 B2 B3 B4', 4, 1)).toEqual(['pages_swapped'])
  })
  it('reads a whole sheaf from the back', () => {
    expect(scripts('A2 A1 B2 B1 C2 C1 D2 D1', 2)).toBe('1 1 2 2 3 3 4 4')
  })
  it('lets a script stand with its page missing when the rest is plain, and names the page', () => {
    expect(scripts(`A1 B1 B2${more}`, 2).slice(0, 7)).toBe('1 2 2 3')
    expect(placeLeaves(sheaf(`A1 B1 B2${more}`), 2)[0]).toMatchObject({ reasons: ['page_missing'], missing: [2] })
    expect(scripts('A1 A2 A4 B1 B2 B3 B4', 4)).toBe('1 1 1 2 2 2 2')
  })
  it('leaves the first of two page 1s loose when nothing written tells them apart', () => {
    expect(scripts(`A1! B1! B2${more}`, 2).slice(0, 5)).toBe('. 1 1')
    expect(reasons(`A1! B1! B2${more}`, 2, 0)).toContain('two_page_ones')
  })
  it('leaves a second scan of a page loose', () => {
    expect(scripts('A1 A1 A2 A3 A4 B1 B2 B3 B4', 4)).toBe('1 . 1 1 1 2 2 2 2')
    expect(reasons('A1 A2 A2 B1 B2', 2, 2)).toEqual(['duplicate_page'])
  })
  it('never parts two scripts that lie page by page between each other', () => {
    expect(scripts('A1 A2 B1 C1 B2 C2 D1 D2 E1 E2', 2)).toBe('1 1 . . . . 2 2 3 3')
    expect(scripts('A1 A2 B1 B2 B3 B4 A3 A4', 4)).toBe('. . . . . . . .')
    expect(scripts('A1 B1 C1 A2 B2 C2', 2)).toBe('. . . . . .')
  })
  it('does not join pages of two pens over a missing page and a swapped script that look like one whole script', () => {
    expect(scripts('A1 A2 B1 c2 c1 D1 D2 E1 E2 F1 F2', 2).slice(0, 9)).not.toMatch(/^1 1 2 2/)
    expect(scripts('a1 a2 B1 c2 c1 D1 D2' + more, 2).slice(0, 9)).not.toMatch(/^1 1 2 2/)
  })
  it('counts an unread leaf after a last page as one in another order', () => {
    expect(scripts('A1 A2 B1 B2 ? C1 C2', 2)).toBe('1 1 2 2 . 3 3')
  })
  it('leaves it open whose page 2 lies between a page 1 and another when nothing written tells them apart', () => {
    expect(scripts(`A1 A2 B1 C2 C1 D1 D2${more}`, 2).slice(0, 13)).toBe('1 1 . . . 2 2')
  })
  it('parts two scripts that lie page by page between each other where pens tell them apart', () => {
    expect(scripts(`A1 A2 B1 c1 B2 c2 D1 D2${more}`, 2).slice(0, 15)).toBe('1 1 2 3 2 3 4 4')
    expect(scripts('A1 b1 A2 b2 A3 b3 A4 b4 C1 C2 C3 C4', 4)).toBe('1 2 1 2 1 2 1 2 3 3 3 3')
    expect(reasons('A1 b1 A2 b2 A3 b3 A4 b4 C1 C2 C3 C4', 4, 1)).toEqual(['interleaved'])
  })
  it('keeps pages of one pen together beside a missing page', () => {
    expect(scripts('a1 a2 B1 C1 C2', 2).slice(0, 3)).toBe('1 1')
  })
  it('leaves a leaf that is like no page loose and closes the script around it', () => {
    expect(scripts('A1 ? A2 B1 B2', 2)).toBe('1 . 1 2 2')
    expect(reasons('A1 ? A2 B1 B2', 2, 1)).toEqual(['unlike_paper'])
  })
  it('joins nothing over two leaves that may be a page 2 and a page 1', () => {
    const found = placeLeaves(sheaf('A1 ? ? B2 C1 C2'), 2)
    expect(found[0]!.script === null || found[0]!.script !== found[3]!.script).toBe(true)
  })
  it('reads two pages of an image one after the other, in the order of folded booklets as well', () => {
    const sides = (text: string, pages: number) => placeLeaves(sheaf(text).map((leaf, k) => ({ ...leaf, index: k >> 1, half: (k % 2) as 0 | 1 })), pages).map(({ script, reasons }) => [script ?? '.', ...reasons].join(' ')).join(', ')
    expect(sides('A1 A2 B1 B2 C1 -', 2)).toBe('1, 1, 2, 2, 3 page_missing, .')
    expect(sides('A4 A1 A2 A3 B4 B1 B2 B3', 4)).toBe('1, 1, 1, 1, 2, 2, 2, 2')
    expect(sides('A8 A1 A2 A7 A6 A3 A4 A5 B8 B1 B2 B7 B6 B3 B4 B5', 8)).toBe('1, 1, 1, 1, 1, 1, 1, 1, 2, 2, 2, 2, 2, 2, 2, 2')
    expect(sides('A2 A3 A4 A1 B2 B3 B4 B1 C2 C3 C4 C1', 4)).toBe('1, 1, 1, 1, 2, 2, 2, 2, 3, 3, 3, 3')
    // The halves of one sheet stay together where a missing page leaves it open.
    expect(sides('A1 A2 B1 - C1 C2 D1 D2', 2)).toBe('1, 1, 2 page_missing, ., 3, 3, 4, 4')
  })
  it('has nothing to say about no leaves', () => {
    expect(placeLeaves([], 2)).toEqual([])
  })
})
