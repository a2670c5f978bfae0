import { unstable_rethrow } from 'next/navigation'
import { AppError } from '@/lib/core/errors'
import type { Outcome } from '@/lib/core/outcome'
import { ZodError } from 'zod'
import { log } from './log'

/** What expected trouble is called at a door; null for a bug. */
export function expected(error: unknown): AppError | null {
  if (error instanceof AppError) return error
  if (error instanceof ZodError) {
    const lines = error.issues.slice(0, 20).map((issue) => ({ path: issue.path.join('.'), says: issue.message }))
    return new AppError('bad_input', { lines })
  }
  return null
}

/** The wrapper of every action: expected trouble becomes an answer, a bug reaches the error screen and the log. */
export async function outcome<T>(work: () => Promise<T>): Promise<Outcome<T>> {
  try {
    return { ok: true, value: await work() }
  } catch (error) {
    unstable_rethrow(error)
    const known = expected(error)
    if (!known) {
      log.error({ err: error }, 'action failed')
      throw error
    }
    log.info({ code: known.code }, 'action refused')
    return { ok: false, code: known.code, detail: known.detail }
  }
}
