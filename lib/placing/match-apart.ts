import { leastCostMatching } from './least-cost-matching'

/** What a row may have and at which cost; `none` is the cost of having nothing. */
export type Wish = Readonly<{ options: ReadonlyMap<number, number>; none: number }>
/** The option a row gets (null: nothing), and by how much the whole would cost more otherwise, at most `furthest`. */
export type Granted = Readonly<{ option: number | null; margin: number }>

/** Options that cost a row so much more than its best one are not looked at: less likely by e to this power, 1 to 160,000. */
const furthest = 12

/**
 * Gives every row one of its options, each option at most once, so that the costs add up to the least. Rows that want nothing of
 * one another's are settled apart, so that hundreds of them cost little.
 */
export function matchApart(wishes: readonly Wish[]): Granted[] {
  const near = wishes.map(({ options, none }) => {
    const best = Math.min(none, ...options.values())
    return new Map([...options].filter(([, cost]) => cost <= best + furthest))
  })
  const granted = new Array<Granted>(wishes.length)
  for (const rows of groups(near)) {
    const columns = [...new Set(rows.flatMap((row) => [...near[row]!.keys()]))]
    const costs = rows.map((row, at) => [
      ...columns.map((column) => near[row]!.get(column) ?? far),
      ...rows.map((_, other) => (other === at ? wishes[row]!.none : far)),
    ])
    const matching = leastCostMatching(costs)
    rows.forEach((row, at) => { granted[row] = { option: columns[matching.columns[at]!] ?? null, margin: Math.min(furthest, matching.margins[at]!) } })
  }
  return granted
}

/** More than all costs together, so that it is never chosen. */
const far = 1e6

/** Rows that hang together by options they share. */
function groups(options: readonly ReadonlyMap<number, number>[]): number[][] {
  const holders = new Map<number, number[]>()
  options.forEach((own, row) => { for (const option of own.keys()) holders.set(option, [...(holders.get(option) ?? []), row]) })
  const seen = new Set<number>()
  return options.flatMap((_, start) => {
    if (seen.has(start)) return []
    seen.add(start)
    const group = [start]
    for (const row of group)
      for (const option of options[row]!.keys())
        for (const other of holders.get(option)!) {
          if (seen.has(other)) continue
          seen.add(other)
          group.push(other)
        }
    return [group]
  })
}
