import type { LeafFinding, LeafReading, LeafReason } from '@/lib/core/leaf'
import { explainSequence, type Block, type Context } from './explain-sequence'
import { penCost } from './pen-cost'
import { costs } from './script-cost'
import { inkOf, sameness, type Sameness } from './same-ink'
import { settledBlocks } from './settled-blocks'

/**
 * An explanation must be this much likelier than any other before leaves are put together by it: about 240 to 1. Found by trying 4.4 to 7.5 on
 * thousands of piles with one to five faults each, put together from the pages and hands of scanned sets: 4.4 joined strangers in one of ten piles
 * in which a script without its last page lies before one in another order, 5.5 in less than one of forty, more gains nothing and leaves more loose.
 */
const certain = 5.5
/** Second scans of a sheet are looked for among so many leaves of the same page before it. */
const lookBack = 6
/** Print that says less than this for every page says that the leaf belongs to another paper. */
const unlikePaper = 0.25

type Leaf = LeafReading & Readonly<{ position: number; page: number | null }>
type Verdict = Readonly<{ kind: LeafFinding['kind']; script: number | null; reasons: readonly LeafReason[]; missing: readonly number[]; sure: number }>

/**
 * Sorts a sheaf's leaves into scripts: one decision over the whole sequence. What is not certain is loose, with the reasons.
 * @param readings every leaf of the sheaf, in scan order
 * @param pages how many pages the blank paper has
 */
export function placeLeaves(readings: readonly LeafReading[], pages: number): LeafFinding[] {
  const { leaves, sequence, verdicts, compare, context } = lineUp(readings, pages)
  let script = 0
  for (const block of explainSequence(sequence.map((leaf) => leaf.page), context))
    for (const part of block.parts) {
      const members = part.map((at) => sequence[at]!)
      const verdict = judge(block, members, sequence, pages, compare)
      if (verdict.kind === 'script') script++
      for (const leaf of members) verdicts.set(leaf.position, leaf.page === null ? plain('loose', whyUnclear(leaf)) : { ...verdict, script: verdict.kind === 'script' ? script : null })
    }
  return leaves.map((leaf) => finding(leaf, verdicts.get(leaf.position)!))
}

/** What the leaves of a sheaf show, so far as one decision over all of them needs it. */
type LineUp = Readonly<{ leaves: readonly Leaf[]; sequence: readonly Leaf[]; verdicts: Map<number, Verdict>; compare: (a: Leaf, b: Leaf) => Sameness; context: Context }>

function lineUp(readings: readonly LeafReading[], pages: number): LineUp {
  const leaves = readings.map((reading, position): Leaf => ({ ...reading, position, page: reading.clear ? reading.guesses[0]!.paperPage : null }))
  const inks = leaves.map((leaf) => inkOf(leaf.ink))
  const verdicts = new Map<number, Verdict>()
  const sequence: Leaf[] = []
  for (const leaf of leaves) {
    if (leaf.empty && !leaf.problem) verdicts.set(leaf.position, plain('blank', []))
    else if (isSecondScan(leaf, sequence, inks)) verdicts.set(leaf.position, plain('loose', ['duplicate_page']))
    else sequence.push(leaf)
  }
  const context: Context = {
    pages, twoUp: readings.some(({ half }) => half !== undefined),
    together: (a, b) => penCost(sequence[a]!.pen, sequence[b]!.pen),
    parting: (at) => (sequence[at]!.half === 1 && sequence[at - 1]!.index === sequence[at]!.index ? costs.partedSheet : 0),
  }
  return { leaves, sequence, verdicts, compare: (a, b) => sameness(inks[a.position]!, inks[b.position]!), context }
}

/** Beyond `certain`, for what was measured in steps. */
const slack = 0.5

/**
 * Whole scripts at the start of a sheaf that is still being read which placeLeaves will find just so, whatever the leaves to come show.
 * @param readings the first leaves of the sheaf without a gap, in scan order
 * @param from leaves before this one were found certain earlier and are not looked at again
 */
