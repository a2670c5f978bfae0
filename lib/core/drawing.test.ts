import { describe, expect, it } from 'vitest'
import { boundsOfStamp, drawStamp } from './drawing'
import { boundsOf, pathData, runWidth, type Ink, type Step, type TextInk } from './ink'
import { halves } from './marks'
import { noteLines, noteWidth } from './note-lines'
import { pageTotal, ringOfMark, ringPlaces } from './ring-of-mark'
import { sayStamp } from './say-stamp'
import { Stamp, stampKinds } from './stamp'
import { widthOf } from './text-widths'

const aStamp = (stamp: Partial<Record<keyof Stamp, unknown>>): Stamp =>
  Stamp.parse({ id: '6f9619ff-8b86-4d01-b42d-00cf4fc964ff', markingId: 'm', version: 1, kind: 'tick', worth: 2, markPointId: null, scriptPageId: null, x: 100, y: 200, ...stamp })
const filledOf = (inks: readonly Ink[]) => inks.filter((ink) => ink.kind === 'filled')
const pathOf = (ink: Ink | undefined): readonly Step[] => (ink && ink.kind !== 'text' ? ink.path : [])
const wordsOf = (inks: readonly Ink[]) => inks.filter((ink): ink is TextInk => ink.kind === 'text').map((ink) => ink.text)

describe('a stamp is drawn', () => {
  it('as a tick whose corner is where the pen came down', () => {
    const [ink] = drawStamp(aStamp({}))
    expect(pathData(pathOf(ink))).toMatch(/^M94.23 193.66C/)
    const box = boundsOfStamp(aStamp({}))!
    // From the design's drawing: its short arm begins .25 left of (1, 9.6), its corner ends about 1.1 under (6.7, 16.3).
    expect(box.x).toBeCloseTo(100 - 6.7 + 0.75, 2)
    expect(box.y + box.h).toBeCloseTo(201.15, 1)
  })

  it.each([
    [1, 1, ['½']],
    [2, 1, []],
    [3, 2, ['½']],
    [4, 2, []],
    [6, 3, []],
    [7, 1, ['3½']],
    [16, 1, ['8']],
    [0, 1, ['0']],
  ])('a tick worth %i halves with %i ticks and the figures %j', (worth, count, figures) => {
    const inks = drawStamp(aStamp({ worth }))
    expect(filledOf(inks)).toHaveLength(count)
    expect(wordsOf(inks)).toEqual(figures)
  })

  it('as a half tick with a bar, which a tick has not', () => {
    const [half] = drawStamp(aStamp({ kind: 'half', worth: 1 }))
    const [tick] = drawStamp(aStamp({}))
    expect(pathOf(half).filter(([letter]) => letter === 'Z')).toHaveLength(3)
    expect(pathOf(tick).filter(([letter]) => letter === 'Z')).toHaveLength(2)
  })

  it('as a ring that fills its box and keeps its line', () => {
    const [ring] = drawStamp(aStamp({ kind: 'ring', worth: 0, w: 200, h: 50 }))
    expect(ring).toMatchObject({ kind: 'line', width: 1.5, dash: null })
    expect(pathOf(ring)[0]).toEqual(['M', 100 + 0.86 * 200, 200 + 0.12 * 50])
  })

  it('as a cross about its middle, a wave of half waves, a code on its line', () => {
    const box = boundsOfStamp(aStamp({ kind: 'cross', worth: 0 }))!
    expect(box.x + box.w / 2).toBeCloseTo(100, 0)
    expect(box.y + box.h / 2).toBeCloseTo(200, 0)
    const [wave] = drawStamp(aStamp({ kind: 'wavy', worth: 0, w: 35 }))
    expect(pathOf(wave)).toHaveLength(11)
    const [run, under] = drawStamp(aStamp({ kind: 'code', worth: 0, text: 'ecf' }))
    expect(pathOf(under)[1]![1]).toBeCloseTo(100 + runWidth(run as TextInk), 6)
  })

  it('as a pen line that begins and ends where the hand did, and as a dot for one touch', () => {
    const [ink] = drawStamp(aStamp({ kind: 'pen', worth: 0, path: [1, 2, 30, 40, 50, 2, 60, 9] }))
    const path = pathOf(ink)
    expect(path[0]).toEqual(['M', 1, 2])
    expect(path.at(-1)).toEqual(['L', 60, 9])
    expect(drawStamp(aStamp({ kind: 'pen', worth: 0, path: [5, 6] }))).toHaveLength(1)
    expect(drawStamp(aStamp({ kind: 'pen', worth: 0, path: [] }))).toEqual([])
  })

  it('with its worth in a figure when its shape does not show it', () => {
    expect(wordsOf(drawStamp(aStamp({ kind: 'ring', worth: 3 })))).toEqual(['1½'])
    expect(wordsOf(drawStamp(aStamp({ kind: 'mark', worth: 14 })))).toEqual(['7'])
    expect(wordsOf(drawStamp(aStamp({ kind: 'nought', worth: 0 })))).toEqual(['0'])
    expect(wordsOf(drawStamp(aStamp({ kind: 'nothing-written', worth: 0 })))).toEqual(['nr'])
  })

  it('in some ink for every kind', () => {
    for (const kind of stampKinds) {
      expect(drawStamp(aStamp({ kind, text: 'ft', path: [1, 1, 9, 9] })).length, kind).toBeGreaterThan(0)
      expect(boundsOfStamp(aStamp({ kind, text: 'ft', path: [1, 1, 9, 9] }))!.w, kind).toBeGreaterThan(3)
    }
  })
})

