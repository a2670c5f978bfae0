import { expect } from 'vitest'

/** Holds a figure, or a list of them, against published ones within the stated tolerance. */
export function expectNear(found: number | null | readonly (number | null)[], published: number | readonly number[], tolerance: number): void {
  const [all, wanted] = [[found].flat(), [published].flat()]
  expect(all).toHaveLength(wanted.length)
  wanted.forEach((value, k) => expect(Math.abs((all[k] ?? NaN) - value), `${all[k]} against ${value}`).toBeLessThanOrEqual(tolerance))
}
