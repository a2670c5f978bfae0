import { describe, expect, it } from 'vitest'
import type { PaperLine } from '@/lib/core/paper-left'
import { leftOf } from './left-words'
import { byClass } from './by-class'

const counts: PaperLine['counts'] = {
  questions: 11, marks: 40, sheaves: 1, sheavesReading: 0, sheavesFailed: 0, leaves: 60, looseSheets: 0, scripts: 30, namesOpen: 0, pagesMissing: 0,
  answersLeft: 0, answersMarked: 330, sampled: 0, sampleRead: 0, returned: 0,
}
const line = (more: Partial<PaperLine> = {}, count: Partial<PaperLine['counts']> = {}): PaperLine => ({
  paperId: 'p', title: 'Light', classSetId: 'c', className: '8K', satOn: '2026-03-12', students: 30, part: 'owner', hasBlank: true, questions: [], reading: null, sample: null, handedBackAt: null,
  ...more, counts: { ...counts, ...count },
})
const question = (label: string, left: number, marked: number) => ({ id: `id-${label}`, label, left, marked })
const said = (given: PaperLine) => { const { words, next } = leftOf(given); return [words.join(''), next?.label ?? null, next?.href ?? null] }

describe('what is left of a paper', () => {
  it('goes through the stages in order', () => {
    const none = { sheaves: 0, leaves: 0, scripts: 0, answersMarked: 0 }
    expect(said(line({ hasBlank: false }, { ...none, questions: 0 }))).toEqual(['no blank paper yet', 'Choose the blank paper', '/papers/p/details#blank'])
    expect(said(line({}, { ...none, questions: 0 }))).toEqual(['no answer spaces yet', 'Draw them', '/papers/p/set'])
    expect(said(line({ classSetId: null }, none))[1]).toBe('Say who sits it')
    expect(said(line({}, none))).toEqual(['paper set; no sheaf yet', 'Scan the sheaf', '/papers/p/scan'])
    expect(said(line({ reading: { done: 23, of: 60 } }, none))).toEqual(['reading the sheaf: leaf 23 of 60', 'See it', '/papers/p/scan'])
    expect(said(line({}, { ...none, sheavesFailed: 1 }))[1]).toBe('See why')
    expect(said(line({}, { answersMarked: 0, answersLeft: 330, looseSheets: 1, namesOpen: 2 }))).toEqual(['1 loose sheet, 2 names to confirm', 'Sort them', '/papers/p/sort'])
  })
  it('begins with the first question, and goes on with one that is begun', () => {
    expect(said(line({ questions: [question('1a', 30, 0), question('1b', 30, 0)] }, { answersMarked: 0, answersLeft: 60 }))).toEqual(['30 scripts placed, none marked', 'Begin with 1a', '/papers/p/mark/id-1a'])
    expect(said(line({ questions: [question('1a', 30, 0), question('7', 15, 15)] }, { answersLeft: 45, looseSheets: 1 }))).toEqual(['45 answers to mark, 1 loose sheet', 'Go on with 7', '/papers/p/mark/id-7'])
  })
  it('ends with the second mark, the checks and the day it went back', () => {
    expect(said(line({}, { sampled: 15, sampleRead: 9 }))).toEqual(['6 of 15 left to second-mark', null, null])
    expect(said(line())[1]).toBe('Look at the checks')
    expect(leftOf(line({ handedBackAt: new Date(2026, 1, 14).getTime() }))).toEqual({ words: ['handed back 14 February'], next: null, done: true })
    expect(said(line({ handedBackAt: new Date(2026, 1, 14).getTime(), questions: [question('7', 1, 29)] }, { answersLeft: 1 }))[0]).toBe('handed back 14 February; 1 answer to mark')
  })
  it('tells a marker and a moderator only their own part', () => {
    expect(said(line({ part: 'marker', questions: [question('1a', 2, 0)] }, { answersLeft: 300, looseSheets: 4 }))).toEqual(['2 answers to mark', 'Begin with 1a', '/papers/p/mark/id-1a'])
    expect(said(line({ part: 'marker', questions: [question('1a', 0, 9)] }))[0]).toBe('all your answers are marked')
    expect(said(line({ part: 'moderator', sample: { read: 9, of: 15 } }))).toEqual(['6 of 15 left to second-mark', 'Second-mark', '/papers/p/second-mark'])
    expect(leftOf(line({ part: 'moderator', sample: { read: 15, of: 15 } })).done).toBe(true)
  })
})

describe('the home page by class', () => {
  it('sorts classes by their number, papers by what is open then by date, and takes the first open one in hand', () => {
    const done = line({ paperId: 'done', handedBackAt: 1, satOn: '2026-05-01' })
    const old = line({ paperId: 'old', satOn: '2026-01-01' })
    const fresh = line({ paperId: 'new', satOn: '2026-03-01' })
    const groups = byClass([done, line({ className: '11A', paperId: 'x' }), old, fresh, line({ classSetId: null, className: null, paperId: 'none', satOn: null })])
    expect(groups.map(({ className }) => className)).toEqual(['8K', '11A', null])
    expect(groups[0]!.lines.map(({ line: { paperId } }) => paperId)).toEqual(['new', 'old', 'done'])
    expect(groups.flatMap(({ lines }) => lines.filter(({ inHand }) => inHand)).map(({ line: { paperId } }) => paperId)).toEqual(['new'])
  })
})
