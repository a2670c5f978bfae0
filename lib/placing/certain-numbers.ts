import type { LeafFinding, LeafReading } from '@/lib/core/leaf'
import { certainName } from '@/lib/core/sorting'
import { assignNames, type ReadScript } from './assign-names'

/**
 * The candidate number of each script whose boxes say it with certainty, by the script's running number.
 * @param numbers the candidate numbers of the roster, in its order
 */
export function certainNumbers(readings: readonly LeafReading[], findings: readonly LeafFinding[], numbers: readonly string[]): Map<number, string> {
  const said = assignNames(scriptsOf(readings, findings), numbers.map((number) => ({ student: number, number })))
  return new Map([...said].filter(([, { certainty }]) => certainty >= certainName).map(([script, { student }]) => [Number(script), student]))
}

/** The scripts in the order of the pile, each with what its boxes show. */
function scriptsOf(readings: readonly LeafReading[], findings: readonly LeafFinding[]): ReadScript[] {
  const key = ({ index, half }: Pick<LeafFinding, 'index' | 'half'>) => `${index}/${half ?? ''}`
  const read = new Map(readings.map((reading) => [key(reading), reading]))
  const scripts = new Map<number, ReadScript>()
  for (const finding of findings) {
    if (finding.script === null) continue
    const reading = read.get(key(finding))
    const boxes = reading?.guesses[0]?.paperPage === finding.paperPage ? reading?.number?.shares : null
    const before = scripts.get(finding.script)
    scripts.set(finding.script, { id: String(finding.script), student: null, boxes: before?.boxes ?? boxes ?? null })
  }
  return [...scripts].sort(([a], [b]) => a - b).map(([, script]) => script)
}
