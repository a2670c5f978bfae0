import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { DigitShares } from '@/lib/core/digit-reading'
import { certainName } from '@/lib/core/sorting'
import { assignNames, type ReadScript } from './assign-names'

/** A digit as a network reads it: surely, or torn between two. */
const sure = (digit: string): number[] => Array.from({ length: 10 }, (_, k) => (k === Number(digit) ? 0.97 : 0.002))
const torn = (a: string, b: string): number[] => Array.from({ length: 10 }, (_, k) => (k === Number(a) ? 0.5 : k === Number(b) ? 0.46 : 0.003))
const boxes = (number: string): DigitShares[] => [...number].map(sure)
const script = (id: string, shares: readonly DigitShares[] | null, student: string | null = null): ReadScript => ({ id, student, boxes: shares })
const roster = ['8101', '8102', '8104', '8105', '8107', '8110', '8111', '8113'].map((number) => ({ student: `of ${number}`, number }))

const piles = fc.shuffledSubarray(roster.map(({ number }) => number), { minLength: 1 })

describe('naming scripts by their candidate numbers', () => {
  it('is certain of numbers that are plainly read, in whatever order they lie', () => {
    fc.assert(fc.property(piles, (numbers) => {
      const said = assignNames(numbers.map((number) => script(number, boxes(number))), roster)
      for (const number of numbers) expect(said.get(number)).toMatchObject({ student: `of ${number}`, by: 'number' })
      expect(Math.min(...[...said.values()].map(({ certainty }) => certainty))).toBeGreaterThanOrEqual(certainName)
    }))
  })

  it('gives each student at most one script, whatever the boxes say', () => {
    const share = fc.array(fc.nat(100), { minLength: 10, maxLength: 10 }).map((v) => v.map((one) => one / (1 + v.reduce((a, b) => a + b, 0))))
    const anything = fc.option(fc.array(fc.option(share), { minLength: 4, maxLength: 4 }))
    fc.assert(fc.property(fc.array(anything, { maxLength: 12 }), fc.nat(3), (pile, named) => {
      const scripts = pile.map((one, k) => script(`s${k}`, one, k > 0 && k <= named ? roster[k]!.student : null))
      const students = [...assignNames(scripts, roster).values()].map(({ student }) => student)
      const confirmed = scripts.flatMap(({ student }) => student ?? [])
      expect(new Set([...students, ...confirmed]).size).toBe(students.length + confirmed.length)
    }))
  })

  it('does not depend on the order in which the list is given, once the numbers speak', () => {
    fc.assert(fc.property(piles, fc.shuffledSubarray(roster, { minLength: roster.length }), (numbers, list) => {
      const names = (of: typeof roster) => new Map([...assignNames(numbers.map((number) => script(number, boxes(number))), of)].map(([id, { student }]) => [id, student]))
      expect(names(list)).toEqual(names(roster))
    }))
  })

  it('is never certain of a student who is not on the list, beside others or alone', () => {
    const stranger = fc.integer({ min: 8000, max: 8299 }).map(String).filter((number) => !roster.some((one) => one.number === number))
    fc.assert(fc.property(piles, stranger, fc.nat(8), fc.nat(4), (numbers, other, at, blurred) => {
      const shares = boxes(other).map((one, k) => (k === blurred ? null : one))
      const pile = numbers.map((number) => script(number, boxes(number))).toSpliced(at, 0, script('stranger', shares))
      expect(assignNames(pile, roster).get('stranger')?.certainty ?? 0).toBeLessThan(certainName)
    }), { numRuns: 300 })
  })

  it('leaves a stranger unnamed whose number is plainly read', () => {
    expect(assignNames([script('a', boxes('8101')), script('x', boxes('8103')), script('b', boxes('8104'))], roster).get('x')).toBeUndefined()
  })

  it('is not certain when two scripts bear one number', () => {
    const said = assignNames([script('a', boxes('8102')), script('b', boxes('8102'))], roster)
    for (const { certainty } of said.values()) expect(certainty).toBeLessThan(certainName)
  })

  it('lets the order of a pile decide between digits that are torn, without becoming certain by it', () => {
    const torn4or7 = [...boxes('810'), torn('7', '4')]
    const pile = (numbers: (string | null)[]) => numbers.map((number, k) => script(number ?? `torn${k}`, number ? boxes(number) : torn4or7))
    const inOrder = assignNames(pile(['8101', '8102', null, '8105', '8110', '8111']), roster).get('torn2')
    expect(inOrder).toMatchObject({ student: 'of 8104' })
    expect(inOrder!.certainty).toBeLessThan(certainName)
  })

  it('follows the list where no number is read, and not in a pile whose numbers are shuffled', () => {
    const pile = (numbers: (string | null)[]) => numbers.map((number, k) => script(`s${k}`, number ? boxes(number) : [null, null, null, null]))
    expect(assignNames(pile(['8101', '8102', null, '8105', '8107', '8110']), roster).get('s2')).toMatchObject({ student: 'of 8104', by: 'list_order' })
    expect(assignNames(pile(['8113', '8102', null, '8101', '8110', '8105']), roster).get('s2')).toBeUndefined()
  })

  it('reads a number that is shorter than the boxes from either side', () => {
    const short = [{ student: 'seven', number: '7' }, { student: 'seventeen', number: '17' }]
    for (const shares of [[null, sure('7')], [sure('7'), null]]) expect(assignNames([script('a', shares)], short).get('a')).toMatchObject({ student: 'seven' })
  })
})