export function placeFirstLeaves(readings: readonly LeafReading[], pages: number, from = 0): LeafFinding[] {
  const { sequence, compare, context } = lineUp(readings, pages)
  const looked = sequence.findIndex(({ position }) => position >= from)
  const found: LeafFinding[] = []
  let script = 0
  for (const block of settledBlocks(sequence.map((leaf) => leaf.page), context, certain + slack, looked === -1 ? sequence.length : looked))
    for (const part of block.parts) {
      const members = part.map((at) => sequence[at]!)
      const verdict = judge(block, members, sequence, pages, compare)
      if (verdict.kind !== 'script') continue
      script++
      for (const leaf of members) if (leaf.page !== null) found.push(finding(leaf, { ...verdict, script }))
    }
  return found
}

function isSecondScan(leaf: Leaf, before: readonly Leaf[], inks: readonly (Float32Array | null)[]): boolean {
  if (leaf.page === null) return false
  const samePage = before.filter((other) => other.page === leaf.page).slice(-lookBack)
  return samePage.some((other) => inks[leaf.position] && sameness(inks[other.position]!, inks[leaf.position]!) === 'same')
}

/** Whether a block's leaves go into one script together. */
function judge(block: Block, members: readonly Leaf[], sequence: readonly Leaf[], pages: number, compare: (a: Leaf, b: Leaf) => Sameness): Verdict {
  const known = members.filter((leaf) => leaf.page !== null)
  const has = known.map((leaf) => leaf.page!)
  if (block.kind === 'braid' && block.margin >= certain) return { kind: 'script', script: null, reasons: ['interleaved'], missing: [], sure: 1 - Math.exp(-block.margin / 2) }
  if (block.kind !== 'script') return plain('loose', tangleReasons(block.leaves.flatMap((at) => sequence[at]!.page ?? [])))
  const missing = Array.from({ length: pages }, (_, k) => k + 1).filter((page) => !has.includes(page))
  const reasons: LeafReason[] = []
  if (missing.length) reasons.push('page_missing')
  if (block.disordered) reasons.push('pages_swapped')
  if (block.margin < certain) return { ...plain('loose', ['order_unclear', ...reasons]), missing }
  if (missing.length && doubtful(known, block, sequence, compare)) return { ...plain('loose', [twice(has[0]!), ...reasons]), missing }
  return { kind: 'script', script: null, reasons, missing, sure: 1 - Math.exp(-block.margin / 2) }
}

/** A part of a script beside another leaf of one of its pages, when their writing does not tell them apart: perhaps a second scan. */
function doubtful(known: readonly Leaf[], block: Block, sequence: readonly Leaf[], compare: (a: Leaf, b: Leaf) => Sameness): boolean {
  const near = sequence.slice(Math.max(0, block.leaves[0]! - 3), block.leaves.at(-1)! + 4).filter((leaf) => !known.includes(leaf))
  return known.some((leaf) => near.some((other) => other.page === leaf.page && compare(leaf, other) !== 'different'))
}

function tangleReasons(pages: readonly number[]): LeafReason[] {
  const again = pages.find((page, k) => pages.indexOf(page) < k)
  return again === undefined ? ['order_unclear'] : [twice(again), 'order_unclear']
}
function twice(page: number): LeafReason {
  return page === 1 ? 'two_page_ones' : 'two_of_a_page'
}
function whyUnclear(leaf: Leaf): LeafReason[] {
  if (leaf.problem) return ['unreadable']
  return [(leaf.guesses[0]?.confidence ?? 0) < unlikePaper ? 'unlike_paper' : 'not_clear']
}
function plain(kind: LeafFinding['kind'], reasons: readonly LeafReason[]): Verdict {
  return { kind, script: null, reasons, missing: [], sure: 1 }
}

function finding(leaf: Leaf, { kind, script, reasons, missing, sure }: Verdict): LeafFinding {
  const best = leaf.guesses[0]
  const place = kind === 'script' && best ? { paperPage: best.paperPage, rotation: best.rotation, homography: best.homography } : { paperPage: null, rotation: best?.rotation ?? leaf.image?.shownTurn ?? 0, homography: null }
  return {
    index: leaf.index, ...(leaf.half === undefined ? {} : { half: leaf.half }), kind, script, ...place,
    confidence: kind === 'blank' ? 1 : Math.min(best?.confidence ?? 0, sure), guesses: kind === 'blank' ? [] : leaf.guesses.slice(0, 3), reasons, missing,
    ...(leaf.problem ? { problem: leaf.problem } : {}),
  }
}
