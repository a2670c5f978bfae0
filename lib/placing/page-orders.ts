/** An order in which the pages of a script may lie, and what it costs to hold that a whole sheaf lies so. */
export type PageOrder = Readonly<{ pages: readonly number[]; cost: number }>

/** A whole sheaf scanned from its last page to its first is one fault, not one for every script. */
const backwardsCost = 4
const foldedCost = 0.5

/**
 * The orders in which the scripts of a sheaf may lie: as the pages are numbered, or from the back. Where images show two pages side
 * by side, also as in folded booklets, whose sheets show the last page beside the first: 4 1, 2 3, and so on inwards.
 */
export function pageOrders(pages: number, twoUp: boolean): PageOrder[] {
  const numbered = Array.from({ length: pages }, (_, k) => k + 1)
  const orders = [{ pages: numbered, cost: 0 }, { pages: numbered.toReversed(), cost: backwardsCost }]
  if (!twoUp || pages < 2) return orders
  const pairs = chunked(numbered)
  orders.push({ pages: pairs.toReversed().flat(), cost: backwardsCost })
  const booklet = pages + (pages % 4 ? 4 - (pages % 4) : 0)
  const sides = Array.from({ length: booklet / 2 }, (_, k) => (k % 2 === 0 ? [booklet - k, k + 1] : [k + 1, booklet - k]))
  const real = (order: number[][]) => order.flat().filter((page) => page <= pages)
  if (pages > 2) orders.push({ pages: real(sides), cost: foldedCost }, { pages: real(sides.toReversed()), cost: backwardsCost })
  return orders
}

function chunked(pages: readonly number[]): number[][] {
  return pages.flatMap((page, k) => (k % 2 === 0 ? [pages.slice(k, k + 2)] : []))
}
