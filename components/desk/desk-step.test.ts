import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { kept, markOf } from '@/lib/core/marking'
import { halves, type MarkingStep } from '@/lib/core/marks'
import type { MarkPoint } from '@/lib/core/paper'
import { assertFits, assertSettles } from '@/lib/core/press-rules'
import type { Run, Strip } from '@/lib/core/run'
import type { Stamp } from '@/lib/core/stamp'
import { openDesk, schemeOf, stampsOf, type DeskState, type Save } from './desk-state'
import { stepDesk, type DeskEvent } from './desk-step'

const point = (id: string, worth: number, more: Partial<MarkPoint> = {}): MarkPoint => ({ id, label: id, worth: halves(worth), kind: null, dependsOn: null, note: '', withdrawn: false, ...more })
const strip = (n: number, more: Partial<Strip> = {}): Strip => ({
  responseId: `r${n}`, number: n, name: null, pictures: [{ spaceId: 's', scriptPageId: `page-${n}`, rect: { x: 48, y: 250, w: 499, h: 120 }, src: '/x' }], pages: [], marking: null, bar: null, rescanned: false, flag: null, ...more,
})
const aRun = (strips: Strip[], { points = [point('a', 2), point('b', 2)], step = 1 as MarkingStep } = {}): Run => ({
  paperId: 'p', paperTitle: 'Light', className: '8K', round: 'first', step, namesHidden: true, next: null, strips,
  question: { id: 'q', label: '1b', text: '', answer: '', modelSolution: '', schemeNote: '', maximum: halves(4), points },
})
let ids = 0
const newId = (): string => `stamp-${++ids}`

/** Does events one after another; gives the desk and all that was to be saved. */
function play(run: Run, ...events: DeskEvent[]): { state: DeskState; saves: Save[] } {
  let state = openDesk(run)
  const saves: Save[] = []
  for (const event of events) {
    const next = stepDesk(state, event, newId)
    state = next.state
    saves.push(...next.saves)
  }
  return { state, saves }
}
const give = (pointId: string, part = false): DeskEvent => ({ type: 'point', pointId, part })
const mark = (state: DeskState, k = 0): number => markOf(state.strips[k]!.marking?.stamps ?? [])
const three = (): Strip[] => [strip(1), strip(2), strip(3)]

describe('mark point keys', () => {
  it('give the point, take it back when pressed again, and step down with the part key', () => {
    expect(mark(play(aRun(three()), give('a')).state)).toBe(2)
    expect(mark(play(aRun(three()), give('a'), give('a')).state)).toBe(0)
    expect(mark(play(aRun(three()), give('a', true)).state)).toBe(1)
    expect(mark(play(aRun(three()), give('a'), give('a', true)).state)).toBe(1)
    expect(mark(play(aRun(three()), give('a'), give('a', true), give('a', true)).state)).toBe(0)
  })

  it('draw a half tick for half a mark, tied to the point', () => {
    const { state } = play(aRun(three()), give('b', true))
    expect(stampsOf(state.strips[0])).toMatchObject([{ kind: 'half', worth: 1, markPointId: 'b', scriptPageId: 'page-1', version: 1 }])
  })

  it('offer no half where the paper is marked in whole marks', () => {
    const { state, saves } = play(aRun(three(), { step: 2 }), give('a', true))
    expect(state.says).toMatchObject({ code: 'off_step' })
    expect(saves).toEqual([])
  })

  it('put the tick where the last one like it went on another strip', () => {
    const first = play(aRun(three()), give('a'))
    const id = stampsOf(first.state.strips[0])[0]!.id
    const { state } = play(aRun(three()), { type: 'go', to: 0 })
    expect(state.hand).toBe(0)
    let desk = stepDesk(first.state, { type: 'put', id, at: { scriptPageId: 'page-1', x: 200, y: 300 } }, newId).state
    desk = stepDesk(desk, { type: 'go', to: 'down' }, newId).state
    desk = stepDesk(desk, give('a'), newId).state
    expect(stampsOf(desk.strips[1])).toMatchObject([{ x: 200, y: 300, scriptPageId: 'page-2' }])
  })
})

describe('what does not fit', () => {
  it('is said and changes nothing', () => {
    const { state, saves } = play(aRun(three()), give('a'), give('b'), { type: 'stamp', kind: 'half' })
    expect(state.says).toMatchObject({ code: 'over_maximum' })
    expect(mark(state)).toBe(4)
    expect(saves).toHaveLength(2)
  })
  it('leaves what another marker has begun alone', () => {
    const { state, saves } = play(aRun([strip(1, { bar: 'begun-by-other' }), strip(2)]), { type: 'go', to: 0 }, give('a'))
    expect(state.says).toMatchObject({ code: 'begun_by_other' })
    expect(saves).toEqual([])
  })
  it('does not settle what has no mark, nor an answer mark without its method mark', () => {
    expect(play(aRun(three()), { type: 'settle' }).state).toMatchObject({ hand: 0, says: { code: 'nothing_stamped' } })
    const points = [point('m', 2, { kind: 'M' }), point('a', 2, { kind: 'A', dependsOn: 'm' })]
    expect(play(aRun(three(), { points }), give('a'), { type: 'settle' }).state).toMatchObject({ hand: 0, says: { code: 'base_missing' } })
  })
})

