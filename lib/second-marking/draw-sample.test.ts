import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { halves } from '@/lib/core/marks'
import { drawSample, type Candidate } from './draw-sample'

const cohort = fc.uniqueArray(
  fc.record({ scriptId: fc.uuid(), total: fc.integer({ min: 0, max: 80 }).map(halves), markedBy: fc.array(fc.constantFrom('1:a', '1:b', '2:a', '2:b', '3:c'), { maxLength: 4 }) }),
  { selector: ({ scriptId }) => scriptId, minLength: 1, maxLength: 120 },
)
const size = fc.integer({ min: 1, max: 30 })
const ids = (drawn: readonly { scriptId: string }[]) => drawn.map(({ scriptId }) => scriptId)

describe('drawing a sample', () => {
  it('holds each script once, and the highest and lowest totals', () => {
    fc.assert(fc.property(cohort, size, fc.string(), (scripts, wanted, seed) => {
      const drawn = drawSample(scripts, wanted, seed)
      const totals = ids(drawn).map((id) => scripts.find(({ scriptId }) => scriptId === id)!.total)
      expect(new Set(ids(drawn)).size).toBe(drawn.length)
      expect(Math.max(...totals)).toBe(Math.max(...scripts.map(({ total }) => total)))
      expect(Math.min(...totals)).toBe(Math.min(...scripts.map(({ total }) => total)))
    }))
  })
  it('is as large as asked, or larger only to bring in the ends and every marker of every question', () => {
    fc.assert(fc.property(cohort, size, fc.string(), (scripts, wanted, seed) => {
      const drawn = drawSample(scripts, wanted, seed)
      const keys = (some: readonly Candidate[]) => new Set(some.flatMap(({ markedBy }) => markedBy))
      const of = scripts.filter(({ scriptId }) => ids(drawn).includes(scriptId))
      expect(keys(of)).toEqual(keys(scripts))
      expect(drawn.length).toBeGreaterThanOrEqual(Math.min(wanted, scripts.length))
      expect(drawn.length).toBeLessThanOrEqual(Math.min(scripts.length, Math.max(wanted, 2) + keys(scripts).size))
    }))
  })
  it('can be drawn again from its seed, whatever the order the scripts come in', () => {
    fc.assert(fc.property(cohort, size, fc.string(), (scripts, wanted, seed) => {
      expect(drawSample([...scripts].reverse(), wanted, seed)).toEqual(drawSample(scripts, wanted, seed))
    }))
  })
  it('is read highest, lowest, middle first, whatever was drawn', () => {
    fc.assert(fc.property(cohort, size, fc.string(), (scripts, wanted, seed) => {
      const drawn = drawSample(scripts, wanted, seed)
      const totals = drawn.map(({ scriptId }) => scripts.find((one) => one.scriptId === scriptId)!.total)
      expect(totals[0]).toBe(Math.max(...totals))
      if (drawn.length > 1) expect(totals[1]).toBe(Math.min(...totals))
      if (drawn.length > 2) expect(totals[2]).toBe([...totals].sort((a, b) => a - b)[Math.floor((totals.length - 1) / 2)])
      expect(drawn.map(({ drawnAs }) => drawnAs).slice(0, 2)).toEqual(['highest', 'lowest'].slice(0, drawn.length))
    }))
  })
  it('has as many read before the middle as after', () => {
    const scripts = Array.from({ length: 30 }, (_, k) => ({ scriptId: `s${k}`, total: halves(k), markedBy: [] }))
    const drawn = drawSample(scripts, 15, 'seed')
    expect(drawn.slice(0, 2)).toEqual([{ scriptId: 's29', drawnAs: 'highest' }, { scriptId: 's0', drawnAs: 'lowest' }])
    const between = ids(drawn).slice(3).map((id) => Number(id.slice(1)))
    const middle = Number(drawn[2]!.scriptId.slice(1))
    expect(Math.abs(between.filter((n) => n < middle).length - between.filter((n) => n > middle).length)).toBeLessThanOrEqual(1)
  })
  it('spreads evenly: no stretch of the ranking longer than two slices goes by undrawn', () => {
    const scripts = Array.from({ length: 90 }, (_, k) => ({ scriptId: `s${k}`, total: halves(k), markedBy: [] }))
    fc.assert(fc.property(fc.string(), (seed) => {
      const ranks = ids(drawSample(scripts, 15, seed)).map((id) => Number(id.slice(1))).sort((a, b) => a - b)
      expect(Math.max(...ranks.slice(1).map((rank, k) => rank - ranks[k]!))).toBeLessThanOrEqual(14)
    }))
  })
  it('leaves it to chance which scripts of a stretch are drawn', () => {
    const scripts = Array.from({ length: 30 }, (_, k) => ({ scriptId: `s${k}`, total: halves(k), markedBy: [] }))
    const often = new Set(Array.from({ length: 60 }, (_, k) => ids(drawSample(scripts, 6, `seed ${k}`))).flat())
    expect(often.size).toBe(30)
  })
})
