import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { Piscina } from 'piscina'

/**
 * A pool of threads that run one TypeScript module's default export. Heavy work (pictures, damaged files) happens there, so
 * that it can neither hold up the process nor bring it down. Destroy it after use.
 * @param module path from the top of the checkout
 */
export function threadPool(module: string, threads: number): Piscina {
  return new Piscina({
    filename: join(process.cwd(), 'lib/infra/ts-thread.mjs'),
    workerData: { module: pathToFileURL(join(/* turbopackIgnore: true */ process.cwd(), module)).href },
    minThreads: threads,
    maxThreads: threads,
    idleTimeout: 30_000,
  })
}
