import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { digitShares } from '@/lib/placing/read-number'
import { makeDice } from '@/scripts/digits/dice'
import { seen, withLines } from '@/scripts/digits/lessons'
import { unpackSamples } from '@/scripts/digits/pack-samples'
import { writeDigit } from '@/scripts/digits/write-digit'

// 200 digits by hands that neither the lessons nor the class sets used. `npm run train:digits -- --lessons 0` measures all 1,000 held out.
const samples = withLines(unpackSamples(readFileSync('tests/fixtures/held-out-digits.bin')))
const best = (shares: readonly number[]) => shares.indexOf(Math.max(...shares))

describe('reading handwritten digits nobody learnt from', () => {
  it('is right for nearly all, as they are', () => {
    const right = samples.filter(({ ink, digit }) => best(digitShares(Float32Array.from(ink, (v) => v / 255))) === digit).length
    console.log(`held-out digits: ${right} of ${samples.length} right`)
    expect(samples).toHaveLength(200)
    expect(right).toBeGreaterThanOrEqual(0.97 * samples.length)
  })

  it('is right for nearly all when they are written into boxes with thin and thick pens, and seldom sure and wrong', () => {
    const dice = makeDice(5)
    const read = samples.flatMap(({ digit, lines }) => {
      const ink = seen(writeDigit(lines, dice))
      return ink ? [{ digit, shares: digitShares(ink) }] : []
    })
    const right = read.filter(({ digit, shares }) => best(shares) === digit).length
    const sureAndWrong = read.filter(({ digit, shares }) => best(shares) !== digit && Math.max(...shares) >= 0.9).length
    console.log(`held-out digits written with pens: ${right} of ${read.length} right, ${sureAndWrong} sure and wrong`)
    expect(read.length).toBeGreaterThanOrEqual(190)
    expect(right).toBeGreaterThanOrEqual(0.95 * read.length)
    expect(sureAndWrong).toBeLessThanOrEqual(0.01 * read.length)
  })
})
