/** A place in the pile: whose script it surely is (by place in the list), or null. */
export type Anchor = number | null

/** With fewer neighbours than this to learn from, order is trusted as little as this. */
const doubt = 4

/**
 * How far a pile lies in the order of its list, 0 to 1, learnt from neighbours whose names are sure: each pair that rises speaks for it,
 * each that falls against. A shuffled pile comes out near 0.
 */
export function orderTrust(anchors: readonly Anchor[]): number {
  const sure = anchors.filter((anchor) => anchor !== null)
  const rises = sure.slice(1).filter((at, k) => at > sure[k]!).length
  const pairs = Math.max(0, sure.length - 1)
  return Math.max(0, Math.min(0.98, (2 * rises - pairs + 1) / (pairs + doubt)))
}

/**
 * How likely each place of the list is for an unnamed script by the order of the pile alone, for every script without an anchor.
 * Between two sure neighbours the ones missing may be any: the k-th of g scripts is the t-th of f free students as if g of f were drawn.
 * @param free whether each place of the list is still without a script
 */
export function orderShares(anchors: readonly Anchor[], free: readonly boolean[], trust: number): (readonly number[] | null)[] {
  const all = free.filter(Boolean).length
  const logs = logFactorials(Math.max(anchors.length, free.length) + 1)
  const choose = (n: number, k: number) => (k < 0 || k > n ? -Infinity : logs[n]! - logs[k]! - logs[n - k]!)
  return anchors.map((anchor, at) => {
    if (anchor !== null) return null
    const from = anchors.findLastIndex((one, k) => k < at && one !== null)
    const to = anchors.findIndex((one, k) => k > at && one !== null)
    const end = to < 0 ? anchors.length : to
    const [low, high] = [from < 0 ? -1 : anchors[from]!, to < 0 ? free.length : anchors[to]!]
    const between = free.map((is, place) => is && place > low && place < high)
    const room = between.filter(Boolean).length
    const [scripts, mine] = [end - from - 1, at - from - 1]
    const even = 1 / Math.max(1, all)
    let seen = 0
    return free.map((is, place) => {
      if (!is) return 0
      if (room < scripts || low >= high) return even
      const t = between[place] ? seen++ : -1
      const inOrder = t < 0 ? 0 : Math.exp(choose(t, mine) + choose(room - 1 - t, scripts - 1 - mine) - choose(room, scripts))
      return trust * inOrder + (1 - trust) * even
    })
  })
}

function logFactorials(count: number): number[] {
  const logs = [0]
  for (let n = 1; n <= count; n++) logs.push(logs[n - 1]! + Math.log(n))
  return logs
}
