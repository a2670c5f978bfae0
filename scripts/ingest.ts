import { mkdtemp, open, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { parseArgs } from 'node:util'
import { z } from 'zod'
import { AppError, type ErrorCode } from '@/lib/core/errors'
import type { BlankPage } from '@/lib/core/grey-picture'
import { readTokensFile } from './read-tokens-file'
import { certainNumbers } from '@/lib/placing/certain-numbers'
import { numberBoxesOf } from '@/lib/setting/number-boxes'
import { readRoster } from '@/lib/setting/read-roster'
import { collectAtOnce } from '@/lib/infra/collect-at-once'
import { ingestSheaf } from '@/lib/tasks/ingest-sheaf'

// npm run -s ingest -- --paper PAPER_DIR [--paper PAPER_DIR ...] --sheaf scan.pdf --out result.json [--threads 1] [--codes tokens.csv]
// With several papers each page of the result names its paper, by its place among them from 0; codes are those of the first.
// Exit 0, or 2 with one line on standard error when the input cannot be used.

const usage = 'usage: ingest --paper PAPER_DIR [--paper PAPER_DIR ...] --sheaf scan.pdf --out result.json [--threads 1] [--codes tokens.csv]'
const sentences: Partial<Record<ErrorCode, string>> = {
  file_empty: 'is empty; send the file again',
  file_not_pdf: 'is not a PDF',
  file_kind_unknown: 'is neither a PDF nor a picture (JPEG, PNG, TIFF); scan it to PDF',
  file_heic: 'is a phone picture (HEIC) that cannot be read; save it as JPEG or PDF',
  file_too_large: 'is too large; scan it in parts',
  file_encrypted: 'asks for a password; save it without one and try again',
  file_damaged: 'is damaged and no page of it can be found; scan or send it again',
  file_no_pages: 'has no pages',
  too_many_pages: 'has too many pages; scan it in parts',
  page_unreadable: 'has a page that cannot be drawn',
}
class BadInput extends Error {}

/** Reads a file that must be there. */
async function input(path: string): Promise<Buffer> {
  return readFile(path).catch((error: NodeJS.ErrnoException) => {
    throw new BadInput(`${path} ${error.code === 'ENOENT' ? 'does not exist' : error.code === 'EISDIR' ? 'is a folder, not a file' : 'cannot be read'}`)
  })
}

/** A file that is read piece by piece must be there too. */
async function assertReadable(path: string): Promise<void> {
  const handle = await open(path).catch((error: NodeJS.ErrnoException) => {
    throw new BadInput(`${path} ${error.code === 'ENOENT' ? 'does not exist' : 'cannot be read'}`)
  })
  const isFile = (await handle.stat()).isFile()
  await handle.close()
  if (!isFile) throw new BadInput(`${path} is a folder, not a file`)
}

/** What of a paper.json the engine needs. */
const PaperFile = z.looseObject({ pages: z.int().min(1).optional() })

async function paperFileOf(path: string): Promise<z.infer<typeof PaperFile>> {
  const text = (await input(path)).toString('utf8')
  const parsed = PaperFile.safeParse(await Promise.resolve(text).then(JSON.parse).catch(() => null))
  if (!parsed.success) throw new BadInput(`${path} is not a paper description`)
  return parsed.data
}

/** The candidate numbers of a roster, in its order; none when there is no such file or it is no roster. */
async function rosterNumbers(path: string): Promise<string[]> {
  const bytes = await readFile(path).catch(() => null)
  return bytes ? readRoster(bytes).lines.map(({ candidateNumber }) => candidateNumber) : []
}

/** The file itself when it is a PDF, else one that holds its pictures. */
async function sheafOf(path: string, folder: string): Promise<string> {
  const { asSheaf, kindOf } = await import('@/lib/tasks/as-sheaf')
  return (await kindOf(path)) === 'pdf' ? path : (await asSheaf([path], join(folder, 'sheaf.pdf'))).path
}

function named<T>(path: string, work: Promise<T>): Promise<T> {
  return work.catch((error) => {
    throw error instanceof AppError ? new BadInput(`${path} ${sentences[error.code] ?? `cannot be used (${error.code})`}`) : error
  })
}

/** A paper's blank pages and the candidate numbers of its roster. `number` tells it from other papers of the same sheaf. */
async function readPaper(path: string, number?: number): Promise<{ pages: BlankPage[]; roster: string[] }> {
  const paperFile = join(path, 'paper.pdf')
  const file = await paperFileOf(join(path, 'paper.json'))
  const { openBlankPaper } = await import('@/lib/reading/open-blank-paper')
  const blank = await named(paperFile, input(paperFile).then((bytes) => openBlankPaper(bytes)))
  if (file.pages !== undefined && file.pages !== blank.length) throw new BadInput(`${paperFile} has ${blank.length} pages, paper.json says ${file.pages}`)
  const boxes = numberBoxesOf(file)
  const pages = blank.map((page) => ({ ...page, ...(number === undefined ? {} : { paper: number }), numberBoxes: boxes.get(page.page) ?? [] }))
  return { pages, roster: boxes.size ? await rosterNumbers(join(path, 'roster.csv')) : [] }
}

async function main(): Promise<void> {
  const { values } = parseArgs({ options: { paper: { type: 'string', multiple: true }, sheaf: { type: 'string' }, out: { type: 'string' }, threads: { type: 'string', default: '1' }, codes: { type: 'string' } } })
  const threads = Number(values.threads)
  if (!values.paper || !values.sheaf || !values.out || !Number.isInteger(threads) || threads < 1) throw new BadInput(usage)
  const papers = await Promise.all(values.paper.map((path, k) => readPaper(path, values.paper!.length > 1 ? k : undefined)))
  const paper = papers.flatMap(({ pages }) => pages)
  const roster = papers.flatMap(({ roster: numbers }) => numbers)
  const printed = values.codes === undefined ? null : readTokensFile((await input(values.codes)).toString('utf8'))
  if (values.codes !== undefined && !printed) throw new BadInput(`${values.codes} is not a list of printed codes`)
  const called = performance.now()
  await assertReadable(values.sheaf)
  const folder = await mkdtemp(join(tmpdir(), 'sheafmark-'))
  const reading = sheafOf(values.sheaf, folder).then((sheaf) => ingestSheaf({ sheaf, paper, threads, ...(printed ? { codes: printed.codes } : {}) }))
  const result = await named(values.sheaf, reading).finally(() => rm(folder, { recursive: true }))
  const names = certainNumbers(result.readings, result.findings, roster)
  const pages = result.findings.map(({ index, half, paper: of, kind, script, printed: code, paperPage, rotation, homography, confidence, reasons, problem }) => ({
    index, ...(half === undefined ? {} : { half }), ...(of === undefined ? {} : { paper: of }), kind, script, candidate_number: printed?.candidates.get(code ?? '') ?? names.get(script ?? 0) ?? null, paper_page: paperPage, rotation, homography, confidence: Number(confidence.toFixed(3)), reasons, ...(problem ? { problem } : {}),
  }))
  const timings = { startup_s: (called + result.startupSeconds * 1000) / 1000, leaves_s: result.leavesSeconds }
  await writeFile(values.out, `${JSON.stringify({ pages, timings }, null, 1)}\n`).catch(() => {
    throw new BadInput(`${values.out} cannot be written`)
  })
}

// the PDF library speaks of each oddity it reads past; standard error is for the one line about bad input
console.warn = () => {}
collectAtOnce()
main().catch((error: unknown) => {
  const known = error instanceof BadInput || (error instanceof TypeError && 'code' in error && String(error.code).startsWith('ERR_PARSE_ARGS'))
  console.error(known ? `ingest: ${(error as Error).message.split('\n')[0]}` : error)
  process.exitCode = known ? 2 : 1
})
