import { describe, expect, it } from 'vitest'
import { classSetFolder, codedSetFolder, scoreFolder, type ScoredSet } from './class-set'
import { percentile } from './score-result'

// The bars of everyday scans: no page in a wrong place, 97 % of script pages placed, 95 % of region corners within a millimetre.
describe.each(['one-page', 'everyday'])('the class set %s', (name) => {
  it('is placed without a fault, nearly whole, and to the millimetre', async () => {
    const { score, numbers, ink } = await scoreFolder(classSetFolder(name))
    console.log(`${name}: ${score.scripts - score.loose} of ${score.scripts} placed, ${score.wrong} wrong, corners off ${percentile(score.errors, 95).toFixed(3)} mm p95`)
    expect(score.wrong).toBe(0)
    expectWritingRead(name, { numbers, ink })
    expect(score.scripts - score.loose).toBeGreaterThanOrEqual(0.97 * score.scripts)
    expect(percentile(score.errors, 95)).toBeLessThanOrEqual(1)
    expect(score.errors.length).toBeGreaterThan(100)
  })
})

describe.each(['bitonal', 'booklet'])('the class set %s', (name) => {
  it('has no page in a wrong place', async () => {
    const { score, numbers, ink } = await scoreFolder(classSetFolder(name))
    console.log(`${name}: ${score.scripts - score.loose} of ${score.scripts} placed, ${score.wrong} wrong, corners off ${percentile(score.errors, 95).toFixed(3)} mm p95`)
    expect(score.wrong).toBe(0)
    expectWritingRead(name, { numbers, ink })
    expect(score.scripts - score.loose).toBeGreaterThan(0)
  })
})

/** No script bears another's number, most bear their own with certainty; no written answer passes for an empty one. */
function expectWritingRead(name: string, { numbers, ink }: Pick<ScoredSet, 'numbers' | 'ink'>): void {
  console.log(`${name}: digits ${numbers.digitsRight} of ${numbers.digits} right, numbers ${numbers.right} right, ${numbers.wrong} wrong, ${numbers.open} left open; ${ink.hits} of ${ink.blank} empty answers found, ${ink.misses} of ${ink.written} written ones taken for empty`)
  expect(numbers).toMatchObject({ wrong: 0, strangersNamed: 0 })
  expect(numbers.digits).toBeGreaterThan(40)
  expect(numbers.digitsRight).toBeGreaterThanOrEqual(0.93 * numbers.digits)
  expect(numbers.right).toBeGreaterThanOrEqual(0.5 * (numbers.right + numbers.open))
  expect(ink.written).toBeGreaterThan(50)
  expect(ink.misses).toBe(0)
  expect(ink.hits).toBeGreaterThanOrEqual(0.95 * ink.blank)
}

describe('a class set printed with codes', () => {
  it('is placed by its codes in whatever order it lies, checked by its print', async () => {
    const { score, codes } = await scoreFolder(codedSetFolder)
    console.log(`coded: ${codes!.read} of ${codes!.printed} codes read, ${score.scripts - score.loose} of ${score.scripts} placed, ${score.wrong} wrong, corners off ${percentile(score.errors, 95).toFixed(3)} mm p95`)
    expect(codes!.read).toBeGreaterThanOrEqual(0.995 * codes!.printed)
    expect(score).toMatchObject({ wrong: 0, loose: 0, split: 0, rightKind: score.pages })
    expect(percentile(score.errors, 95)).toBeLessThanOrEqual(0.25)
    expect(score.errors.length).toBeGreaterThan(100)
  })
})
