import type { Seen } from './script-cost'

/** A way to part two scripts that lie between each other: the positions of each one's pages, in order, and in how many pages they change places against the first. */
export type Braid = Readonly<{ parts: readonly [readonly number[], readonly number[]]; changes: number }>

/**
 * Every way in which a run of leaves (ranks of their pages) is two whole scripts of `pages` pages that were pushed into each other, both in
 * order. None when the run is anything else, or the two lie one after the other. Positions count within the run.
 */
export function braidsOf(run: readonly Seen[], pages: number): Braid[] {
  if (pages < 2 || pages > 12 || run.length !== 2 * pages || new Set(run.slice(0, pages)).size === pages) return []
  const places = Array.from({ length: pages }, (_, k) => run.flatMap((rank, at) => (rank === k + 1 ? [at] : [])))
  if (places.some((two) => two.length !== 2)) return []
  let found: Braid[] = [{ parts: [[places[0]![0]!], [places[0]![1]!]], changes: 0 }]
  for (const [early, late] of places.slice(1) as [number, number][])
    found = found.flatMap(({ parts: [one, other], changes }) => [
      { parts: [[...one, early], [...other, late]] as const, changes },
      { parts: [[...one, late], [...other, early]] as const, changes: changes + 1 },
    ]).filter(({ parts }) => parts.every((part) => part.at(-1)! > part.at(-2)!))
  return found
}