describe('a note', () => {
  it('breaks at spaces and stays within its width', () => {
    const lines = noteLines('the area of a triangle is half base times height, so the base comes first here')
    expect(lines.length).toBeGreaterThan(1)
    for (const line of lines) expect(widthOf(line, 'note', 10.5)).toBeLessThanOrEqual(noteWidth)
    expect(lines.join(' ')).toBe('the area of a triangle is half base times height, so the base comes first here')
  })

  it('breaks a word wider than a line, keeps own line ends, and is nothing when empty', () => {
    const lines = noteLines(`${'m'.repeat(60)}\nnext`)
    expect(lines.at(-1)).toBe('next')
    expect(lines.slice(0, -1).join('')).toBe('m'.repeat(60))
    for (const line of lines) expect(widthOf(line, 'note', 10.5)).toBeLessThanOrEqual(noteWidth)
    expect(noteLines('  ')).toEqual([])
  })
})

describe('the mark in the margin', () => {
  it('tells the pens apart by shape: single, broken, double', () => {
    const linesOf = (pen: 'first' | 'second' | 'agreed') => ringOfMark(halves(3), pen, { x: 0, y: 0 }).filter((ink) => ink.kind === 'line')
    expect(linesOf('first').map((ink) => ink.dash)).toEqual([null])
    expect(linesOf('second').map((ink) => ink.dash)).toEqual([[6, 3.4]])
    expect(linesOf('agreed').map((ink) => ink.dash)).toEqual([null, null])
  })

  it('sets the figure in the middle, smaller from three letters', () => {
    for (const [mark, size] of [[1, 17], [3, 17], [21, 14], [400, 14]] as const) {
      const figures = ringOfMark(halves(mark), 'first', { x: 10, y: 10 }).filter((ink) => ink.kind === 'text')
      expect(figures.map((ink) => ink.size)).toEqual(figures.map(() => size))
      const box = boundsOf(figures)!
      expect(box.x + box.w / 2).toBeCloseTo(32, 1)
    }
  })

  it('stands beside its answer space, on the page, and never on another', () => {
    const page = { x: 20, y: 15, w: 560, h: 820 }
    const spaces = [{ x: 48, y: 100, w: 240, h: 80 }, { x: 300, y: 100, w: 240, h: 80 }, { x: 48, y: 800, w: 500, h: 42 }, { x: 48, y: 2, w: 500, h: 12 }]
    const places = ringPlaces(spaces, page)
    for (const [k, place] of places.entries()) {
      const box = boundsOf(ringOfMark(halves(3), 'agreed', place))!
      expect(box.x + box.w).toBeLessThanOrEqual(page.x + page.w)
      expect(box.y).toBeGreaterThanOrEqual(page.y)
      expect(box.y + box.h).toBeLessThanOrEqual(page.y + page.h)
      for (const other of places.slice(k + 1)) expect(Math.abs(other.y - place.y)).toBeGreaterThanOrEqual(30)
    }
  })

  it('and the mark of the page stays on the page', () => {
    const box = boundsOf(pageTotal(halves(21), 'agreed', { x: 0, y: 0, w: 595, h: 842 }))!
    expect(box.x + box.w).toBeLessThanOrEqual(595)
    expect(box.y + box.h).toBeLessThanOrEqual(842)
  })
})

describe('a stamp in words', () => {
  it.each([
    ['tick', 2, '', 'Tick, one mark'],
    ['half', 1, '', 'Half tick, half a mark'],
    ['tick', 3, '', 'Tick, 1½ marks'],
    ['cross', 0, '', 'Cross, no mark'],
    ['code', 0, 'BOD', 'Code BOD, benefit of the doubt'],
    ['note', 0, 'check the last step', 'Note: check the last step'],
    ['caret', 0, 'is', 'Caret: is'],
    ['mark', 15, '', 'Mark 7½'],
    ['nought', 0, '', 'Nought'],
    ['nothing-written', 0, '', 'Nothing written'],
    ['ring', 0, '', 'Ring'],
  ])('%s worth %i halves %s', (kind, worth, text, says) => {
    expect(sayStamp(aStamp({ kind, worth, text }))).toBe(says)
  })
})
