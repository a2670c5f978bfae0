import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { readTokensFile } from '@/scripts/read-tokens-file'
import { certainNumbers } from '@/lib/placing/certain-numbers'
import { numberBoxesOf } from '@/lib/setting/number-boxes'
import { readRoster } from '@/lib/setting/read-roster'
import { ingestSheaf, type SheafResult } from '@/lib/tasks/ingest-sheaf'
import { scoreInk, scoreNumbers, type InkScore, type NumberScore } from './score-writing'
import { scoreResult, type ResultPage, type Score, type Truth } from './score-result'

export const classSets = ['one-page', 'everyday', 'bitonal', 'booklet'] as const
/** `codes` counts the printed codes that were read of those that lie in the scan; null for a set without. */
export type ScoredSet = Readonly<{ codes: { read: number; printed: number } | null; score: Score; numbers: NumberScore; ink: InkScore; result: SheafResult; truth: Truth }>

export function classSetFolder(name: string): string {
  return join(process.cwd(), 'seeds/class-sets', name)
}

/** A few scripts of the everyday paper printed with codes, their pages shuffled. */
export const codedSetFolder = join(process.cwd(), 'tests/fixtures/coded-set')

/** Ingests a folder's scan.pdf against its paper.pdf, by the printed codes of its tokens.csv if it has one, and scores it by its truth.json. */
export async function scoreFolder(folder: string, threads = 1): Promise<ScoredSet> {
  const boxes = numberBoxesOf(JSON.parse(await readFile(join(folder, 'paper.json'), 'utf8').catch(() => '{}')))
  const paper = (await openBlankPaper(await readFile(join(folder, 'paper.pdf')))).map((page) => ({ ...page, numberBoxes: boxes.get(page.page) ?? [] }))
  const roster = readRoster(await readFile(join(folder, 'roster.csv')).catch(() => Buffer.alloc(0))).lines.map(({ candidateNumber }) => candidateNumber)
  const truth = JSON.parse(await readFile(join(folder, 'truth.json'), 'utf8')) as Truth
  const printed = readTokensFile(await readFile(join(folder, 'tokens.csv'), 'utf8').catch(() => ''))
  const result = await ingestSheaf({ sheaf: join(folder, 'scan.pdf'), paper, threads, ...(printed ? { codes: printed.codes } : {}) })
  const names = certainNumbers(result.readings, result.findings, roster)
  const found = result.findings.map((finding) => ({ ...resultPage(finding), candidate_number: printed?.candidates.get(finding.printed ?? '') ?? names.get(finding.script ?? 0) ?? null }))
  const codes = printed && { read: result.readings.filter(({ code }) => code?.script).length, printed: truth.pages.filter(({ kind }) => kind === 'script' || kind === 'duplicate').length }
  return { score: scoreResult(truth, found), numbers: scoreNumbers(truth, result, names), ink: scoreInk(truth, result), result, truth, codes }
}

function resultPage({ index, half, kind, script, paperPage, rotation, homography, confidence }: SheafResult['findings'][number]): ResultPage {
  return { index, ...(half === undefined ? {} : { half }), kind, script, paper_page: paperPage, rotation, homography, confidence }
}
