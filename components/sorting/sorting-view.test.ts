import { describe, expect, it } from 'vitest'
import type { LooseLeaf, SortScript, SortingTable } from '@/lib/core/sorting'
import { looseOrder, nextView, pageInHand, startView } from './sorting-view'
import { scriptNotes, whyLoose } from './reason-words'
import { sayLeaf } from './say-leaf'
import { leftToSort, sayNeighbour, whyThere } from './sorting-words'

const leaf = (id: string, paperPage: number | null = null, guess?: number): LooseLeaf => ({
  id, number: 1, half: null, sheafName: 'a.pdf', turn: 0, width: 1654, height: 2339, paperPage, guesses: guess ? [{ paperPage: guess, confidence: 0.3 }] : [], reasons: [], missing: [], problem: null, before: null, after: null, places: [],
})
const script: SortScript = { id: 's', number: 4, classSetId: 'c', studentId: null, suggestedStudentId: 'jun', suggestionReason: 'list_order', suggestionCertainty: null, numberRead: null, pages: [], missing: [2] }
const student = { classSetId: 'c', className: '8K', studentId: 'jun', candidateNumber: '8142', givenName: 'Jun', familyName: 'Rao', attendance: 'expected' as const, scriptId: null, sameName: false }

describe('the sheet in hand', () => {
  it('goes to the end when left for later, and comes up again', () => {
    const view = nextView(startView, { type: 'later', leafId: 'a' })
    expect(looseOrder([leaf('a'), leaf('b')], view.later).map(({ id }) => id)).toEqual(['b', 'a'])
    const again = nextView(view, { type: 'later', leafId: 'b' })
    expect(looseOrder([leaf('a'), leaf('b')], again.later).map(({ id }) => id)).toEqual(['a', 'b'])
  })

  it('is the page a person says before the page its print says', () => {
    expect(pageInHand(leaf('a', 2), startView, 4)).toBe(2)
    expect(pageInHand(leaf('a', 2), nextView(startView, { type: 'page', leafId: 'a', page: 3 }), 4)).toBe(3)
    expect(pageInHand(leaf('a', null, 4), startView, 4)).toBe(4)
    expect(pageInHand(leaf('a'), startView, 4)).toBeNull()
    expect(pageInHand(leaf('a'), startView, 1)).toBe(1)
  })

  it('is never looked at larger or smaller than the steps there are', () => {
    const far = Array.from({ length: 9 }).reduce<typeof startView>((view) => nextView(view, { type: 'zoom', by: 1 }), startView)
    expect(far.zoom).toBe(3)
    expect(nextView(startView, { type: 'zoom', by: -1 }).zoom).toBe(0)
  })
})

describe('what the table says', () => {
  const table = { students: [student], scripts: [script] } as unknown as SortingTable
  it('tells a suggested name from a given one', () => {
    expect(sayNeighbour({ number: 48, half: null, state: 'placed', paperPage: 1, scriptId: 's' }, table)).toBe('leaf 48, page 1 of perhaps Jun Rao')
    const named = { ...table, scripts: [{ ...script, studentId: 'jun' }] }
    expect(sayNeighbour({ number: 48, half: null, state: 'placed', paperPage: 1, scriptId: 's' }, named)).toBe('leaf 48, page 1 of Jun Rao')
  })

  it('says why a place is offered', () => {
    expect(whyThere({ target: { scriptId: 's' }, reason: 'follows', apart: 1 }, 2, script, undefined)).toBe('lies directly before it; page 2 missing')
    expect(whyThere({ target: { classSetId: 'c', studentId: 'jun' }, reason: 'no_script', apart: 0 }, 2, undefined, { ...student, attendance: 'absent' })).toBe('has no script; marked absent')
  })

  it('puts reasons into words', () => {
    expect(whyLoose({ reasons: ['unlike_paper'], problem: null, missing: [], number: 3 })).toBe('it does not look like this paper')
    expect(whyLoose({ reasons: ['unreadable'], problem: 'page_incomplete', missing: [], number: 7 })).toBe('a part of page 7 of the file is missing: scan that sheet again')
    expect(whyLoose({ reasons: ['order_unclear', 'page_missing'], problem: null, missing: [2, 3, 4], number: 3 })).toBe('the sheets around it can be put together in more than one way; pages 2, 3 and 4 of its script are missing')
    expect(sayLeaf({ number: 3, half: 1 })).toBe('right half of sheet 3')
  })

  it('says beside a script what was found of its pages', () => {
    const page = { id: 'p', paperPage: 1, leafId: 'l', turn: 0, reasons: [], older: 0 } as const
    expect(scriptNotes({ pages: [page], missing: [2] })).toEqual(['page 2 missing'])
    expect(scriptNotes({ pages: [{ ...page, reasons: ['pages_swapped'] }, { ...page, paperPage: 2, reasons: ['pages_swapped', 're_scan'], older: 1 }], missing: [] })).toEqual(['pages lay in another order', 'page 2 scanned again later'])
    expect(scriptNotes({ pages: [{ ...page, older: 1 }], missing: [] })).toEqual(['page 1 scanned more than once'])
  })

  it('counts what is left', () => {
    expect(leftToSort({ ...table, loose: [leaf('a')] })).toBe('1 loose sheet, 1 name')
    expect(leftToSort({ loose: [], scripts: [{ ...script, studentId: 'jun' }] })).toBe('all sorted')
  })
})
