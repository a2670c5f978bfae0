import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { Piscina } from 'piscina'
import { log } from './log'

export type PoolOptions = Readonly<{
  /** What JavaScript of one thread may hold, in MB; beyond it the thread ends and its task fails. Pictures lie outside and have limits of their own. */
  heapMb?: number
  /** Threads end when nothing is to be done for this long, in milliseconds. */
  idleMs?: number
}>

/**
 * A pool of threads that run one TypeScript module's default export. Heavy work (pictures, damaged files) happens there, so
 * that it can neither hold up the process nor bring it down. Destroy it after use.
 * @param module path from the top of the checkout
 */
export function threadPool(module: string, threads: number, { heapMb = 512, idleMs }: PoolOptions = {}): Piscina {
  const pool = new Piscina({
    filename: join(process.cwd(), 'lib/infra/ts-thread.mjs'),
    workerData: { module: pathToFileURL(join(/* turbopackIgnore: true */ process.cwd(), module)).href },
    minThreads: idleMs === undefined ? threads : 0,
    maxThreads: threads,
    idleTimeout: idleMs ?? 30_000,
    resourceLimits: { maxOldGenerationSizeMb: heapMb },
  })
  // a thread that ends between two tasks is no fault of either; the pool starts another
  pool.on('error', (error: unknown) => log.warn({ err: error }, 'a thread ended'))
  return pool
}
