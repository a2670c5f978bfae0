import { sayMark, type HalfMarks } from '@/lib/core/marks'
import type { PaperCounts, StageName } from '@/lib/core/paper-stages'

/** "1 leaf", "4 loose sheets": a count with its noun. */
export function counted(n: number, one: string, many: string): string {
  return `${n} ${n === 1 ? one : many}`
}

const nothing = '–'

function set({ questions, marks }: PaperCounts): string {
  if (questions === 0) return 'no questions yet'
  return `${counted(questions, 'question', 'questions')}, ${sayMark(marks as HalfMarks)} ${marks <= 2 ? 'mark' : 'marks'}`
}

function scan({ sheaves, sheavesReading, sheavesFailed, leaves }: PaperCounts): string {
  if (sheaves === 0) return 'no sheaf yet'
  if (sheavesReading > 0) return 'reading'
  if (leaves === 0 && sheavesFailed > 0) return 'could not be read'
  return counted(leaves, 'leaf', 'leaves')
}

function sort({ leaves, looseSheets, namesOpen, pagesMissing, scripts }: PaperCounts): string {
  if (looseSheets > 0) return counted(looseSheets, 'loose sheet', 'loose sheets')
  if (namesOpen > 0) return counted(namesOpen, 'name to confirm', 'names to confirm')
  if (scripts > 0 && pagesMissing > 0) return counted(pagesMissing, 'page missing', 'pages missing')
  return leaves === 0 && scripts === 0 ? nothing : 'nothing loose'
}

function mark({ answersLeft, answersMarked }: PaperCounts): string {
  if (answersLeft > 0) return counted(answersLeft, 'answer left', 'answers left')
  return answersMarked > 0 ? 'all marked' : nothing
}

function secondMark({ sampled, sampleRead, answersMarked }: PaperCounts): string {
  if (sampled > 0) return `${sampleRead} of ${sampled} read`
  return answersMarked > 0 ? 'no sample yet' : nothing
}

function handBack({ returned, scripts }: PaperCounts): string {
  if (returned > 0) return `${returned} of ${scripts} returned`
  return scripts > 0 ? counted(scripts, 'script', 'scripts') : nothing
}

/** What is left at each stage, in the words of the stage line. */
export const stageWords: Record<StageName, (counts: PaperCounts) => string> = {
  Set: set, Scan: scan, Sort: sort, Mark: mark, 'Second-mark': secondMark, 'Hand back': handBack,
}
