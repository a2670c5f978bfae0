import type { PenTrace } from '@/lib/core/leaf'

/** Cores at or below this come from 1-bit scans, which know no shades. */
const oneBit = 30

/** How far apart two pages are in one way of writing: in the mean within a script, and between two. `most` is the most that likeness speaks for one hand. */
type Trait = Readonly<{ within: number; between: number; most: number }>

/**
 * Measured on the class sets and others of other papers and seeds: means of the differences between two pages. That pens agree says little (many share a
 * kind), that hands agree says a little more.
 */
const traits = {
  core: { within: 8, between: 35, most: 0.6 },
  width: { within: 0.3, between: 0.75, most: 0.8 },
  slant: { within: 0.06, between: 0.13, most: 0.7 },
  height: { within: 1.5, between: 2.4, most: 0.5 },
} as const satisfies Record<string, Trait>

/** Traits hang together, and a person can write differently on another page: never more than this for or against. */
const mostFor = 2.2
const mostAgainst = 4

/**
 * What it costs to hold two pages for one student's by how they were written: minus the logarithm of how much likelier the difference
 * is within a script than between two. One page in fifty is written with another pen or in another way.
 */
export function penCost(one: PenTrace | null | undefined, other: PenTrace | null | undefined): number {
  if (!one || !other) return 0
  const shades = Math.min(one.core, other.core) > oneBit
  const sum = (shades ? weigh(one.core, other.core, traits.core) : 0) + weigh(one.width, other.width, traits.width) + weigh(one.slant, other.slant, traits.slant) + weigh(one.height, other.height, traits.height)
  return Math.max(-mostFor, Math.min(mostAgainst, sum))
}

function weigh(one: number | null | undefined, other: number | null | undefined, { within, between, most }: Trait): number {
  if (typeof one !== 'number' || typeof other !== 'number') return 0
  const difference = Math.abs(one - other)
  const apart = Math.exp(-difference / between) / between
  const together = 0.98 * (Math.exp(-difference / within) / within) + 0.02 * apart
  return Math.max(-most, Math.log(apart / together))
}
