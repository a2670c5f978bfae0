import { expect, it } from 'vitest'
import { secondsLeft } from './sheaf-progress'

it('tells the time left by the pace of the last leaves', () => {
  expect(secondsLeft([0, 500, 1000, 1500, 2000], 25)).toBe(10)
})

it('forgets how long a pause before the last leaves was', () => {
  const before = Array.from({ length: 10 }, (_, k) => k * 100)
  const after = Array.from({ length: 24 }, (_, k) => 3_600_000 + k * 200)
  expect(secondsLeft([...before, ...after], 44)).toBe(2)
})

it('says nothing before there is a pace, or when nothing is left', () => {
  expect(secondsLeft([0, 100, 200], 60)).toBeNull()
  expect(secondsLeft([0, 100, 200, 300], 4)).toBeNull()
})
