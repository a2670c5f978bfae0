import { describe, expect, it } from 'vitest'
import { halves } from '@/lib/core/marks'
import type { Setting } from '@/lib/core/setting'
import type { SettingView } from '@/lib/core/setting-view'
import { nextLabel } from './next-label'
import { openSet, placedIn, questionInHand, setPaper, type SetEvent, type SetState } from './set-state'
import { numberBox } from './setting-edits'

const pages = [{ page: 1, width: 595.28, height: 841.89 }, { page: 2, width: 595.28, height: 841.89 }]
const empty: Setting = { step: 1, tolerance: halves(1), boxes: [], questions: [] }
const view = (setting: Setting = empty): SettingView => ({ paperId: 'p', title: 'Light', version: 1, blank: 'b', pages, setting, stamped: [], withdrawnQuestions: {}, withdrawnPoints: [], scanned: {}, sampled: false })
const ids = (name: string) => ({ question: `${name}-q`, space: `${name}-s`, point: `${name}-p` })
const band = (y: number, h = 90) => ({ page: 1, rect: { x: 48, y, w: 499, h } })
const drew = (name: string, y: number): SetEvent => ({ type: 'drew', placed: band(y), ids: ids(name) })
const after = (...events: SetEvent[]): SetState => events.reduce(setPaper, openSet(view()))
const labels = (state: SetState) => state.setting.questions.map(({ label }) => label)

describe('drawing answer spaces', () => {
  it('puts a new question in reading order, labels it, and takes it in hand', () => {
    const state = after(drew('a', 100), drew('c', 400), drew('b', 250))
    expect(state.setting.questions.map(({ id }) => id)).toEqual(['a-q', 'b-q', 'c-q'])
    expect(labels(state)).toEqual(['1', '3', '2'])
    expect(state.hand).toEqual({ kind: 'space', questionId: 'b-q', spaceId: 'b-s' })
    expect(questionInHand(state)!.points).toHaveLength(1)
  })

  it('draws a further space of the question in hand, on another page too', () => {
    const state = after(drew('a', 100), { type: 'chose', tool: 'more' }, { type: 'turned', page: 2 }, { type: 'drew', placed: { ...band(60), page: 2 }, ids: ids('b') })
    expect(state.setting.questions).toHaveLength(1)
    expect(state.setting.questions[0]!.spaces.map(({ page }) => page)).toEqual([1, 2])
    expect(state.tool).toBeNull()
  })

  it('draws name and number boxes, and divides the number box into digits', () => {
    const state = after({ type: 'chose', tool: 'name' }, drew('n', 30), { type: 'chose', tool: 'number' }, { type: 'drew', placed: { page: 1, rect: { x: 400, y: 90, w: 104, h: 30 } }, ids: ids('x') })
    expect(state.setting.questions).toHaveLength(0)
    expect(numberBox(state.setting.boxes)).toEqual({ page: 1, rect: { x: 400, y: 90, w: 104, h: 30 }, digits: 4 })
    const five = setPaper(state, { type: 'divided', digits: 5 })
    expect(five.setting.boxes.filter(({ kind }) => kind === 'number').map(({ rect }) => rect.w)).toEqual([20.8, 20.8, 20.8, 20.8, 20.8])
    const moved = setPaper(five, { type: 'placed', rect: { x: 300, y: 90, w: 104, h: 30 } })
    expect(numberBox(moved.setting.boxes)).toMatchObject({ rect: { x: 300 }, digits: 5 })
  })

  it('copies the space in hand below, and to the next page when the page is full', () => {
    const below = after(drew('a', 100), { type: 'copied', ids: ids('b') })
    expect(placedIn(below.setting, below.hand)).toMatchObject({ page: 1, rect: { x: 48, y: 196, w: 499, h: 90 } })
    const over = after(drew('a', 740), { type: 'copied', ids: ids('b') })
    expect(placedIn(over.setting, over.hand)).toMatchObject({ page: 2, rect: { y: 48, h: 90 } })
    expect(over.page).toBe(2)
  })
})

