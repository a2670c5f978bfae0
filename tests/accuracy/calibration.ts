import type { LeafReading } from '@/lib/core/leaf'
import type { ScoredSet } from './class-set'
import { scoreResult, type Truth } from './score-result'

const tenths = Array.from({ length: 10 }, (_, k) => k / 10)

/** How many of the leaves at a confidence (from `from` up to a tenth more) were what they were taken for. */
export type Step = Readonly<{ from: number; right: number; all: number }>
type Seen = Readonly<{ confidence: number; right: boolean }>

/** The likeliest page of every leaf by its print alone, foreign and doubled leaves too, against what it is. */
export function printConfidences({ result, truth }: Pick<ScoredSet, 'result' | 'truth'>): Seen[] {
  return result.readings.flatMap((reading) => (reading.guesses.length > 0 ? [{ confidence: reading.guesses[0]!.confidence, right: isPage(reading, truth) }] : []))
}

function isPage({ index, guesses }: LeafReading, truth: Truth): boolean {
  return truth.pages.some((page) => page.index === index && page.paper_page !== null && page.paper_page === guesses[0]!.paperPage)
}

/** Every leaf that was put into a script, with whether it belongs there: scored as if it alone had been placed wrongly or not. */
export function placedConfidences({ result, truth }: Pick<ScoredSet, 'result' | 'truth'>): Seen[] {
  const entries = result.findings.map(({ index, half, kind, script, paperPage, rotation, homography }) => ({ index, ...(half === undefined ? {} : { half }), kind, script, paper_page: paperPage, rotation, homography }))
  const wrong = scoreResult(truth, entries).wrong
  return result.findings.flatMap((finding, k) => {
    if (finding.kind !== 'script') return []
    const without = wrong === 0 ? 0 : scoreResult(truth, entries.map((entry, j) => (j === k ? { ...entry, kind: 'loose' } : entry))).wrong
    return [{ confidence: finding.confidence, right: without >= wrong }]
  })
}

export function calibrated(seen: readonly Seen[]): Step[] {
  return tenths.map((from) => {
    const here = seen.filter(({ confidence }) => Math.min(9, Math.floor(confidence * 10)) === Math.round(from * 10))
    return { from, right: here.filter(({ right }) => right).length, all: here.length }
  })
}

/**
 * The confidence from which a print is believed: the lowest tenth from which up no leaf was taken for a page that it is not, and two tenths
 * more for scans that are unlike all that were tried.
 */
export function derivedThreshold(steps: readonly Step[]): number {
  const worst = steps.findLast(({ right, all }) => right < all)
  return Math.min(1, (worst ? worst.from + 0.1 : 0) + 0.2)
}

export function sayCalibration(steps: readonly Step[]): string {
  return steps.filter(({ all }) => all > 0).map(({ from, right, all }) => `${from.toFixed(1)}: ${right}/${all}`).join('  ')
}
