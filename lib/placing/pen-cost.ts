import type { PenTrace } from '@/lib/core/leaf'

/** Cores at or below this come from 1-bit scans, which know no shades: there the width speaks. */
const oneBit = 30

/**
 * What it costs to hold two pages for one student's by what they were written with: minus the logarithm of how much likelier the difference
 * is within a script than between two. Spreads were measured on the class sets: within a script the strokes' brightness differs by 6 in
 * the mean, between scripts by 35; widths by 0.3 and 0.65 pixels; one script in fifty changes its pen. That pens agree says little
 * (many share a kind), so it weighs at most 0.6; that they differ says more.
 */
export function penCost(one: PenTrace | null | undefined, other: PenTrace | null | undefined): number {
  if (!one || !other) return 0
  const widths = Math.min(one.core, other.core) <= oneBit
  return widths ? Math.min(0.6, weigh(Math.abs(one.width - other.width), 0.3, 0.65)) : weigh(Math.abs(one.core - other.core), 6, 35)
}

function weigh(difference: number, within: number, between: number): number {
  const apart = Math.exp(-difference / between) / between
  const together = 0.98 * (Math.exp(-difference / within) / within) + 0.02 * apart
  return Math.max(-0.6, Math.log(apart / together))
}