describe('moving', () => {
  it('stays on the page and never turns inside out', () => {
    const state = after(drew('a', 100), { type: 'nudged', dx: -900, dy: 0, size: false }, { type: 'nudged', dx: 0, dy: -900, size: true })
    expect(placedIn(state.setting, state.hand)!.rect).toEqual({ x: 0, y: 100, w: 499, h: 12 })
  })

  it('makes one undo of nudges one after the other, and takes boxes back whole', () => {
    const state = after(drew('a', 100), { type: 'nudged', dx: 2, dy: 0, size: false }, { type: 'nudged', dx: 2, dy: 0, size: false })
    expect(placedIn(state.setting, state.hand)!.rect.x).toBe(52)
    const back = setPaper(state, { type: 'undid' })
    expect(placedIn(back.setting, back.hand)!.rect.x).toBe(48)
    const none = setPaper(back, { type: 'undid' })
    expect(none.setting.questions).toHaveLength(0)
    expect(none.hand).toBeNull()
    expect(labels(setPaper(none, { type: 'redid' }))).toEqual(['1'])
    expect(setPaper(none, { type: 'undid' })).toBe(none)
  })

  it('deletes, and brings back by undo', () => {
    const state = after(drew('a', 100), { type: 'dropped' })
    expect(state.setting.questions).toHaveLength(0)
    expect(setPaper(state, { type: 'undid' }).setting.questions[0]!.id).toBe('a-q')
  })
})

describe('the scheme', () => {
  it('gives half for the working and half for the answer in one event', () => {
    const state = after(drew('a', 100), { type: 'halved', ids: ['x', 'y'] })
    const question = questionInHand(state)!
    expect(question.points.map(({ id, label, worth }) => [id, label, worth])).toEqual([['a-p', 'Working', 1], ['y', 'Answer', 1]])
    expect(question.maximum).toBe(2)
  })

  it('lets the most that can be given follow the points that count', () => {
    const start = after(drew('a', 100))
    const points = [...questionInHand(start)!.points, { id: 'second', label: 'Unit', worth: halves(1), kind: null, dependsOn: 'a-p', note: '' }]
    expect(questionInHand(setPaper(start, { type: 'pointed', points, key: null }))!.maximum).toBe(3)
    const withdrawn = { ...start, view: { ...start.view, withdrawnPoints: ['second'] } }
    expect(questionInHand(setPaper(withdrawn, { type: 'pointed', points, key: null }))!.maximum).toBe(2)
    const without = setPaper(setPaper(start, { type: 'pointed', points, key: null }), { type: 'pointed', points: points.slice(1), key: null })
    expect(questionInHand(without)!.points[0]!.dependsOn).toBeNull()
  })

  it('typing is one undo for each field', () => {
    const state = after(drew('a', 100), { type: 'wrote', patch: { text: 'W' } }, { type: 'wrote', patch: { text: 'Wh' } }, { type: 'wrote', patch: { answer: '3' } })
    const back = setPaper(state, { type: 'undid' })
    expect([questionInHand(back)!.text, questionInHand(back)!.answer]).toEqual(['Wh', ''])
    expect(questionInHand(setPaper(back, { type: 'undid' }))!.text).toBe('')
  })
})

describe('saving', () => {
  it('knows what is saved while more is written', () => {
    const one = after(drew('a', 100))
    const two = setPaper(one, { type: 'wrote', patch: { text: 'x' } })
    const saved = setPaper(two, { type: 'saved', version: 2, setting: one.setting })
    expect(saved.view.version).toBe(2)
    expect(saved.setting).not.toBe(saved.view.setting)
  })

  it('forgets a refusal with the next change, but not that someone else changed the paper', () => {
    const refused = (code: 'paper_invalid' | 'out_of_date') => setPaper(after(drew('a', 100)), { type: 'refused', trouble: { code, detail: {}, offline: false } })
    const write: SetEvent = { type: 'wrote', patch: { text: 'x' } }
    expect(setPaper(refused('paper_invalid'), write).trouble).toBeNull()
    expect(setPaper(refused('out_of_date'), write).trouble?.code).toBe('out_of_date')
    expect(setPaper(refused('out_of_date'), { type: 'opened', view: view() }).setting).toBe(empty)
    expect(setPaper(refused('out_of_date'), { type: 'overwriting', version: 7 })).toMatchObject({ trouble: null, view: { version: 7 } })
  })
})

describe('labels', () => {
  it.each([[null, [], '1'], ['1a', ['1a'], '1b'], ['1a', ['1a', '1b'], '2'], ['2', ['2'], '3'], ['2', ['2', '3'], '4'], ['Q7', ['Q7'], 'Q8'], ['1z', ['1z'], '2'], ['x', [], '1']] as const)('after %s comes another', (before, taken, wanted) => {
    expect(nextLabel(before, taken)).toBe(wanted)
  })
})
