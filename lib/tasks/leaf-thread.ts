import sharp from 'sharp'
import { AppError } from '@/lib/core/errors'
import type { BlankPage, GreyPicture } from '@/lib/core/grey-picture'
import { unread, type ImagePart, type LeafReading, type PageGuess } from '@/lib/core/leaf'
import type { PrintedCodes, PrintedPage } from '@/lib/core/printed-code'
import { readNumber } from '@/lib/placing/read-number'
import { loadCodeEngine } from '@/lib/reading/code-engine'
import { decodePage } from '@/lib/reading/decode-page'
import type { CodeWindow } from '@/lib/reading/find-code'
import { openSheaf, type OpenSheaf } from '@/lib/reading/open-sheaf'
import { opencv, type Cv } from '@/lib/registering/opencv'
import { mayBeTwoUp, registerPartToPage, registerSheet } from '@/lib/registering/register-sheet'
import { makeTemplate, type Template } from '@/lib/registering/template'
import { warmUp } from '@/lib/registering/warm-up'
import { codeWindows, readByCode } from './read-by-code'
import askSheaf, { type SheafAnswer } from './sheaf-thread'

/** What a thread is handed: a leaf of a sheaf (none: only get ready), the sheaf's file, the blank paper and its name, printed codes as JSON; or a file to be looked at. */
export type LeafJob = Readonly<{ index: number | null; file: string; paperKey: string; paper: readonly BlankPage[]; codes?: Uint8Array; onto?: Onto }>
export type LookJob = Readonly<{ look: string }>
/** The page (from 1) that a person says a leaf is, and which part of its image that leaf is. */
export type Onto = Readonly<{ paperPage: number; part?: ImagePart }>
/** One reading, or two of an image that shows two pages. */
export type LeafAnswer = Readonly<{ readings: readonly LeafReading[]; onto: PageGuess | null }>

sharp.concurrency(1)
sharp.cache(false)

let kept: { key: string; templates: Template[]; codes: PrintedCodes; windows: CodeWindow[] } | null = null

/** Looks at a sheaf, or decodes one leaf and registers it: to every page, or to the page `onto` alone. A page that cannot be read is a reading with a problem. */
export default async function work(job: LeafJob | LookJob): Promise<LeafAnswer | SheafAnswer> {
  return 'look' in job ? askSheaf({ file: job.look }) : readLeaf(job)
}

async function readLeaf(job: LeafJob): Promise<LeafAnswer> {
  const sheaf = opened(job)
  const { cv } = await opencv()
  if (kept?.key !== job.paperKey) kept = await makeReady(cv, job)
  const { templates, windows } = kept
  const index = job.index ?? 0
  try {
    if (job.index === null) {
      warmUp(cv, templates)
      return { readings: [unread(index, 'page_empty')], onto: null }
    }
    const { image, picture } = await decodePage(sheaf, index)
    const { onto } = job
    if (onto === undefined) {
      const register = () => registerSheet(cv, image, picture, templates)
      const seen = windows.length > 0 ? await readByCode(cv, { image, picture }, kept, register, mayBeTwoUp(image, templates)) : register()
      return { readings: seen.map((one) => withNumber({ index, ...one }, picture, job.paper)), onto: null }
    }
    const template = templates.find(({ page }) => page.page === onto.paperPage)
    return { readings: [], onto: template ? registerPartToPage(cv, image, picture, template, onto.part) : null }
  } catch (error) {
    if (!(error instanceof AppError)) throw error
    return { readings: [unread(index, error.code === 'page_too_large' || error.code === 'page_incomplete' ? error.code : 'page_unreadable')], onto: null }
  }
}

/** Reads the candidate number where the leaf's likeliest page has boxes for it. */
function withNumber(reading: LeafReading, picture: GreyPicture, paper: readonly BlankPage[]): LeafReading {
  const best = reading.guesses[0]
  const blank = paper.find(({ page }) => page === best?.paperPage)
  return best && blank?.numberBoxes?.length ? { ...reading, number: readNumber(picture, best.homography, blank, blank.numberBoxes) } : reading
}

async function makeReady(cv: Cv, { paperKey, paper, codes: coded }: LeafJob): Promise<NonNullable<typeof kept>> {
  const templates = paper.map((page) => makeTemplate(cv, page))
  const codes: PrintedCodes = new Map(coded ? (JSON.parse(Buffer.from(coded).toString()) as [string, PrintedPage][]) : [])
  if (codes.size > 0) await loadCodeEngine()
  return { key: paperKey, templates, codes, windows: codeWindows(codes, templates) }
}

let held: { key: string; sheaf: OpenSheaf } | null = null

/** The sheaf stays open: its leaves come one after the other. */
function opened({ paperKey, file }: LeafJob): OpenSheaf {
  if (held?.key !== paperKey) {
    held?.sheaf.close()
    held = null
    held = { key: paperKey, sheaf: openSheaf(file) }
  }
  return held.sheaf
}
