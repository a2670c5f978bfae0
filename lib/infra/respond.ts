import { unstable_rethrow } from 'next/navigation'
import { AppError, errorStatus } from '@/lib/core/errors'
import { log } from './log'
import { expected } from './outcome'

const reading = new Set(['GET', 'HEAD', 'OPTIONS'])

/** A page of another site may not write here with the reader's cookie. */
function assertSameOrigin(request: Request): void {
  if (reading.has(request.method)) return
  const site = request.headers.get('sec-fetch-site')
  if (site !== null && site !== 'same-origin' && site !== 'none') throw new AppError('not_allowed')
}

/**
 * The wrapper of every route handler. A plain value is answered as JSON, a Response as it is; AppError codes become statuses
 * with `{ code, detail }`. Nothing a school holds is kept in a shared cache.
 */
export async function respond(request: Request, work: () => Promise<unknown>): Promise<Response> {
  try {
    assertSameOrigin(request)
    const value = await work()
    if (value instanceof Response) return value
    return Response.json(value ?? null, { headers: { 'cache-control': 'private, no-store' } })
  } catch (error) {
    unstable_rethrow(error)
    const known = expected(error)
    if (!known) {
      log.error({ err: error, path: new URL(request.url).pathname }, 'request failed')
      return Response.json({ code: 'failed', detail: {} }, { status: 500 })
    }
    log.info({ code: known.code, path: new URL(request.url).pathname }, 'request refused')
    return Response.json({ code: known.code, detail: known.detail }, { status: errorStatus[known.code], headers: { 'cache-control': 'private, no-store' } })
  }
}
