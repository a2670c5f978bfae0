import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { getStoredFile } from '@/db/stored-files'
import { readKept } from '@/lib/infra/file-store'
import { gatePaper } from './gate-paper'

/** The blank paper byte for byte, as it was put in. */
export async function readBlankFile(actor: Actor, paperId: string): Promise<{ bytes: Buffer; name: string }> {
  await gatePaper(db(), actor, 'see', paperId)
  const id = (await getPaper(db(), paperId))?.blankFileId
  const file = id ? await getStoredFile(db(), id) : null
  if (!file) throw new AppError('not_found')
  return { bytes: await readKept(file.sha256), name: file.originalName }
}
