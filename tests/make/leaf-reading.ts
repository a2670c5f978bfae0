import type { LeafReading } from '@/lib/core/leaf'

const image = { encoding: 'jpeg', width: 1654, height: 2339, dpiX: 200, dpiY: 200, shownTurn: 0 } as const
const straight = [[2.7778, 0, 0], [0, 2.7778, 0], [0, 0, 1]] as const

/** The reading of a leaf that is clearly a page of the paper; 0 is an empty one, null one that nobody can tell. Nothing is said of its writing unless `more` says it. */
export function aClearLeaf(index: number, page: number | null, more: Partial<LeafReading> = {}): LeafReading {
  return page
    ? { index, image, empty: false, clear: true, ink: null, guesses: [{ paperPage: page, rotation: 0, homography: straight, confidence: 0.9 }], ...more }
    : { index, image, empty: page === 0, clear: false, ink: null, guesses: [], ...more }
}
