import { costs, otherOrderCost, scriptCost, tangleCost, type Seen } from './script-cost'

/** Neighbouring leaves (positions of the sequence) taken together. `margin` is by how much every explanation that parts or joins them otherwise is dearer. */
export type Block = Readonly<{ kind: 'script' | 'tangle' | 'stray'; leaves: readonly number[]; cost: number; margin: number }>

type Option = Readonly<{ kind: Block['kind']; from: number; to: number; cost: number; key: string }>
type Direction = Readonly<{ forth: Float64Array; back: Float64Array; total: number; options: readonly Option[]; into: readonly (readonly Option[])[] }>

/** A whole sheaf scanned from its last page to its first is one fault, not one for every script. */
const backwardsCost = 4
const unlikely = 40

/**
 * The likeliest way in which a sequence of leaves falls into scripts of `pages` pages, each block with how sure it is.
 * An exact search over all partings into runs of neighbours (forward-backward over positions), read forwards and backwards.
 * Done twice: how often scripts of this sheaf lie in another order is learnt from the first explanation.
 */
export function explainSequence(sequence: readonly Seen[], pages: number): Block[] {
  const first = explain(sequence, pages, costs.otherOrder)
  const whole = first.filter((block) => block.kind === 'script' && block.leaves.length >= pages)
  const swapped = whole.filter((block) => block.cost >= costs.otherOrder)
  return explain(sequence, pages, otherOrderCost(swapped.length, whole.length))
}

function explain(sequence: readonly Seen[], pages: number, otherOrder: number): Block[] {
  const forwards = search(sequence, pages, 0, otherOrder)
  const backwards = search(sequence.map((page) => (page === null ? null : pages + 1 - page)), pages, backwardsCost, otherOrder)
  const best = forwards.total <= backwards.total ? forwards : backwards
  return path(best).map((option) => ({
    kind: option.kind,
    leaves: range(option),
    cost: option.cost,
    margin: Math.min(...[forwards, backwards].map((direction) => dearest(direction, option))) - best.total,
  }))
}

function search(sequence: readonly Seen[], pages: number, start: number, otherOrder: number): Direction {
  const n = sequence.length
  const options: Option[] = []
  for (let from = 0; from < n; from++) for (let to = from + 1; to <= Math.min(n, from + 2 * pages + 2); to++) options.push(...optionsFor(sequence, from, to, pages, otherOrder))
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

function optionsFor(sequence: readonly Seen[], from: number, to: number, pages: number, otherOrder: number): Option[] {
  const run = sequence.slice(from, to)
  const key = run.flatMap((page, k) => (page === null ? [] : [from + k])).join()
  const found: Option[] = []
  if (run.length === 1 && run[0] === null) found.push({ kind: 'stray', from, to, cost: costs.stray, key })
  const script = scriptCost(run, pages, otherOrder)
  if (script !== null && script < unlikely) found.push({ kind: 'script', from, to, cost: script, key })
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

function range({ from, to }: Option): number[] {
  return Array.from({ length: to - from }, (_, k) => from + k)
}
