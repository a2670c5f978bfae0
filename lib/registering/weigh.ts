import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Homography } from '@/lib/core/paper-space'
import { printFound, shareFound } from './confirm'
import { tellApart } from './tell-apart'
import type { Template } from './template'

/** A page that a leaf may be, exactly fitted: how well each of its patches of print was found, and the share that was. */
export type Rival = Readonly<{ template: Template; map: Homography; found: Float32Array; share: number }>

const unchanged: Homography = [[1, 0, 0], [0, 1, 0], [0, 0, 1]]
/** Fewer patches than this in which two pages differ say too little: then every printed pixel in which they do is looked at. */
const fewestTelling = 16

/**
 * How sure each rival is, best first: its print must be there, and it must explain the leaf better than any other page or turn.
 * Pages that look alike are judged by the print in which they differ alone. `leaf` is the levelled leaf at 100 dpi.
 */
export function confidences(rivals: readonly Rival[], leaf: GreyPicture): (Rival & { confidence: number })[] {
  const judged = rivals.map((rival) => {
    const lead = Math.min(1, ...rivals.filter((other) => different(rival, other)).map((other) => leadOver(rival, other, leaf)))
    return { ...rival, confidence: Math.min(part(rival.share, 0.1, 0.6), part(lead, 0, 0.4)) }
  })
  judged.sort((a, b) => b.confidence - a.confidence || b.share - a.share)
  return judged.filter((one, k) => judged.findIndex((other) => !different(one, other)) === k)
}

/** Two fits of one page the same way up are no rivals. */
function different(a: Rival, b: Rival): boolean {
  if (a === b) return false
  return a.template !== b.template || a.map[0][0] * b.map[0][0] + a.map[1][0] * b.map[1][0] < 0
}

/** By how much more of its own print a rival finds than another, from -1 to 1. */
function leadOver(one: Rival, other: Rival, leaf: GreyPicture): number {
  if (other.share < 0.5 * one.share || one.template === other.template) return one.share - other.share
  const mine = telling(one.template, other.template)
  const theirs = telling(other.template, one.template)
  if (mine.length + theirs.length < fewestTelling) return tellApart(leaf, one.template.white, other.template.white, one.map, other.map) ?? 0
  const has = mine.length >= 3 ? shareFound(one.found, mine) : 1
  const lacks = theirs.length >= 3 ? shareFound(other.found, theirs) : 0
  return has - lacks
}

/** Which patches of a page are not at the same place on another. */
function telling(template: Template, other: Template): number[] {
  const there = printFound(other.white, template, unchanged)
  return Array.from(there.keys()).filter((k) => there[k]! < 0.3)
}
function part(value: number, from: number, to: number): number {
  return Math.min(1, Math.max(0, (value - from) / (to - from)))
}
