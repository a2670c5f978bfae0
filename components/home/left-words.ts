import type { PaperLine } from '@/lib/core/paper-left'

/** What is left of a paper: words, with the counts that stand out, and one link to the next thing. `done` lines rest. */
export type Left = Readonly<{ words: readonly (string | number)[]; next: Readonly<{ label: string; href: string }> | null; done: boolean }>

type Words = readonly (string | number)[]
const months = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December']
const day = (at: number) => `${new Date(at).getDate()} ${months[new Date(at).getMonth()]}`
const noun = (n: number, one: string, many: string) => (n === 1 ? one : many)

/** Several things said one after the other, with a comma between. */
function listed(parts: readonly Words[]): Words {
  return parts.flatMap((part, k) => (k === 0 ? part : [', ', ...part]))
}

export function leftOf(line: PaperLine): Left {
  if (line.part === 'moderator') return leftToModerate(line)
  if (line.part === 'marker') return leftToMark(line)
  return leftBeforeSorting(line) ?? leftAfterSorting(line)
}

function leftToModerate({ paperId, sample }: PaperLine): Left {
  const left = sample ? sample.of - sample.read : 0
  if (!sample || left === 0) return { words: [sample ? 'your sample is read' : 'no sample drawn yet'], next: null, done: true }
  return { words: [left, ` of ${sample.of} left to second-mark`], next: { label: 'Second-mark', href: `/papers/${paperId}/second-mark` }, done: false }
}

function leftToMark({ paperId, questions, counts }: PaperLine): Left {
  const left = questions.reduce((sum, question) => sum + question.left, 0)
  if (left > 0) return { words: [left, ` ${noun(left, 'answer', 'answers')} to mark`], next: marking(paperId, questions), done: false }
  return { words: [counts.scripts === 0 ? 'nothing scanned yet' : 'all your answers are marked'], next: null, done: true }
}

/** The first question somebody has begun and not finished, else the first with answers left. */
function marking(paperId: string, questions: PaperLine['questions']): Left['next'] {
  const begun = questions.find(({ left, marked }) => left > 0 && marked > 0)
  const next = begun ?? questions.find(({ left }) => left > 0)
  if (!next) return null
  const first = questions.every(({ marked }) => marked === 0)
  return { label: `${first ? 'Begin' : 'Go on'} with ${next.label}`, href: `/papers/${paperId}/mark/${next.id}` }
}

function leftBeforeSorting({ paperId, classSetId, hasBlank, counts, reading }: PaperLine): Left | null {
  const go = (label: string, end: string) => ({ label, href: `/papers/${paperId}/${end}` })
  if (!hasBlank) return { words: ['no blank paper yet'], next: go('Choose the blank paper', 'details#blank'), done: false }
  if (counts.questions === 0) return { words: ['no answer spaces yet'], next: go('Draw them', 'set'), done: false }
  if (classSetId === null) return { words: ['paper set; no class yet'], next: go('Say who sits it', 'details'), done: false }
  if (reading) return { words: reading.of ? ['reading the sheaf: leaf ', reading.done, ` of ${reading.of}`] : ['a sheaf waits to be read'], next: go('See it', 'scan'), done: false }
  if (counts.scripts > 0) return null
  if (counts.looseSheets > 0) return { words: [counts.looseSheets, ` loose ${noun(counts.looseSheets, 'sheet', 'sheets')}`], next: go('Sort them', 'sort'), done: false }
  if (counts.sheavesFailed > 0) return { words: ['the sheaf could not be read'], next: go('See why', 'scan'), done: false }
  return { words: ['paper set; no sheaf yet'], next: go('Scan the sheaf', 'scan'), done: false }
}

function leftAfterSorting({ paperId, questions, counts, handedBackAt }: PaperLine): Left {
  const { looseSheets, namesOpen, answersLeft, answersMarked, scripts, sampled, sampleRead } = counts
  const go = (label: string, end: string) => ({ label, href: `/papers/${paperId}/${end}` })
  const toSort: Words[] = []
  if (looseSheets > 0) toSort.push([looseSheets, ` loose ${noun(looseSheets, 'sheet', 'sheets')}`])
  if (namesOpen > 0) toSort.push([namesOpen, ` ${noun(namesOpen, 'name', 'names')} to confirm`])
  if (handedBackAt !== null) {
    const more = answersLeft > 0 ? [[answersLeft, ` ${noun(answersLeft, 'answer', 'answers')} to mark`]] : []
    const open = [...more, ...toSort]
    const words: Words = [`handed back ${day(handedBackAt)}`, ...(open.length > 0 ? ['; ', ...listed(open)] : [])]
    return { words, next: answersLeft > 0 ? marking(paperId, questions) : toSort.length > 0 ? go('Sort them', 'sort') : null, done: open.length === 0 }
  }
  if (answersMarked === 0 && toSort.length > 0) return { words: listed(toSort), next: go('Sort them', 'sort'), done: false }
  if (answersMarked === 0 && answersLeft > 0) return { words: [scripts, ` ${noun(scripts, 'script', 'scripts')} placed, none marked`], next: marking(paperId, questions), done: false }
  if (answersLeft > 0) return { words: listed([[answersLeft, ` ${noun(answersLeft, 'answer', 'answers')} to mark`], ...toSort]), next: marking(paperId, questions), done: false }
  if (toSort.length > 0) return { words: listed(toSort), next: go('Sort them', 'sort'), done: false }
  if (sampled > sampleRead) return { words: [sampled - sampleRead, ` of ${sampled} left to second-mark`], next: null, done: false }
  return { words: ['all marked; not handed back yet'], next: go('Look at the checks', 'hand-back'), done: false }
}
