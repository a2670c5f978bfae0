import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { ingestSheaf, type SheafResult } from '@/lib/tasks/ingest-sheaf'
import { scoreResult, type ResultPage, type Score, type Truth } from './score-result'

export const classSets = ['one-page', 'everyday', 'bitonal', 'booklet'] as const
export type ScoredSet = Readonly<{ score: Score; result: SheafResult; truth: Truth }>

export function classSetFolder(name: string): string {
  return join(process.cwd(), 'seeds/class-sets', name)
}

/** Ingests a folder's scan.pdf against its paper.pdf and scores it by its truth.json. */
export async function scoreFolder(folder: string, threads = 1): Promise<ScoredSet> {
  const paper = await openBlankPaper(await readFile(join(folder, 'paper.pdf')))
  const truth = JSON.parse(await readFile(join(folder, 'truth.json'), 'utf8')) as Truth
  const result = await ingestSheaf({ sheaf: join(folder, 'scan.pdf'), paper, threads })
  return { score: scoreResult(truth, result.findings.map(resultPage)), result, truth }
}

function resultPage({ index, kind, script, paperPage, rotation, homography, confidence }: SheafResult['findings'][number]): ResultPage {
  return { index, kind, script, paper_page: paperPage, rotation, homography, confidence }
}