describe('going on', () => {
  it('settles and takes the next strip that is to do, and says when the run is finished', () => {
    const settled = strip(2, { marking: { id: 'm', state: 'settled', stamps: [] } })
    const { state, saves } = play(aRun([strip(1), settled, strip(3)]), give('a'), { type: 'settle' })
    expect(state.hand).toBe(2)
    expect(saves.map((save) => save.kind)).toEqual(['stamp', 'settle'])
    expect(stepDesk(stepDesk(state, give('a'), newId).state, { type: 'settle' }, newId).state).toMatchObject({ hand: 2, says: { words: 'run-finished' } })
  })

  it('makes nought and nothing written one key each: marks go, it settles, and the next strip comes', () => {
    const { state, saves } = play(aRun(three()), give('a'), { type: 'alone', kind: 'nought' }, { type: 'alone', kind: 'nothing-written' })
    expect(state.hand).toBe(2)
    expect(stampsOf(state.strips[0]).map((stamp) => stamp.kind)).toEqual(['nought'])
    expect(stampsOf(state.strips[1]).map((stamp) => stamp.kind)).toEqual(['nothing-written'])
    expect(saves.map((save) => (save.kind === 'stamp' ? `${save.stamp.kind}${save.stamp.removed ? ' away' : ''}` : save.kind))).toEqual(['tick', 'tick away', 'nought', 'settle', 'nothing-written', 'settle'])
  })

  it('opens a settled marking again by a change, and says so', () => {
    const { state, saves } = play(aRun(three()), { type: 'alone', kind: 'nought' }, { type: 'go', to: 0 }, give('b'))
    expect(stampsOf(state.strips[0])).toMatchObject([{ kind: 'tick', markPointId: 'b' }])
    expect(state.strips[0]!.marking!.state).toBe('open')
    expect(state.says).toEqual({ words: 'opened-again' })
    expect(saves.slice(2).map((save) => save.kind)).toEqual(['reopen', 'stamp', 'stamp'])
  })
})

describe('a settled second marking', () => {
  it('is neither undone nor changed, and why is said', () => {
    const second: Run = { ...aRun(three()), round: 'second' }
    const { state, saves } = play(second, give('a'), { type: 'settle' }, { type: 'undo' }, { type: 'go', to: 0 }, give('b'))
    expect(state.says).toEqual({ code: 'marking_settled', detail: { round: 'second' } })
    expect(mark(state)).toBe(2)
    expect(saves.map((save) => save.kind)).toEqual(['stamp', 'settle'])
    expect(play(second, give('a'), { type: 'settle' }, { type: 'undo' }).state).toMatchObject({ hand: 0, says: { code: 'marking_settled' } })
    expect(mark(play(second, give('a'), { type: 'undo' }).state), 'before it is settled').toBe(0)
  })
})

describe('undo', () => {
  it('reaches back across strips and settling, and redo forward again', () => {
    const done = play(aRun(three()), give('a'), { type: 'settle' }, give('b', true), { type: 'settle' }).state
    let desk = done
    for (let k = 0; k < 4; k++) desk = stepDesk(desk, { type: 'undo' }, newId).state
    expect(desk.strips.map((one) => stampsOf(one).length)).toEqual([0, 0, 0])
    expect(desk).toMatchObject({ hand: 0 })
    expect(stepDesk(desk, { type: 'undo' }, newId).state.says).toEqual({ words: 'nothing-to-undo' })
    for (let k = 0; k < 4; k++) desk = stepDesk(desk, { type: 'redo' }, newId).state
    expect(desk.strips.map((one) => [markOf(one.marking?.stamps ?? []), one.marking?.state])).toEqual(done.strips.map((one) => [markOf(one.marking?.stamps ?? []), one.marking?.state]))
  })
})

describe('any sequence of events', () => {
  const event = fc.oneof<fc.Arbitrary<DeskEvent>[]>(
    fc.record({ type: fc.constant('point' as const), pointId: fc.constantFrom('a', 'b'), part: fc.boolean() }),
    fc.record({ type: fc.constant('stamp' as const), kind: fc.constantFrom('tick' as const, 'half' as const, 'cross' as const, 'ring' as const) }),
    fc.record({ type: fc.constant('alone' as const), kind: fc.constantFrom('nought' as const, 'nothing-written' as const) }),
    fc.constantFrom<DeskEvent>({ type: 'settle' }, { type: 'undo' }, { type: 'redo' }, { type: 'go', to: 'up' }, { type: 'go', to: 'down' }, { type: 'nudge', dx: 2, dy: 0 }, { type: 'take-back' }),
  )

  it('tells the server exactly what the desk shows, in an order the rules never refuse', () => {
    fc.assert(fc.property(fc.array(event, { maxLength: 40 }), (events) => {
      const { state, saves } = play(aRun(three()), ...events)
      const server = new Map<string, { state: string; stamps: Stamp[] }>(state.strips.map((one) => [one.responseId, { state: 'open', stamps: [] }]))
      for (const save of saves) {
        const at = server.get(save.kind === 'stamp' ? save.stamp.responseId : save.responseId)!
        if (save.kind === 'stamp') {
          expect(at.state).toBe('open')
          const stamp: Stamp = { ...save.stamp, markingId: '' }
          const old = at.stamps.find((other) => other.id === stamp.id)
          expect(old?.version ?? 0).toBeLessThan(stamp.version)
          at.stamps = [...at.stamps.filter((other) => other.id !== stamp.id), stamp]
          assertFits(at.stamps, stamp, schemeOf(state.run))
        } else if (save.kind === 'settle') {
          assertSettles(at.stamps, schemeOf(state.run))
          at.state = 'settled'
        } else at.state = 'open'
      }
      for (const one of state.strips) {
        const there = server.get(one.responseId)!
        expect(there.state).toBe(one.marking?.state ?? 'open')
        const seen = (stamps: readonly Stamp[]) => kept(stamps).map(({ id, x, y, worth }) => ({ id, x, y, worth })).sort((a, b) => (a.id < b.id ? -1 : 1))
        expect(seen(there.stamps)).toEqual(seen(one.marking?.stamps ?? []))
      }
    }), { numRuns: 300 })
  })
})
