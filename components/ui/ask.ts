import type { ErrorCode, ErrorDetail } from '@/lib/core/errors'

/** A refused request of the browser, with the code the server gave; `failed` when it gave none, `offline` status 0. */
export class RefusedError extends Error {
  constructor(readonly status: number, readonly code: ErrorCode | 'failed', readonly detail: ErrorDetail) {
    super(code)
  }
}

/** Asks the application's own API and reads JSON. Throws RefusedError; a dead network throws status 0. */
export async function ask<T>(path: string, init?: Omit<RequestInit, 'body'> & { json?: unknown }): Promise<T> {
  const { json, ...rest } = init ?? {}
  const request: RequestInit = json === undefined ? rest : { method: 'POST', ...rest, headers: { 'content-type': 'application/json' }, body: JSON.stringify(json) }
  const response = await fetch(path, request).catch(() => { throw new RefusedError(0, 'failed', {}) })
  if (response.ok) return (await response.json()) as T
  const told = (await response.json().catch(() => ({}))) as { code?: ErrorCode; detail?: ErrorDetail }
  throw new RefusedError(response.status, told.code ?? 'failed', told.detail ?? {})
}
