import type { Piscina } from 'piscina'
import { AppError, type ErrorDetail } from '@/lib/core/errors'
import { log } from '@/lib/infra/log'
import { runLimited } from '@/lib/infra/run-limited'
import { threadPool } from '@/lib/infra/thread-pool'
import type { SheafAnswer, SheafJob } from './sheaf-thread'

/** A file that takes longer to answer is given up, in milliseconds. */
const longest = 60_000
/** Hundreds of pictures are decoded and packed. */
const longestWrap = 20 * 60_000
const idleMs = 20_000
let pool: Piscina | null = null

type Answered = Extract<SheafAnswer, { pageCount: number }>

/** How many pages a sheaf has, by its content. Throws the file errors of openSheaf. */
export async function lookAtSheaf(file: string): Promise<{ pageCount: number }> {
  const { pageCount } = await answered(ask({ file }), 'file_damaged')
  return { pageCount }
}

/** Makes a sheaf at `to` of pictures, a page each in the order given, and says how many pages it has. Throws the file errors of wrapScan. */
export async function wrapSheaf(pictures: readonly string[], to: string): Promise<{ pageCount: number }> {
  const { pageCount } = await answered(ask({ file: to, wrap: pictures }, longestWrap), 'file_damaged')
  return { pageCount }
}

/** The stored image of a sheaf's page (from 0) as a JPEG or PNG file. Throws page_unreadable. */
export async function sheafPicture(file: string, index: number): Promise<Buffer> {
  const { picture } = await answered(ask({ file, picture: index }), 'page_unreadable', { page: index + 1 })
  return Buffer.from(picture!)
}

/** Asked in a thread, so that no file can hold up the process or bring it down. */
function ask(job: SheafJob, most = longest): Promise<SheafAnswer> {
  pool ??= threadPool('lib/tasks/sheaf-thread.ts', 1, { idleMs })
  return runLimited<SheafAnswer>(pool, job, most)
}

/** A thread's answer. `given`: what a file that ends its thread is taken for. Throws what the answer says is wrong. */
export async function answered(asked: Promise<SheafAnswer>, given: 'file_damaged' | 'page_unreadable', detail: ErrorDetail = {}): Promise<Answered> {
  const answer = await asked.catch((error: unknown) => {
    if (isMissing(error)) throw error
    log.warn({ err: error }, 'a file ended the thread that read it')
    throw new AppError(given, detail)
  })
  if ('fault' in answer) throw new AppError(answer.fault, answer.detail)
  return answer
}

/** A file that is not there is a fault of ours, not of the file. */
function isMissing(error: unknown): boolean {
  return typeof error === 'object' && error !== null && 'code' in error && error.code === 'ENOENT'
}
