import { open, rm } from 'node:fs/promises'
import { AppError } from '@/lib/core/errors'
import { fileKind, kindBytes, type FileKind } from '@/lib/core/file-kind'
import { lookAtSheaf, wrapSheaf } from './look-at-sheaf'

/**
 * Scans as one sheaf, judged by their content: a PDF is one already; pictures are put into a PDF at `to`, in the order given.
 * Throws the file errors of openSheaf and wrapScan; nothing is left at `to` then.
 */
export async function asSheaf(files: readonly string[], to: string): Promise<{ path: string; pageCount: number }> {
  const [only] = files
  if (files.length === 1 && only !== undefined) {
    const kind = await kindOf(only)
    if (kind === 'pdf') return { path: only, ...(await lookAtSheaf(only)) }
    if (kind === null) throw new AppError('file_kind_unknown')
  }
  try {
    return { path: to, ...(await wrapSheaf(files, to)) }
  } catch (error) {
    await rm(to, { force: true })
    throw error
  }
}

/** A file's kind by its first bytes. Throws file_empty. */
export async function kindOf(path: string): Promise<FileKind | null> {
  const handle = await open(path)
  try {
    const { bytesRead, buffer } = await handle.read(Buffer.alloc(kindBytes), 0, kindBytes, 0)
    if (bytesRead === 0) throw new AppError('file_empty')
    return fileKind(buffer.subarray(0, bytesRead))
  } finally {
    await handle.close()
  }
}
