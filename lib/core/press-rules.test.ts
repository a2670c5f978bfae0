import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { AppError } from './errors'
import { markOf, responseState } from './marking'
import { halves, type MarkingStep } from './marks'
import type { MarkPoint } from './paper'
import { assertFits, assertSettles, pointsWithoutBase, type Scheme } from './press-rules'
import type { Stamp } from './stamp'

const point = (id: string, worth: number, more: Partial<MarkPoint> = {}): MarkPoint => ({ id, label: id, worth: halves(worth), kind: null, dependsOn: null, note: '', withdrawn: false, ...more })
const scheme = (points: MarkPoint[], maximum = points.reduce((sum, p) => sum + p.worth, 0), step: MarkingStep = 1): Scheme => ({ maximum: halves(maximum), step, points })
let made = 0
const stamp = (more: Omit<Partial<Stamp>, 'worth'> & { worth: number }): Stamp => ({
  id: `00000000-0000-4000-8000-${String(++made).padStart(12, '0')}`, markingId: 'm', version: 1, kind: 'tick', markPointId: null, scriptPageId: 'p', x: 0, y: 0, w: 0, h: 0, text: '', path: [], removed: false,
  ...more, ...{ worth: halves(more.worth) },
} as Stamp)
const codeOf = (work: () => void): string => {
  try { work() } catch (error) { return (error as AppError).code }
  return 'fits'
}
const press = (before: Stamp[], next: Stamp, held: Scheme): string => codeOf(() => assertFits([...before, next], next, held))

describe('pressing', () => {
  const two = scheme([point('a', 2), point('b', 1)])

  it('gives a point no more than it is worth, in parts or at once', () => {
    const half = stamp({ kind: 'half', worth: 1, markPointId: 'a' })
    expect(press([half], stamp({ kind: 'half', worth: 1, markPointId: 'a' }), two)).toBe('fits')
    expect(press([half], stamp({ worth: 2, markPointId: 'a' }), two)).toBe('over_maximum')
  })

  it('keeps the whole within the maximum and on the step', () => {
    expect(press([stamp({ worth: 2 }), stamp({ kind: 'half', worth: 1 })], stamp({ kind: 'half', worth: 1 }), two)).toBe('over_maximum')
    expect(press([], stamp({ kind: 'half', worth: 1 }), scheme([], 4, 2))).toBe('off_step')
  })

  it('lets a nought stand alone', () => {
    const nought = stamp({ kind: 'nought', worth: 0 })
    expect(press([nought], stamp({ worth: 2 }), two)).toBe('nought_with_marks')
    expect(press([stamp({ worth: 2 })], nought, two)).toBe('nought_with_marks')
    expect(press([nought], stamp({ kind: 'nothing-written', worth: 0 }), two)).toBe('nought_with_marks')
    expect(press([stamp({ worth: 2, removed: true })], nought, two)).toBe('fits')
    expect(press([nought], stamp({ kind: 'note', worth: 0, text: 'see above' }), two)).toBe('fits')
  })

  it('gives nothing to a cross, to a point of another question, or to a withdrawn point', () => {
    expect(press([], stamp({ kind: 'cross', worth: 2 }), two)).toBe('bad_input')
    expect(press([], stamp({ worth: 2, markPointId: 'elsewhere' }), two)).toBe('bad_input')
    expect(press([], stamp({ worth: 2, markPointId: 'a' }), scheme([point('a', 2, { withdrawn: true })]))).toBe('over_maximum')
  })

  it('lets a stamp be taken back whatever stands beside it, and a note be written above a maximum that was lowered', () => {
    const over = [stamp({ worth: 2 }), stamp({ worth: 2 })]
    expect(press(over, stamp({ worth: 2, removed: true }), two)).toBe('fits')
    expect(press(over, stamp({ kind: 'note', worth: 0, text: 'oe' }), two)).toBe('fits')
  })

  it('never lets any sequence of presses reach above the maximum, a point or off the step', () => {
    const presses = fc.array(fc.record({ worth: fc.integer({ min: 0, max: 6 }), at: fc.constantFrom('a', 'b', null), kind: fc.constantFrom('tick', 'half', 'nought', 'nothing-written', 'cross'), removes: fc.boolean() }), { maxLength: 30 })
    fc.assert(fc.property(presses, fc.constantFrom<MarkingStep>(1, 2), (list, step) => {
      const held = scheme([point('a', 4), point('b', 2)], 5, step)
      let stamps: Stamp[] = []
      for (const { worth, at, kind, removes } of list) {
        const last = stamps.at(-1)
        const next = removes && last ? { ...last, removed: true, version: last.version + 1 } : stamp({ worth, markPointId: at, kind: kind as Stamp['kind'] })
        const after = [...stamps.filter((s) => s.id !== next.id), next]
        if (codeOf(() => assertFits(after, next, held)) === 'fits') stamps = after
      }
      expect(markOf(stamps)).toBeLessThanOrEqual(5)
      expect(markOf(stamps) % step).toBe(0)
      expect(markOf(stamps.filter((s) => s.markPointId === 'b'))).toBeLessThanOrEqual(2)
      if (stamps.some((s) => !s.removed && (s.kind === 'nought' || s.kind === 'nothing-written'))) expect(markOf(stamps)).toBe(0)
    }))
  })
})

