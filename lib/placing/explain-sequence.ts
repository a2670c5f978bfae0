import { braidsOf } from './braids'
import { pageOrders, type PageOrder } from './page-orders'
import { costs, otherOrderCost, scriptCost, tangleCost, type Seen } from './script-cost'

/** Neighbouring leaves (positions of the sequence) taken together. `margin` is by how much every explanation that parts or joins them otherwise is dearer. */
export type Block = Readonly<{
  kind: 'script' | 'braid' | 'tangle' | 'stray'
  leaves: readonly number[]
  /** The leaves of each script: two for a braid, whose scripts lie between each other. */
  parts: readonly (readonly number[])[]
  disordered: boolean
  margin: number
  key: string
}>

export type Option = Readonly<{ kind: Block['kind']; from: number; to: number; cost: number; key: string; parts?: Block['parts'] }>
/** The search for one order of the pages: `ranks` are the pages' places in it, `forth` and `back` hold the cheapest cost up to and from each position, `into` the options that end there. */
export type Search = Readonly<{ ranks: readonly Seen[]; forth: Float64Array; back: Float64Array; total: number; options: readonly Option[]; into: readonly (readonly Option[])[] }>

/** What it costs to hold two leaves (positions) for one student's, by how they were written; below 0 where it speaks for it. */
export type Together = (one: number, other: number) => number

/** What it costs to end one script and begin another right before a leaf (position); above 0 where two leaves are one sheet. */
export type Parting = (at: number) => number

/** What a sequence is read with besides its pages: how many a script has, whether images show two of them side by side, and what leaves tell about each other. */
export type Context = Readonly<{ pages: number; twoUp?: boolean; together?: Together; parting?: Parting }>

const unlikely = 40

/**
 * The likeliest way in which a sequence of leaves falls into scripts, each block with how sure it is.
 * An exact search over all partings into runs of neighbours (forward-backward over positions), for each order in which the pages may lie.
 * Done twice: how often scripts of this sheaf lie in another order is learnt from the first explanation.
 */
export function explainSequence(sequence: readonly Seen[], context: Context): Block[] {
  const first = explain(sequence, context, costs.otherOrder)
  const whole = first.filter((block) => block.kind === 'script' && block.leaves.length >= context.pages)
  const swapped = whole.filter((block) => block.disordered)
  return explain(sequence, context, otherOrderCost(swapped.length, whole.length))
}

/** The search for every order in which the pages of a whole sheaf may lie. */
export function searchOrders(sequence: readonly Seen[], context: Context, otherOrder: number): Search[] {
  return pageOrders(context.pages, context.twoUp ?? false).map((order) => search(sequence, order, context, otherOrder))
}

/** The most neighbouring leaves that one option holds. */
export const longestRun = (pages: number): number => 2 * pages + 2

function explain(sequence: readonly Seen[], context: Context, otherOrder: number): Block[] {
  const searches = searchOrders(sequence, context, otherOrder)
  const best = searches.reduce((a, b) => (b.total < a.total ? b : a))
  return path(best).map((option) => ({
    kind: option.kind,
    leaves: range(option),
    parts: option.parts ?? [range(option)],
    key: option.key,
    disordered: option.kind === 'script' && isDisordered(range(option).map((at) => best.ranks[at]!)),
    margin: Math.min(...searches.map((one) => dearest(one, option))) - best.total,
  }))
}

function search(sequence: readonly Seen[], order: PageOrder, { pages, together = () => 0, parting = () => 0 }: Context, otherOrder: number): Search {
  const ranks = sequence.map((page) => (page === null ? null : order.pages.indexOf(page) + 1))
  const n = sequence.length
  const options: Option[] = []
  for (let from = 0; from < n; from++) for (let to = from + 1; to <= Math.min(n, from + longestRun(pages)); to++) options.push(...optionsFor(ranks, from, to, pages, otherOrder, together, from > 0 ? parting(from) : 0))
  const out = Array.from({ length: n + 1 }, (): Option[] => [])
  const into = Array.from({ length: n + 1 }, (): Option[] => [])
  for (const option of options) {
    out[option.from]!.push(option)
    into[option.to]!.push(option)
  }
  const forth = new Float64Array(n + 1).fill(Infinity)
  forth[0] = order.cost
  for (let at = 1; at <= n; at++) for (const { from, cost } of into[at]!) forth[at] = Math.min(forth[at]!, forth[from]! + cost)
  const back = new Float64Array(n + 1).fill(Infinity)
  back[n] = 0
  for (let at = n - 1; at >= 0; at--) for (const { to, cost } of out[at]!) back[at] = Math.min(back[at]!, back[to]! + cost)
  return { ranks, forth, back, total: forth[n]!, options, into }
}

function optionsFor(sequence: readonly Seen[], from: number, to: number, pages: number, otherOrder: number, together: Together, parted: number): Option[] {
  const run = sequence.slice(from, to)
  const known = run.flatMap((page, k) => (page === null ? [] : [from + k]))
  const key = known.join()
  const found: Option[] = []
  if (run.length === 1 && run[0] === null) found.push({ kind: 'stray', from, to, cost: costs.stray + parted, key })
  const script = scriptCost(run, pages, otherOrder)
  if (script !== null && script < unlikely) {
    const pens = known.slice(1).reduce((sum, at, k) => sum + together(known[k]!, at), 0)
    found.push({ kind: 'script', from, to, cost: script + pens + parted, key })
  }
  for (const { parts, changes } of braidsOf(run, pages)) {
    const own = parts.map((part) => part.map((at) => from + at))
    const cost = costs.interleaved + costs.changedPlaces * changes + own.reduce((sum, part) => sum + likeness(part, together), 0)
    found.push({ kind: 'braid', from, to, cost: cost + parted, key: own.map((part) => part.join()).join('/'), parts: own })
  }
  const tangle = tangleCost(run)
  if (tangle !== null) found.push({ kind: 'tangle', from, to, cost: tangle + parted, key: `tangle ${key}` })
  return found
}

/** What it costs to hold leaves for one student's, each against each other, weighed as if each were held against the next alone. */
function likeness(leaves: readonly number[], together: Together): number {
  const pairs = leaves.flatMap((one, k) => leaves.slice(k + 1).map((other) => together(one, other)))
  return (pairs.reduce((sum, cost) => sum + cost, 0) * (leaves.length - 1)) / pairs.length
}

function path({ forth, into }: Search): Option[] {
  const found: Option[] = []
  for (let at = forth.length - 1; at > 0; ) {
    const last = into[at]!.find(({ from, cost }) => Math.abs(forth[from]! + cost - forth[at]!) < 1e-9)!
    found.unshift(last)
    at = last.from
  }
  return found
}

/** The cheapest explanation of the whole in which some leaf of a block lies in another company. */
function dearest({ forth, back, options }: Search, block: Option): number {
  let least = Infinity
  for (const other of options)
    if (other.from < block.to && other.to > block.from && other.key !== block.key && other.key !== '') least = Math.min(least, forth[other.from]! + other.cost + back[other.to]!)
  return least
}

/** Whether the pages that are known do not follow each other as they should. */
function isDisordered(run: readonly Seen[]): boolean {
  const known = run.filter((rank) => rank !== null)
  return known.some((rank, k) => k > 0 && rank < known[k - 1]!)
}

function range({ from, to }: Option): number[] {
  return Array.from({ length: to - from }, (_, k) => from + k)
}
