import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { betaShare } from './beta-share'
import { fQuantile, tQuantile } from './quantile'

describe('quantiles', () => {
  it('are what the distribution reaches with that probability', () => {
    const freedom = fc.double({ min: 1, max: 2000, noNaN: true })
    fc.assert(fc.property(fc.constantFrom(0.025, 0.5, 0.95, 0.975), freedom, freedom, (share, above, below) => {
      const f = fQuantile(share, above, below)
      expect(betaShare((above * f) / (above * f + below), above / 2, below / 2)).toBeCloseTo(share, 9)
    }))
  })
  it('turn over with the degrees of freedom', () => {
    expect(fQuantile(0.975, 5, 18) * fQuantile(0.025, 18, 5)).toBeCloseTo(1, 9)
  })
  it('come to those of the normal distribution and of known closed forms', () => {
    expect(tQuantile(0.975, 1e6)).toBeCloseTo(1.959966, 5)
    // With one degree of freedom t is Cauchy, with two it is p / sqrt(2 p q).
    expect(tQuantile(0.975, 1)).toBeCloseTo(Math.tan(Math.PI * 0.475), 8)
    expect(tQuantile(0.975, 2)).toBeCloseTo(0.95 / Math.sqrt(2 * 0.975 * 0.025), 9)
  })
})
