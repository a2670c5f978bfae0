import type { ErrorCode, ErrorDetail } from './errors'

/** What an action answers: a value, or a code with what its sentence needs. */
export type Outcome<T> = Readonly<{ ok: true; value: T } | { ok: false; code: ErrorCode; detail: ErrorDetail }>
