import { Upload, defaultOptions, type DetailedError } from 'tus-js-client'
import { ask, RefusedError } from '@/components/ui/ask'
import type { ErrorCode, ErrorDetail } from '@/lib/core/errors'
import { fileKind, kindBytes } from '@/lib/core/file-kind'

/** How an upload stands. `sent` runs from 0 to 1. */
export type UploadState =
  | Readonly<{ step: 'none' }>
  | Readonly<{ step: 'sending' | 'waiting'; name: string; sent: number }>
  | Readonly<{ step: 'checking'; name: string }>
  | Readonly<{ step: 'refused'; name: string; code: ErrorCode | 'failed'; detail: ErrorDetail }>

type Wanted = Readonly<{ paperId: string; file: File; classSetIds: readonly string[]; limitMb: number; say: (state: UploadState) => void; arrived: () => void }>
export type Running = Readonly<{ goOn: () => void; stop: () => void }>

const chunk = 8 * 1024 * 1024
/** A hiccup is passed over in silence; after these the page says that the line is down, and tries again every few seconds. */
const pauses = [0, 1000, 3000]

/** The same file for the same paper is the same upload, also after a reload. */
function fingerprint(paperId: string, file: File): string {
  return ['sheaf', paperId, file.name, file.size, file.lastModified].join('-')
}

/** What can be said of a file before a byte of it is sent; the server looks again. */
async function faultOf(file: File, limitMb: number): Promise<{ code: ErrorCode; detail: ErrorDetail } | null> {
  if (file.size === 0) return { code: 'file_empty', detail: {} }
  if (file.size > limitMb * 1024 * 1024) return { code: 'file_too_large', detail: { limitMb } }
  const kind = fileKind(new Uint8Array(await file.slice(0, kindBytes).arrayBuffer()))
  return kind === null ? { code: 'file_kind_unknown', detail: {} } : kind === 'heic' ? { code: 'file_heic', detail: {} } : null
}

/** Sends a sheaf in pieces and has it taken over. A lost line is waited out; what has arrived is never sent twice. */
export function sendSheaf({ paperId, file, classSetIds, limitMb, say, arrived }: Wanted): Running {
  const { name } = file
  let sent = 0
  let over = false
  const upload = new Upload(file, {
    endpoint: `/api/papers/${paperId}/sheaves/upload`,
    chunkSize: chunk,
    retryDelays: pauses,
    metadata: { filename: name },
    fingerprint: async () => fingerprint(paperId, file),
    onProgress: (bytes, total) => { sent = total > 0 ? bytes / total : 0; if (!over) say({ step: 'sending', name, sent }) },
    // 404: cleaned away, or another person's. 409 and 423: the piece before is still being written.
    onShouldRetry: (error) => { const status = error.originalResponse?.getStatus() ?? 0; return status === 0 || status === 409 || status === 423 || status >= 500 },
    onError: (error) => { if (!over) stumble(error) },
    onSuccess: () => void takeOver(),
  })

  const stumble = (error: Error | DetailedError) => {
    const status = 'originalResponse' in error ? (error.originalResponse?.getStatus() ?? 0) : 0
    if (status === 0 || status >= 500 || status === 409 || status === 423) return say({ step: 'waiting', name, sent })
    const code = status === 401 ? 'signed_out' : status === 413 ? 'file_too_large' : status === 403 ? 'not_allowed' : 'failed'
    say({ step: 'refused', name, code, detail: { limitMb } })
  }
  const forget = async () => { for (const known of await upload.findPreviousUploads()) await defaultOptions.urlStorage.removeUpload(known.urlStorageKey) }
  const takeOver = async () => {
    say({ step: 'checking', name })
    const uploadId = upload.url?.split('/').pop() ?? ''
    try {
      await ask(`/api/papers/${paperId}/sheaves`, { json: { uploadId, classSetIds } })
      await forget()
      over = true
      say({ step: 'none' })
      arrived()
    } catch (error) {
      const refused = error instanceof RefusedError ? error : null
      if (!refused || refused.status === 0 || refused.status >= 500) return say({ step: 'waiting', name, sent: 1 })
      await forget()
      over = true
      say({ step: 'refused', name, code: refused.code, detail: refused.detail })
    }
  }
  const start = async () => {
    const fault = await faultOf(file, limitMb)
    if (fault) return say({ step: 'refused', name, ...fault })
    say({ step: 'sending', name, sent: 0 })
    const [known] = await upload.findPreviousUploads()
    if (known) upload.resumeFromPreviousUpload(known)
    upload.start()
  }
  void start()
  return { goOn: () => { if (!over) upload.start() }, stop: () => { over = true; void upload.abort(true); void forget(); say({ step: 'none' }) } }
}

/** Files of this paper that stopped half way in this browser: chosen again they go on where they stopped. */
export async function brokenOff(paperId: string): Promise<string[]> {
  const known = await defaultOptions.urlStorage.findAllUploads().catch(() => [])
  return known.filter(({ uploadUrl }) => uploadUrl?.includes(`/papers/${paperId}/`)).map(({ metadata }) => metadata['filename'] ?? '').filter(Boolean)
}
