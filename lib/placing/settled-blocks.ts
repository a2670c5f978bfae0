import { explainSequence, longestRun, searchOrders, type Block, type Context, type Option, type Search } from './explain-sequence'
import { possibleOrderCosts, type Seen } from './script-cost'

/** How much likelier one order of the pages must be than any other (about 3,000 to 1): a sheaf lies backwards once in 50. */
const plain = 8

/**
 * The blocks at the start of a sequence that is still growing which no leaf to come can take apart: up to the first that one could.
 * Whatever follows, an explanation passes from the leaves known now to those to come by one option, which reaches back at most
 * `longestRun` leaves. So a block before that reach stays when, at each place where that option may begin, every parting of the known leaves that breaks
 * the block is dearer by `margin`, whatever pages in another order turn out to cost in this sheaf. That the leaves known lie in one order, all
 * forwards or all backwards, must be plainer still; a sheaf that goes on the other way round does not turn what lies before it.
 * @param from leaves before this one were found settled earlier and are not looked at again
 */
export function settledBlocks(sequence: readonly Seen[], context: Context, margin: number, from = 0): Block[] {
  const reach = sequence.length - longestRun(context.pages)
  if (reach <= 0) return []
  const searches = possibleOrderCosts.flatMap((otherOrder) => plainOrder(searchOrders(sequence, context, otherOrder), reach, context.pages) ?? [])
  if (searches.length < possibleOrderCosts.length) return []
  const settled: Block[] = []
  for (const block of explainSequence(sequence, context)) {
    if (block.leaves.at(-1)! >= reach) break
    const least = block.kind === 'stray' || block.leaves.at(-1)! < from ? Infinity : Math.min(...searches.map((search) => leastMargin(search, block, reach)))
    if (least < margin) break
    settled.push({ ...block, margin: Math.min(block.margin, least) })
  }
  return settled
}

/** The order that explains the leaves known plainly cheaper than any other, the start of a script that is not whole yet left out; null when none does. */
function plainOrder(searches: readonly Search[], reach: number, pages: number): Search | null {
  if (pages === 1) return searches[0]!
  const [best, next] = searches.map((search) => ({ search, soFar: Math.min(...search.forth.subarray(reach)) })).sort((a, b) => a.soFar - b.soFar)
  return next && next.soFar - best!.soFar < plain ? null : best!.search
}

/** By how much the cheapest parting that breaks the block is dearer than the cheapest that keeps it, at the worst place to go on from. */
function leastMargin({ forth, into }: Search, block: Block, reach: number): number {
  const [from, to] = [block.leaves[0]!, block.leaves.at(-1)! + 1]
  const breaks = (option: Option): boolean => option.from < to && option.to > from && option.key !== block.key && option.key !== ''
  const kept = forth.map((cost, at) => (at <= from ? cost : Infinity))
  const broken = new Float64Array(forth.length).fill(Infinity)
  for (let at = from + 1; at < forth.length; at++) {
    for (const option of into[at]!) {
      if (breaks(option)) broken[at] = Math.min(broken[at]!, forth[option.from]! + option.cost)
      else {
        kept[at] = Math.min(kept[at]!, kept[option.from]! + option.cost)
        broken[at] = Math.min(broken[at]!, broken[option.from]! + option.cost)
      }
    }
  }
  let least = Infinity
  for (let at = reach; at < forth.length; at++) if (broken[at]! < Infinity) least = Math.min(least, broken[at]! - kept[at]!)
  return least
}
