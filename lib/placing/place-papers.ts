import type { LeafFinding, LeafReading } from '@/lib/core/leaf'
import { placePile } from './place-pile'

/**
 * Sorts a sheaf in which scripts of several papers may lie: each paper's leaves by themselves, in the order of scanning. A leaf that no
 * print claims for certain counts as a possible page of the papers that lie beside it, so nothing is joined past it unseen.
 * @param readings every leaf of the sheaf, in scan order
 * @param pages how many pages each paper has, in the order that guesses count papers by
 */
export function placePapers(readings: readonly LeafReading[], pages: readonly number[]): LeafFinding[] {
  if (pages.length < 2) return placePile(readings, pages[0] ?? 0)
  const own = readings.map(paperOf)
  const found = new Map<number, LeafFinding>()
  let scripts = 0
  for (const [paper, count] of pages.entries()) {
    const among = readings.map((_, at) => at).filter((at) => own[at] === paper || (own[at] === null && beside(own, at).includes(paper)))
    const findings = placePile(among.map((at) => readings[at]!), count)
    for (const [k, at] of among.entries()) {
      const finding = findings[k]!
      if (own[at] === paper || !found.has(at)) found.set(at, { ...finding, paper: own[at] ?? mostLike(readings[at]!), script: finding.script && finding.script + scripts })
    }
    scripts = Math.max(scripts, ...[...found.values()].map(({ script }) => script ?? 0))
  }
  return renumbered(readings.map((_, at) => found.get(at)!))
}

/** The paper whose page a leaf certainly is; null when that is open. */
function paperOf({ clear, guesses }: LeafReading): number | null {
  return clear ? (guesses[0]!.paper ?? 0) : null
}

function mostLike({ guesses }: LeafReading): number {
  return guesses[0]?.paper ?? 0
}

/** The papers of the nearest certain leaves before and after one; the first paper where there are none. */
function beside(own: readonly (number | null)[], at: number): number[] {
  const before = own.slice(0, at).findLast((paper) => paper !== null)
  const after = own.slice(at + 1).find((paper) => paper !== null)
  const near = [before, after].flatMap((paper) => paper ?? [])
  return near.length > 0 ? near : [0]
}

/** Scripts counted from 1 in the order in which they lie. */
function renumbered(findings: readonly LeafFinding[]): LeafFinding[] {
  const numbers = new Map<number, number>()
  for (const { script } of findings) if (script !== null && !numbers.has(script)) numbers.set(script, numbers.size + 1)
  return findings.map((finding) => ({ ...finding, script: finding.script === null ? null : numbers.get(finding.script)! }))
}
