import { costs, otherOrderCost, scriptCost, tangleCost, type Seen } from './script-cost'

/** Neighbouring leaves (positions of the sequence) taken together. `margin` is by how much every explanation that parts or joins them otherwise is dearer. */
export type Block = Readonly<{ kind: 'script' | 'tangle' | 'stray'; leaves: readonly number[]; disordered: boolean; margin: number }>

export type Option = Readonly<{ kind: Block['kind']; from: number; to: number; cost: number; key: string }>
/** The search in one direction: `forth` and `back` hold the cheapest cost up to and from each position, `into` the options that end there. */
export type Direction = Readonly<{ forth: Float64Array; back: Float64Array; total: number; options: readonly Option[]; into: readonly (readonly Option[])[] }>

/** What it costs to hold two leaves (positions) for one student's, by how they were written; below 0 where it speaks for it. */
export type Together = (one: number, other: number) => number

/** A whole sheaf scanned from its last page to its first is one fault, not one for every script. */
const backwardsCost = 4
const unlikely = 40

/**
 * The likeliest way in which a sequence of leaves falls into scripts of `pages` pages, each block with how sure it is.
 * An exact search over all partings into runs of neighbours (forward-backward over positions), read forwards and backwards.
 * Done twice: how often scripts of this sheaf lie in another order is learnt from the first explanation.
 */
export function explainSequence(sequence: readonly Seen[], pages: number, together: Together = () => 0): Block[] {
  const first = explain(sequence, pages, costs.otherOrder, together)
  const whole = first.filter((block) => block.kind === 'script' && block.leaves.length >= pages)
  const swapped = whole.filter((block) => block.disordered)
  return explain(sequence, pages, otherOrderCost(swapped.length, whole.length), together)
}

/** The search forwards, and as if the whole sheaf were scanned backwards. */
export function searchBothWays(sequence: readonly Seen[], pages: number, otherOrder: number, together: Together): readonly [Direction, Direction] {
  const turned = sequence.map((page) => (page === null ? null : pages + 1 - page))
  return [search(sequence, pages, 0, otherOrder, together), search(turned, pages, backwardsCost, otherOrder, together)]
}

/** The most neighbouring leaves that one option holds. */
export const longestRun = (pages: number): number => 2 * pages + 2

function explain(sequence: readonly Seen[], pages: number, otherOrder: number, together: Together): Block[] {
  const [forwards, backwards] = searchBothWays(sequence, pages, otherOrder, together)
  const best = forwards.total <= backwards.total ? forwards : backwards
  return path(best).map((option) => ({
    kind: option.kind,
    leaves: range(option),
    disordered: isDisordered(range(option).map((at) => sequence[at]!), best === backwards),
    margin: Math.min(...[forwards, backwards].map((direction) => dearest(direction, option))) - best.total,
  }))
}

function search(sequence: readonly Seen[], pages: number, start: number, otherOrder: number, together: Together): Direction {
  const n = sequence.length
  const options: Option[] = []
  for (let from = 0; from < n; from++) for (let to = from + 1; to <= Math.min(n, from + longestRun(pages)); to++) options.push(...optionsFor(sequence, from, to, pages, otherOrder, together))
  const out = Array.from({ length: n + 1 }, (): Option[] => [])
  const into = Array.from({ length: n + 1 }, (): Option[] => [])
  for (const option of options) {
    out[option.from]!.push(option)
    into[option.to]!.push(option)
  }
  const forth = new Float64Array(n + 1).fill(Infinity)
  forth[0] = start
  for (let at = 1; at <= n; at++) for (const { from, cost } of into[at]!) forth[at] = Math.min(forth[at]!, forth[from]! + cost)
  const back = new Float64Array(n + 1).fill(Infinity)
  back[n] = 0
  for (let at = n - 1; at >= 0; at--) for (const { to, cost } of out[at]!) back[at] = Math.min(back[at]!, back[to]! + cost)
  return { forth, back, total: forth[n]!, options, into }
}

function optionsFor(sequence: readonly Seen[], from: number, to: number, pages: number, otherOrder: number, together: Together): Option[] {
  const run = sequence.slice(from, to)
  const known = run.flatMap((page, k) => (page === null ? [] : [from + k]))
  const key = known.join()
  const found: Option[] = []
  if (run.length === 1 && run[0] === null) found.push({ kind: 'stray', from, to, cost: costs.stray, key })
  const script = scriptCost(run, pages, otherOrder)
  if (script !== null && script < unlikely) {
    const pens = known.slice(1).reduce((sum, at, k) => sum + together(known[k]!, at), 0)
    found.push({ kind: 'script', from, to, cost: script + pens, key })
  }
  const tangle = tangleCost(run, pages)
  if (tangle !== null) found.push({ kind: 'tangle', from, to, cost: tangle, key: `tangle ${key}` })
  return found
}

function path({ forth, into }: Direction): Option[] {
  const found: Option[] = []
  for (let at = forth.length - 1; at > 0; ) {
    const last = into[at]!.find(({ from, cost }) => Math.abs(forth[from]! + cost - forth[at]!) < 1e-9)!
    found.unshift(last)
    at = last.from
  }
  return found
}

/** The cheapest explanation of the whole in which some leaf of a block lies in another company. */
function dearest({ forth, back, options }: Direction, block: Option): number {
  let least = Infinity
  for (const other of options)
    if (other.from < block.to && other.to > block.from && other.key !== block.key && other.key !== '') least = Math.min(least, forth[other.from]! + other.cost + back[other.to]!)
  return least
}

/** Whether the pages that are known do not follow each other as they should. */
function isDisordered(run: readonly Seen[], backwards: boolean): boolean {
  const known = run.filter((page) => page !== null)
  return known.some((page, k) => k > 0 && (backwards ? page > known[k - 1]! : page < known[k - 1]!))
}

function range({ from, to }: Option): number[] {
  return Array.from({ length: to - from }, (_, k) => from + k)
}
