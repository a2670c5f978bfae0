import { describe, expect, it } from 'vitest'
import { classSetFolder, scoreFolder } from './class-set'
import { percentile } from './score-result'

// The bars of everyday scans: no page in a wrong place, 97 % of script pages placed, 95 % of region corners within a millimetre.
describe.each(['one-page', 'everyday'])('the class set %s', (name) => {
  it('is placed without a fault, nearly whole, and to the millimetre', async () => {
    const { score } = await scoreFolder(classSetFolder(name))
    console.log(`${name}: ${score.scripts - score.loose} of ${score.scripts} placed, ${score.wrong} wrong, corners off ${percentile(score.errors, 95).toFixed(3)} mm p95`)
    expect(score.wrong).toBe(0)
    expect(score.scripts - score.loose).toBeGreaterThanOrEqual(0.97 * score.scripts)
    expect(percentile(score.errors, 95)).toBeLessThanOrEqual(1)
    expect(score.errors.length).toBeGreaterThan(100)
  })
})

describe.each(['bitonal', 'booklet'])('the class set %s', (name) => {
  it('has no page in a wrong place', async () => {
    const { score } = await scoreFolder(classSetFolder(name))
    console.log(`${name}: ${score.scripts - score.loose} of ${score.scripts} placed, ${score.wrong} wrong, corners off ${percentile(score.errors, 95).toFixed(3)} mm p95`)
    expect(score.wrong).toBe(0)
    expect(score.scripts - score.loose).toBeGreaterThan(0)
  })
})
