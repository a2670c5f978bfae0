import type { LeafFinding, LeafReading, LeafReason } from '@/lib/core/leaf'
import { joinNeighbours } from './join-neighbours'
import { placeFirstLeaves, placeLeaves } from './place-leaves'

/** A leaf whose code and print agree: which printed script it belongs to, and its page. */
export type Pinned = Readonly<{ reading: LeafReading; position: number; script: string; page: number }>

/**
 * Sorts a sheaf's leaves into scripts, those with printed codes first: a proven code says script and page whatever the order, and the
 * rest is explained around it. The second leaf with one place is loose; so is a leaf whose print is not that of its code.
 * @param readings every leaf of the sheaf, in scan order
 * @param pages how many pages the blank paper has
 */
export function placePile(readings: readonly LeafReading[], pages: number): LeafFinding[] {
  const { pinned, second } = pinnedIn(readings)
  if (pinned.length === 0 && second.length === 0 && readings.every(({ code }) => !code)) return placeLeaves(readings, pages)
  const joined = joinNeighbours(readings, pinned, pages)
  const found = new Map<number, LeafFinding>()
  const scripts = new Map<string, Pinned[]>()
  for (const leaf of [...pinned, ...joined].sort((a, b) => a.position - b.position)) scripts.set(leaf.script, [...(scripts.get(leaf.script) ?? []), leaf])
  let number = 0
  for (const [printed, leaves] of scripts) {
    number++
    const missing = Array.from({ length: pages }, (_, k) => k + 1).filter((page) => !leaves.some((leaf) => leaf.page === page))
    for (const leaf of leaves) found.set(leaf.position, inScript(leaf, number, printed, missing))
  }
  for (const { reading, position } of second) found.set(position, loose(reading, ['duplicate_page']))
  for (const run of runsBetween(readings, found)) {
    const placed = placeLeaves(run.map((position) => readings[position]!), pages)
    placed.forEach((finding, k) => {
      const reading = readings[run[k]!]!
      found.set(run[k]!, beside(finding, reading, pinned.length > 0, number))
    })
    number = Math.max(number, ...run.map((position) => found.get(position)!.script ?? 0))
  }
  return readings.map((_, position) => found.get(position)!)
}

/**
 * Scripts of a sheaf that is still being read which placePile will find just so, whatever the leaves to come show: where there are codes, those
 * of which every page was met.
 * @param from as placeFirstLeaves takes it, for a sheaf without codes
 */
export function placeFirstPile(readings: readonly LeafReading[], pages: number, from = 0): LeafFinding[] {
  if (readings.every(({ code }) => !code)) return placeFirstLeaves(readings, pages, from)
  const { pinned } = pinnedIn(readings)
  const keys = [...new Set(pinned.map(({ script }) => script))]
  const whole = keys.filter((key) => pinned.filter(({ script }) => script === key).length === pages)
  return pinned.flatMap((leaf) => (whole.includes(leaf.script) ? [inScript(leaf, whole.indexOf(leaf.script) + 1, leaf.script, [])] : []))
}

/** Leaves with a proven code, each place once in the order of scanning, and the second ones. */
function pinnedIn(readings: readonly LeafReading[]): { pinned: Pinned[]; second: Pinned[] } {
  const pinned: Pinned[] = []
  const second: Pinned[] = []
  readings.forEach((reading, position) => {
    const { code } = reading
    if (!code?.agrees || code.script === null || code.paperPage === null) return
    const leaf = { reading, position, script: code.script, page: code.paperPage }
    const there = pinned.some(({ script, page }) => script === leaf.script && page === leaf.page)
    if (there) second.push(leaf)
    else pinned.push(leaf)
  })
  return { pinned, second }
}

/** Positions that are not found yet, in stretches without a found leaf between them: what lies on both sides of one is not neighbours. */
function runsBetween(readings: readonly LeafReading[], found: ReadonlyMap<number, LeafFinding>): number[][] {
  const runs: number[][] = []
  let run: number[] = []
  for (let position = 0; position <= readings.length; position++) {
    if (position < readings.length && !found.has(position)) run.push(position)
    else if (run.length > 0) {
      runs.push(run)
      run = []
    }
  }
  return runs
}

/**
 * What a leaf without a proven code comes to. Beside coded leaves a part of a script may belong to one of theirs, so only whole scripts stand
 * by themselves; a leaf that bears a code which its print denies is never placed by its print alone.
 */
function beside(finding: LeafFinding, reading: LeafReading, coded: boolean, number: number): LeafFinding {
  const why: LeafReason[] = reading.code?.script ? ['code_disagrees'] : reading.code ? ['code_unknown'] : []
  if (finding.kind === 'blank') return finding
  const alone = finding.kind === 'script' && (reading.code?.script || (coded && finding.missing.length > 0))
  if (finding.kind === 'loose' || alone) return { ...loose(reading, [...why, ...(alone && why.length === 0 ? (['order_unclear'] as const) : []), ...finding.reasons]), missing: finding.missing }
  return { ...finding, script: finding.script! + number }
}

function inScript({ reading }: Pinned, script: number, printed: string, missing: readonly number[]): LeafFinding {
  const best = reading.guesses[0]!
  return {
    index: reading.index, ...(reading.half === undefined ? {} : { half: reading.half }), kind: 'script', script, printed, paperPage: best.paperPage, rotation: best.rotation,
    homography: best.homography, confidence: best.confidence, guesses: reading.guesses.slice(0, 3), reasons: missing.length ? ['page_missing'] : [], missing,
  }
}

function loose(reading: LeafReading, reasons: readonly LeafReason[]): LeafFinding {
  const best = reading.guesses[0]
  return {
    index: reading.index, ...(reading.half === undefined ? {} : { half: reading.half }), kind: 'loose', script: null, paperPage: null,
    rotation: best?.rotation ?? reading.image?.shownTurn ?? 0, homography: null, confidence: best?.confidence ?? 0, guesses: reading.guesses.slice(0, 3), reasons, missing: [],
    ...(reading.problem ? { problem: reading.problem } : {}),
  }
}
