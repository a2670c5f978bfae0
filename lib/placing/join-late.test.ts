import { deflateRawSync } from 'node:zlib'
import { describe, expect, it } from 'vitest'
import type { LeafReading } from '@/lib/core/leaf'
import { joinLate, type EarlierScript } from './join-late'
import { placeLeaves } from './place-leaves'

const upright = [[2, 0, 0], [0, 2, 0], [0, 0, 1]] as const

/** Writing of a hand on a page; a lower case letter stands for the same sheet scanned again, a little otherwise. */
function inkOf(hand: string, page: number): string {
  let seed = hand.toUpperCase().charCodeAt(0) * 31 + page * 7919
  const next = () => (seed = (seed * 1103515245 + 12345) % 2147483648) / 2147483648
  const cells = Uint8Array.from({ length: 600 }, () => (next() < 0.3 ? 160 : 0))
  return deflateRawSync(hand === hand.toUpperCase() ? cells : cells.map((cell, k) => (k % 17 === 0 ? 160 - cell : cell))).toString('base64')
}
const pens: Record<string, number> = { A: 60, B: 90, C: 120, D: 150 }
const penOf = (hand: string) => ({ core: pens[hand.toUpperCase()] ?? 60, width: 3 })
/** Crosses in the boxes everyone ticks alike. */
const ticked = deflateRawSync(Uint8Array.from({ length: 600 }, (_, k) => (k % 40 === 0 ? 160 : 0))).toString('base64')

function leaves(text: string, more: Partial<LeafReading> = {}): LeafReading[] {
  return text.split(' ').map((word, index) => ({
    index, image: null, empty: false, clear: true, ink: inkOf(word[0]!, Number(word[1])), pen: penOf(word[0]!), guesses: [{ paperPage: Number(word[1]), rotation: 0, homography: upright, confidence: 1 }], ...more,
  }))
}
function earlier(...texts: string[]): EarlierScript[] {
  return texts.map((text) => ({ id: text[0]!, number: null, pages: text.split(' ').map((word) => ({ paperPage: Number(word[1]), ink: inkOf(word[0]!, Number(word[1])), pen: penOf(word[0]!) })) }))
}
/** "A:re_scan" joins script A, "?:late_unsure" is loose, "." starts a script of its own or stays as it was found. */
function late(readings: readonly LeafReading[], scripts: readonly EarlierScript[], without = 0): string {
  const verdicts = joinLate(readings, placeLeaves(readings, 2), scripts, without)
  return readings.map((_, k) => { const one = verdicts.get(k); return one ? `${one.kind === 'join' ? one.scriptId : '?'}:${one.reason}` : '.' }).join(' ')
}

describe('leaves that come later than the scripts', () => {
  it('replace the page of which they are a new scan, one or all of a script', () => {
    expect(late(leaves('b2'), earlier('A1 A2', 'B1 B2'))).toBe('B:re_scan')
    expect(late(leaves('b1 b2'), earlier('A1 A2', 'B1 B2'))).toBe('B:re_scan B:re_scan')
  })

  it('bring a missing page along with a new scan of the other', () => {
    expect(late(leaves('b1 B2'), earlier('A1 A2', 'B1'))).toBe('B:re_scan B:late_page')
  })

  it('go where one script alone lacks the page and every student has one', () => {
    expect(late(leaves('B2'), earlier('A1 A2', 'B1'))).toBe('B:late_page')
    expect(late(leaves('B2'), earlier('A1 A2', 'B1'), 1), 'a student without a script may have written it').toBe('?:late_unsure')
    expect(late(leaves('B2'), earlier('A1', 'B1')), 'two scripts lack it').toBe('?:late_unsure')
    expect(late(leaves('D2'), earlier('B1 B2', 'A1')), 'another pen').toBe('?:late_unsure')
  })

  it('are never put where a page with other writing lies', () => {
    expect(late(leaves('C2'), earlier('A1 A2', 'B1 B2'))).toBe('?:late_unsure')
    expect(late(leaves('b1 C2'), earlier('A1 A2', 'B1 B2'))).toBe('?:re_scan_unsure ?:re_scan_unsure')
  })

  it('start scripts of their own when they are whole, or someone is still without one', () => {
    expect(late(leaves('C1 C2 D1 D2'), earlier('A1 A2', 'B1'))).toBe('. . . .')
    expect(late(leaves('C1'), earlier('A1 A2', 'B1 B2'), 1)).toBe('.')
  })

  it('stay loose when pages of several scripts look like it', () => {
    const scripts = earlier('A1 A2', 'B1 B2').map((script) => ({ ...script, pages: script.pages.map((page) => (page.paperPage === 2 ? { ...page, ink: ticked } : page)) }))
    expect(late(leaves('B2', { ink: ticked }), scripts)).toBe('?:re_scan_unsure')
  })

  it('go by the candidate number when it is plainly read', () => {
    const shares = [...'8142'].map((digit) => Array.from({ length: 10 }, (_, k) => (k === Number(digit) ? 0.99 : 0.001)))
    const scripts = [{ ...earlier('A2')[0]!, number: '8141' }, { ...earlier('B2')[0]!, number: '8142' }]
    expect(late(leaves('B1', { number: { boxes: [], shares } }), scripts, 3)).toBe('B:late_page')
    expect(late(leaves('B1', { number: { boxes: [], shares: shares.map((box, k) => (k === 3 ? box.map(() => 0.1) : box)) } }), scripts, 3)).toBe('?:late_unsure')
  })

  it('are offered to the scripts that lack them: by their rank when there are as many, those of another pen last', () => {
    const candidates = (readings: readonly LeafReading[], scripts: readonly EarlierScript[]) => [...joinLate(readings, placeLeaves(readings, 2), scripts, 0).values()].map((one) => (one.kind === 'loose' ? one.candidates.join('') : ''))
    expect(candidates(leaves('A2 B2 C2'), earlier('A1', 'B1', 'C1')).map((ids) => ids[0])).toEqual(['A', 'B', 'C'])
    expect(candidates(leaves('D2'), earlier('A1', 'B1', 'D1'))).toEqual(['DAB'])
  })

  it('do not go to one place in twos', () => {
    expect(late(leaves('b2 b2'), earlier('A1 A2', 'B1 B2'))).toBe('?:late_unsure ?:late_unsure')
  })
})
