import { nothingWritten } from '@/lib/core/nothing-written'
import { inkOfSpace } from '@/lib/cutting/ink-of-space'
import type { SheafResult } from '@/lib/tasks/ingest-sheaf'
import type { Truth, TruthPage } from './score-result'

/** How the candidate numbers were read: single digits, and whole numbers by whether they were said with certainty. */
export type NumberScore = Readonly<{ digits: number; digitsRight: number; right: number; wrong: number; open: number; strangersNamed: number }>
/** Empty answers found empty, and written ones taken for empty. Inks in square millimetres. */
export type InkScore = Readonly<{ blank: number; hits: number; written: number; misses: number; mostBlank: number; leastWritten: number }>

/** Judges what was read in the boxes and said of the scripts (`names`: script number to candidate number) by the truth of each leaf. */
export function scoreNumbers(truth: Truth, { readings, findings }: SheafResult, names: ReadonlyMap<number, string>): NumberScore {
  const n = { digits: 0, digitsRight: 0, right: 0, wrong: 0, open: 0, strangersNamed: 0 }
  const seen = new Set<number>()
  for (const finding of findings) {
    const page = truePage(truth, finding)
    const reading = readings.find((one) => one.index === finding.index && one.half === finding.half)
    if (!page || finding.script === null || !reading?.number || seen.has(finding.script)) continue
    seen.add(finding.script)
    const said = names.get(finding.script)
    if (page.candidate_number === null) {
      if (said) n.strangersNamed++
      continue
    }
    const digits = [...page.candidate_number].map(Number)
    n.digits += digits.length
    n.digitsRight += digits.filter((digit, k) => { const shares = reading.number!.shares[k]; return shares && shares.indexOf(Math.max(...shares)) === digit }).length
    if (said === page.candidate_number) n.right++
    else if (said) n.wrong++
    else n.open++
  }
  return n
}

/** Judges which responses seem empty by what each student truly wrote, on pages that were placed. */
export function scoreInk(truth: Truth, { readings, findings }: SheafResult): InkScore {
  const blank: number[] = []
  const written: number[] = []
  for (const finding of findings) {
    const page = truePage(truth, finding)
    const strokes = readings.find((one) => one.index === finding.index && one.half === finding.half)?.strokes
    if (!page?.candidate_number || !strokes || finding.kind !== 'script' || finding.paperPage !== page.paper_page) continue
    for (const { label, region } of truth.questions.filter((question) => question.page === page.paper_page)) {
      const response = truth.responses?.find((one) => one.candidate_number === page.candidate_number && one.question === label)
      if (response) (response.blank ? blank : written).push(inkOfSpace(strokes, region))
    }
  }
  const empty = (inks: readonly number[]) => inks.filter((ink) => ink <= nothingWritten).length
  return { blank: blank.length, hits: empty(blank), written: written.length, misses: empty(written), mostBlank: Math.max(0, ...blank), leastWritten: Math.min(...written) }
}

function truePage(truth: Truth, { index, half }: { index: number; half?: 0 | 1 }): TruthPage | undefined {
  return truth.pages.find((page) => page.index === index && (page.half === undefined || half === undefined || page.half === half) && page.kind === 'script')
}