describe('settling', () => {
  const held = scheme([point('m', 2, { kind: 'M' }), point('a', 2, { kind: 'A', dependsOn: 'm' })])

  it('asks for a stamp that says a mark', () => {
    const settles = (...stamps: Stamp[]): string => codeOf(() => assertSettles(stamps, held))
    expect(settles()).toBe('nothing_stamped')
    expect(settles(stamp({ kind: 'ring', worth: 0 }))).toBe('nothing_stamped')
    expect(settles(stamp({ kind: 'nought', worth: 0, removed: true }))).toBe('nothing_stamped')
    expect(settles(stamp({ kind: 'nought', worth: 0 }))).toBe('fits')
    expect(settles(stamp({ kind: 'cross', worth: 0 }))).toBe('fits')
  })

  it('keeps an answer mark only with its method mark', () => {
    const answer = stamp({ worth: 2, markPointId: 'a' })
    expect(pointsWithoutBase([answer], held.points).map((p) => p.id)).toEqual(['a'])
    expect(codeOf(() => assertSettles([answer], held))).toBe('base_missing')
    expect(codeOf(() => assertSettles([answer, stamp({ kind: 'half', worth: 1, markPointId: 'm' })], held))).toBe('fits')
  })

  it('says so when the maximum was lowered under it', () => {
    expect(codeOf(() => assertSettles([stamp({ worth: 2, markPointId: 'm' }), stamp({ worth: 2 })], { ...held, maximum: halves(3) }))).toBe('over_maximum')
  })
})

describe('how a response stands', () => {
  it('tells unmarked, open, a mark, a nought and nothing written apart', () => {
    const nought = stamp({ kind: 'nought', worth: 0 })
    expect(responseState(null)).toBe('unmarked')
    expect(responseState({ state: 'open', stamps: [{ ...nought, removed: true }] })).toBe('unmarked')
    expect(responseState({ state: 'open', stamps: [nought] })).toBe('open')
    expect(responseState({ state: 'settled', stamps: [nought] })).toBe('nought')
    expect(responseState({ state: 'settled', stamps: [stamp({ kind: 'cross', worth: 0 })] })).toBe('nought')
    expect(responseState({ state: 'settled', stamps: [stamp({ kind: 'nothing-written', worth: 0 })] })).toBe('nothing-written')
    expect(responseState({ state: 'settled', stamps: [stamp({ worth: 1 })] })).toBe('marked')
  })
})
