import { AsyncLocalStorage } from 'node:async_hooks'
import { mkdirSync } from 'node:fs'
import { rm } from 'node:fs/promises'
import path from 'node:path'
import { FileStore } from '@tus/file-store'
import { Server } from '@tus/server'
import { env } from './env'
import { log } from './log'

/** Whose upload it is, for which paper. Written by the server, never taken from what the browser says. */
export type UploadOwner = Readonly<{ userId: string; paperId: string }>
export type Upload = UploadOwner & Readonly<{ id: string; name: string; file: string; complete: boolean }>
type Held = { server: Server; store: FileStore; owner: AsyncLocalStorage<UploadOwner> }

const folder = () => path.join(env.dataFolder, 'uploads')
const keptFor = 7 * 24 * 3_600_000
const cleanedEvery = 3_600_000
const held = globalThis as { sheafmarkUploads?: Held }

/** One server for the process: its locks keep two requests from writing to one upload. */
function uploads(): Held {
  held.sheafmarkUploads ??= open()
  return held.sheafmarkUploads
}

function open(): Held {
  mkdirSync(folder(), { recursive: true })
  const owner = new AsyncLocalStorage<UploadOwner>()
  const store = new FileStore({ directory: folder(), expirationPeriodInMilliseconds: keptFor })
  const server = new Server({
    path: '/api/papers',
    datastore: store,
    maxSize: env.SHEAFMARK_UPLOAD_LIMIT_MB * 1024 * 1024,
    relativeLocation: true,
    allowedOrigins: [],
    generateUrl: (_request, { id }) => `/api/papers/${owner.getStore()!.paperId}/sheaves/upload/${id}`,
    onUploadCreate: async (_request, upload) => {
      const name = path.basename((upload.metadata?.['filename'] ?? '').replaceAll('\\', '/')).slice(0, 200) || 'scan.pdf'
      return { metadata: { filename: name, ...owner.getStore()! } }
    },
  })
  const clean = () => server.cleanUpExpiredUploads().catch((error: unknown) => log.warn({ err: error }, 'old uploads not cleaned'))
  void clean()
  setInterval(clean, cleanedEvery).unref()
  return { server, store, owner }
}

/** Answers one request of the tus protocol on behalf of `owner`, whose right to it was checked before. */
export async function serveUpload(owner: UploadOwner, request: Request): Promise<Response> {
  const { server, owner: storage } = uploads()
  return storage.run(owner, () => server.handleWeb(request as never)) as Promise<Response>
}

/** An upload as far as it has come; null when there is none (never was, taken over, or cleaned away). */
export async function findUpload(id: string): Promise<Upload | null> {
  if (!/^[0-9a-f]{32}$/.test(id)) return null
  const upload = await uploads().store.getUpload(id).catch(() => null)
  const { userId, paperId, filename } = upload?.metadata ?? {}
  if (!upload || !userId || !paperId) return null
  return { id, userId, paperId, name: filename ?? 'scan.pdf', file: path.join(folder(), id), complete: upload.size === upload.offset }
}

/** Lets go of an upload that was taken over or turned down. */
export async function dropUpload(id: string): Promise<void> {
  await rm(path.join(folder(), id), { force: true })
  await rm(path.join(folder(), `${id}.json`), { force: true })
}
