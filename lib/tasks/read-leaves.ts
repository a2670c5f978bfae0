import type { BlankPage } from '@/lib/core/grey-picture'
import { unread, type LeafReading, type PageGuess } from '@/lib/core/leaf'
import type { PrintedCodes } from '@/lib/core/printed-code'
import { newId } from '@/lib/core/ids'
import { log } from '@/lib/infra/log'
import { runLimited } from '@/lib/infra/run-limited'
import { threadPool } from '@/lib/infra/thread-pool'
import { answered } from './look-at-sheaf'
import type { LeafAnswer, LeafJob, LookJob, Onto } from './leaf-thread'
import type { SheafAnswer } from './sheaf-thread'

/** A page that takes longer than this is given up, in milliseconds; its thread with it. */
const longest = 45_000

/** Reads leaves of one sheaf against one blank paper, on threads of its own. Close it after use. */
export type LeafReader = Readonly<{
  pageCount: number
  /** Loads the threads' engines ahead of the first leaf. */
  ready: () => Promise<void>
  /** The leaves on one page of the sheaf, from 0: one, or the two halves of an image that shows two pages. Never throws for what is wrong with the page: that is a reading with a problem. */
  read: (index: number) => Promise<readonly LeafReading[]>
  /** Registers a leaf to the page that a person says it is; null when its print is not found. */
  readOnto: (index: number, onto: Onto) => Promise<PageGuess | null>
  close: () => Promise<void>
}>

/**
 * Opens a sheaf for reading leaf by leaf. Throws the file errors: file_empty, file_not_pdf, file_encrypted, file_damaged, file_no_pages, too_many_pages.
 * @param file the path of the sheaf's file; only the leaf in work is in memory
 * @param paper the blank paper's pages, as openBlankPaper gives them
 * @param codes printed codes that may lie in it; without any none is looked for
 */
export async function openLeaves(file: string, paper: readonly BlankPage[], threads = 1, codes?: PrintedCodes): Promise<LeafReader> {
  const pool = threadPool('lib/tasks/leaf-thread.ts', threads)
  const look = runLimited<SheafAnswer>(pool, { look: file } satisfies LookJob, longest)
  const { pageCount } = await answered(look, 'file_damaged').catch(async (error: unknown) => {
    await pool.destroy()
    throw error
  })
  const pages = paper.map((page) => ({ ...page, picture: { ...page.picture, data: shared(page.picture.data) } }))
  const paperKey = newId()
  const common = { file, paperKey, paper: pages, ...(codes && codes.size > 0 ? { codes: shared(Buffer.from(JSON.stringify([...codes]))) } : {}) }
  let closing = false
  const run = async (index: number, onto?: Onto): Promise<LeafAnswer | null> => {
    const job: LeafJob = { index, ...common, ...(onto === undefined ? {} : { onto }) }
    // a page that kills its thread is reported like one that cannot be read
    return runLimited<LeafAnswer>(pool, job, longest).catch((error: unknown) => {
      if (!closing) log.warn({ err: error, page: index + 1 }, 'a page ended the thread that read it')
      return null
    })
  }
  return {
    pageCount,
    ready: async () => {
      await Promise.all(Array.from({ length: threads }, () => runLimited(pool, { index: null, ...common } satisfies LeafJob, longest)))
    },
    read: async (index) => (await run(index))?.readings ?? [unread(index, 'page_unreadable')],
    readOnto: async (index, onto) => (await run(index, onto))?.onto ?? null,
    close: () => {
      closing = true
      return pool.destroy()
    },
  }
}

/**
 * Reads the leaves of an open sheaf that `known` does not hold yet, a few at a time, and hands each over as it is done.
 * @param threads how many leaves are in work at once
 */
export async function readLeaves(reader: LeafReader, known: (index: number) => boolean, onLeaf: (readings: readonly LeafReading[]) => Promise<void> | void, threads = 1): Promise<void> {
  let next = 0
  const lane = async (): Promise<void> => {
    while (next < reader.pageCount) {
      const index = next++
      if (!known(index)) await onLeaf(await reader.read(index))
    }
  }
  await Promise.all(Array.from({ length: threads + 1 }, lane))
}

/** A copy in memory that threads can see. */
function shared(bytes: Uint8Array): Uint8Array {
  const copy = new Uint8Array(new SharedArrayBuffer(bytes.length))
  copy.set(bytes)
  return copy
}
