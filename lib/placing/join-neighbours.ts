import type { LeafReading } from '@/lib/core/leaf'
import type { Pinned } from './place-pile'

/** A pile is in order when so many of its coded neighbours follow each other as their scripts do. */
const inOrder = 0.8

/**
 * Leaves whose code could not be read although their print says clearly which page they are, given to the script that lies round them: in a pile
 * that is otherwise in order, the one script beside the leaf that lacks just its page. Where both neighbours claim it, or the pile is
 * shuffled, it is nobody's.
 */
export function joinNeighbours(readings: readonly LeafReading[], pinned: readonly Pinned[], pages: number): Pinned[] {
  const at = new Map(pinned.map((leaf) => [leaf.position, leaf]))
  if (shareInOrder(pinned, pages) < inOrder) return []
  const has = new Set(pinned.map(({ script, page }) => `${script} ${page}`))
  const joined: Pinned[] = []
  readings.forEach((reading, position) => {
    if (at.has(position) || reading.code || reading.empty || !reading.clear) return
    const page = reading.guesses[0]!.paperPage
    const before = nextCoded(at, readings, position, -1)
    const after = nextCoded(at, readings, position, 1)
    const claims = new Set([before?.page === page - 1 ? before.script : null, after?.page === page + 1 ? after.script : null].filter((script) => script !== null && !has.has(`${script} ${page}`)))
    const [script] = claims
    if (!script || claims.size > 1) return
    has.add(`${script} ${page}`)
    joined.push({ reading, position, script, page })
  })
  return joined
}

/** The coded leaf next to a position, empty backs between them passed over. */
function nextCoded(at: ReadonlyMap<number, Pinned>, readings: readonly LeafReading[], from: number, step: 1 | -1): Pinned | undefined {
  let position = from + step
  while (readings[position]?.empty && !readings[position]!.problem) position += step
  return at.get(position)
}

/** How many neighbouring coded leaves lie as a script does: the next page of the same one, or a last page and another's first. */
function shareInOrder(pinned: readonly Pinned[], pages: number): number {
  const sorted = [...pinned].sort((a, b) => a.position - b.position)
  let [good, all] = [0, 0]
  sorted.forEach((leaf, k) => {
    const next = sorted[k + 1]
    if (!next || next.position !== leaf.position + 1) return
    all++
    if (leaf.script === next.script ? next.page === leaf.page + 1 : leaf.page === pages && next.page === 1) good++
  })
  return all < 4 ? 0 : good / all
}
