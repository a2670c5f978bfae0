import { createHash } from 'node:crypto'
import type { HalfMarks } from '@/lib/core/marks'
import type { DrawnAs } from '@/lib/core/second-marking'

/** A script that may be drawn: its total, and who marked which question of it, as one key each. */
export type Candidate = Readonly<{ scriptId: string; total: HalfMarks; markedBy: readonly string[] }>
export type Drawn = Readonly<{ scriptId: string; drawnAs: DrawnAs }>

// Each script draws one lot from the seed: the same seed gives the same lots whatever the order the scripts come in.
function lotOf(seed: string, scriptId: string): string {
  return createHash('sha256').update(`${seed} ${scriptId}`).digest('hex')
}

type Ranked = Candidate & Readonly<{ lot: string }>

/** One script by lot from each of `parts` even slices of the ranking. */
function spreadOver(ranked: readonly Ranked[], parts: number): Ranked[] {
  return Array.from({ length: parts }, (_, k) => {
    const slice = ranked.slice(Math.floor((k * ranked.length) / parts), Math.floor(((k + 1) * ranked.length) / parts))
    return slice.reduce((first, next) => (next.lot < first.lot ? next : first))
  })
}

/** Scripts to add so that every key of `markedBy` is seen: each time the one that brings most, by lot among equals. */
function missingMarkers(ranked: readonly Ranked[], drawn: readonly Ranked[]): Ranked[] {
  const seen = new Set(drawn.flatMap(({ markedBy }) => markedBy))
  const left = ranked.filter((one) => !drawn.includes(one)).sort((a, b) => (a.lot < b.lot ? -1 : 1))
  const added: Ranked[] = []
  const brings = ({ markedBy }: Ranked) => new Set(markedBy.filter((key) => !seen.has(key))).size
  for (;;) {
    const best = left.reduce<Ranked | null>((most, next) => (brings(next) > (most ? brings(most) : 0) ? next : most), null)
    if (!best) return added
    added.push(best)
    for (const key of best.markedBy) seen.add(key)
  }
}

/** Highest, lowest, one in the middle, then the rest by lot. */
function inReadingOrder(drawn: readonly Ranked[], seed: string): Drawn[] {
  const byTotal = [...drawn].sort(byRank)
  const [highest, lowest] = [byTotal.at(-1)!, byTotal[0]!]
  const middle = byTotal[Math.floor((byTotal.length - 1) / 2)]!
  const first = [...new Set([highest, lowest, middle])]
  const rest = byTotal.filter((one) => !first.includes(one)).sort((a, b) => (lotOf(`${seed} order`, a.scriptId) < lotOf(`${seed} order`, b.scriptId) ? -1 : 1))
  return [...first, ...rest].map((one) => ({ scriptId: one.scriptId, drawnAs: one === highest ? 'highest' : one === lowest ? 'lowest' : 'spread' }))
}

const byRank = (a: Ranked, b: Ranked) => a.total - b.total || (a.lot < b.lot ? -1 : 1)

/**
 * Draws `size` scripts by a seed, in reading order. The highest and the lowest total are always in it, the rest lies evenly over the
 * totals between, and every marker of every question is in it, if need be by scripts on top of `size`. The order the candidates
 * come in changes nothing. A sample of one still holds highest and lowest.
 */
export function drawSample(candidates: readonly Candidate[], size: number, seed: string): Drawn[] {
  if (candidates.length === 0) return []
  const ranked = candidates.map((one): Ranked => ({ ...one, lot: lotOf(seed, one.scriptId) })).sort(byRank)
  const ends = [...new Set([ranked.at(-1)!, ranked[0]!])]
  const between = ranked.slice(1, -1)
  const drawn = [...ends, ...spreadOver(between, Math.min(between.length, Math.max(0, size - ends.length)))]
  return inReadingOrder([...drawn, ...missingMarkers(ranked, drawn)], seed)
}
