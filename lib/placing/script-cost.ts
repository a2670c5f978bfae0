/**
 * What it costs to explain neighbouring leaves as one script, or as a tangle that only a person can part. Roughly minus the
 * logarithm of how often a fault happens at the copier: a missing page about once in 400 scripts, pages in another order once in 50; that
 * none lies so among the first twenty or so speaks only a little against the next.
 */
export const costs = { missing: 6, eachMore: 0.5, otherOrder: 4, neverSwapped: 4.2, eachBreak: 2, far: 2, stray: 3, unread: 2, interleaved: 7, tangled: 10, eachTangled: 1, changedPlaces: 1.5, partedSheet: 6 } as const

/** What pages in another order cost in a sheaf where `swapped` of `whole` complete scripts lie so: rarer the longer none has shown up. */
export function otherOrderCost(swapped: number, whole: number): number {
  if (swapped > 0) return Math.max(2.5, Math.min(costs.otherOrder, Math.log(whole / swapped)))
  return whole >= 8 ? costs.neverSwapped : costs.otherOrder
}

/** What otherOrderCost may come to, from end to end in small steps. */
export const possibleOrderCosts: readonly number[] = [2.5, 3, 3.5, costs.otherOrder, costs.neverSwapped]

/** A leaf of the sequence: the page it certainly is, or null for one that could not be told. */
export type Seen = number | null

/** Cost of reading a run of leaves as one script of `pages` pages; null when it cannot be one. */
export function scriptCost(run: readonly Seen[], pages: number, otherOrder: number = costs.otherOrder): number | null {
  const known = run.filter((page) => page !== null)
  if (known.length === 0 || new Set(known).size < known.length) return null
  const unknown = run.length - known.length
  const used = Math.min(unknown, pages - known.length)
  if (edgeUnknowns(run) > used) return null
  const missing = pages - known.length - used
  const lack = missing > 0 ? costs.missing + costs.eachMore * (missing - 1) : 0
  const order = orderCost(known, pages, missing + used, otherOrder)
  return lack + (order === 0 && used > 0 && misplaced(run, pages) ? otherOrder : order) + costs.unread * used + costs.stray * (unknown - used)
}

function edgeUnknowns(run: readonly Seen[]): number {
  const first = run.findIndex((page) => page !== null)
  const last = run.findLastIndex((page) => page !== null)
  return first + (run.length - 1 - last)
}

/** Whether more unread leaves lie before the first known page, or after the last, than pages can stand there. */
function misplaced(run: readonly Seen[], pages: number): boolean {
  const first = run.findIndex((page) => page !== null)
  const last = run.findLastIndex((page) => page !== null)
  return first > run[first]! - 1 || run.length - 1 - last > pages - run[last]!
}

/** Nothing for pages that ascend; one fault for two swapped pages or sheets, or a script laid backwards; more for worse. */
function orderCost(known: readonly number[], pages: number, absent: number, otherOrder: number): number {
  if (known.every((page, k) => k === 0 || page > known[k - 1]!)) return 0
  if (known.every((page, k) => k === 0 || page < known[k - 1]!)) return otherOrder
  const ranks = [...known].sort((a, b) => a - b)
  const order = absent ? known.map((page) => ranks.indexOf(page) + 1) : known
  const framed = [0, ...order, (absent ? known.length : pages) + 1]
  const breaks = framed.slice(1).filter((rank, k) => rank !== framed[k]! + 1).length
  // Two neighbouring sheets change places, or a sheet is turned: no page goes further than that.
  const far = order.some((rank, k) => Math.abs(rank - k - 1) > 2) ? costs.far : 0
  return otherOrder + far + costs.eachBreak * Math.max(0, breaks - 3)
}

/** Cost of leaving a run to a person, by its length. */
export function tangleCost(run: readonly Seen[]): number | null {
  if (run.length < 2 || run[0] === null || run.at(-1) === null) return null
  return costs.tangled + costs.eachTangled * run.length
}
