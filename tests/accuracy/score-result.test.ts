import { describe, expect, it } from 'vitest'
import type { Homography } from '@/lib/core/paper-space'
import { percentile, scoreResult, type ResultPage, type Truth, type TruthPage } from './score-result'

const flat: Homography = [[2, 0, 0], [0, 2, 0], [0, 0, 1]]
const shifted = (mm: number): Homography => [[2, 0, (2 * mm * 72) / 25.4], [0, 2, 0], [0, 0, 1]]
const page = (index: number, who: string, paperPage: number): TruthPage => ({ index, kind: 'script', candidate_number: who, paper_page: paperPage, rotation: 0, homography: flat, width_px: 1000 })
const put = (index: number, script: number, paperPage: number, rest: Partial<ResultPage> = {}): ResultPage => ({ index, kind: 'script', script, paper_page: paperPage, rotation: 0, homography: flat, ...rest })
const truth = (...pages: TruthPage[]): Truth => ({ pages, questions: [{ page: 1, region: { x: 50, y: 50, w: 100, h: 40 } }] })

describe('scoring a result against the truth', () => {
  it('counts a page that is right in all as good', () => {
    const score = scoreResult(truth(page(0, '1', 1), page(1, '1', 2)), [put(0, 1, 1), put(1, 1, 2)])
    expect(score).toMatchObject({ pages: 2, scripts: 2, good: 2, wrong: 0, loose: 0, split: 0, mark: 100 })
  })
  it('counts a loose page as loose, not as wrong', () => {
    expect(scoreResult(truth(page(0, '1', 1)), [{ index: 0, kind: 'loose', paper_page: null, homography: null }])).toMatchObject({ loose: 1, wrong: 0, good: 0 })
  })
  it('counts a page among another student\'s pages as wrong', () => {
    const score = scoreResult(truth(page(0, '1', 1), page(1, '1', 2), page(2, '2', 3)), [put(0, 1, 1), put(1, 1, 2), put(2, 1, 3)])
    expect(score).toMatchObject({ wrong: 1, good: 2 })
  })
  it('counts another page, a foreign leaf and a leaf that lands a centimetre off as wrong', () => {
    const foreign: TruthPage = { ...page(1, '', 1), kind: 'foreign', candidate_number: null, paper_page: null, homography: null }
    const score = scoreResult(truth(page(0, '1', 1), foreign, page(2, '2', 1)), [put(0, 1, 2), put(1, 2, 1), put(2, 3, 1, { homography: shifted(11) })])
    expect(score).toMatchObject({ wrong: 3, good: 0, mark: 0 })
  })
  it('takes a page a millimetre and a half off as placed but not good', () => {
    const score = scoreResult(truth(page(0, '1', 1)), [put(0, 1, 1, { homography: shifted(1.5) })])
    expect(score).toMatchObject({ wrong: 0, good: 0, rightPage: 1 })
    expect(percentile(score.errors, 95)).toBeCloseTo(1.5)
  })
  it('lets either copy of a page stand as the script\'s', () => {
    const double: TruthPage = { ...page(1, '1', 1), kind: 'duplicate' }
    const score = scoreResult(truth(page(0, '1', 1), double), [{ index: 0, kind: 'loose', paper_page: null, homography: null }, put(1, 1, 1)])
    expect(score).toMatchObject({ scripts: 1, loose: 0, wrong: 0, good: 2 })
  })
  it('counts a student spread over two scripts, and a page too many on an image', () => {
    expect(scoreResult(truth(page(0, '1', 1), page(1, '1', 2)), [put(0, 1, 1), put(1, 2, 2)])).toMatchObject({ split: 1, wrong: 0 })
    expect(scoreResult(truth(page(0, '1', 1)), [put(0, 1, 1), put(0, 1, 2)])).toMatchObject({ wrong: 1, good: 1 })
  })
})
